import type { ProfileReport } from '../deliver/index.js'
import type { GrownLayer } from '../design/index.js'
import { exitRegion, type Situation, slicedLayers } from '../model/index.js'
import { type WaveSystem, waveShape } from '../wave/index.js'

/** Points of a lead and, at least, of a layer; a layer wider than this many steps gets one a step. */
const leadPoints = 40
const fewest = 8
const stepNm = 0.1
const mostPoints = 400

/**
 * The edge through the stack, a bias in the slices that are computed, with a piece of each lead, every interface given twice, and abs(u)²
 * at the peak. Behind a hard wall there is nothing.
 */
export function profileOf(
  system: WaveSystem,
  situation: Situation,
  layers: readonly GrownLayer[],
  peakEv: number | null,
): ProfileReport {
  const zNm: number[] = []
  const edgeEv: number[] = []
  const run = (from: number, to: number, points: number, edge: number) => {
    for (let i = 0; i <= points; i++) {
      zNm.push(i === points ? to : from + ((to - from) * i) / points)
      edgeEv.push(edge)
    }
  }
  const { regions, width } = slicedLayers(situation, layers)
  const exit = exitRegion(situation)
  const total = width.reduce((sum, widthNm) => sum + widthNm, 0)
  const leadNm = Math.max(3, 0.2 * total)
  run(-leadNm, 0, leadPoints, 0)
  let from = 0
  regions.forEach(({ potentialEv }, s) => {
    const points = Math.min(
      mostPoints,
      Math.max(regions.length === layers.length ? fewest : 1, Math.ceil(width[s] / stepNm)),
    )
    run(from, from + width[s], points, potentialEv)
    from += width[s]
  })
  if (exit !== 'hard wall') run(from, from + leadNm, leadPoints, exit.potentialEv)
  const z = Float64Array.from(zNm)
  return {
    zNm: z,
    edgeEv: Float64Array.from(edgeEv),
    densityPerNm: peakEv === null || layers.length === 0 ? null : waveShape(system, peakEv, z),
  }
}

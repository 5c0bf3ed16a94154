import type { ProfileReport } from '../deliver/index.js'
import type { GrownLayer } from '../design/index.js'
import { hcEvNm } from '../media/index.js'
import { exitRegion, resolveOptics, type Situation, slicedLayers } from '../model/index.js'
import { type WaveSystem, waveShape } from '../wave/index.js'

/** Points of a lead and, at least, of a layer; a layer wider than this many steps gets one a step. */
const leadPoints = 40
const fewest = 8
const stepNm = 0.1
const filmStepNm = 2
const mostPoints = 400

/**
 * The edge (for light the index) through the stack, a bias in the slices that are computed, with a piece of each lead, every interface given twice, and abs(u)²
 * at the peak. Behind a hard wall there is nothing.
 */
export function profileOf(
  system: WaveSystem,
  situation: Situation,
  layers: readonly GrownLayer[],
  peakEv: number | null,
): ProfileReport {
  const zNm: number[] = []
  const edges: number[] = []
  const run = (from: number, to: number, points: number, edge: number) => {
    for (let i = 0; i <= points; i++) {
      zNm.push(i === points ? to : from + ((to - from) * i) / points)
      edges.push(edge)
    }
  }
  const { entry, exit, rows } = levelsOf(situation, layers, peakEv)
  const total = rows.reduce((sum, { widthNm }) => sum + widthNm, 0)
  const leadNm = Math.max(3, 0.2 * total)
  run(-leadNm, 0, leadPoints, entry)
  let from = 0
  for (const { level, widthNm } of rows) {
    const fine = situation.kind === 'electron' ? stepNm : filmStepNm
    const points = Math.min(mostPoints, Math.max(rows.length === layers.length ? fewest : 1, Math.ceil(widthNm / fine)))
    run(from, from + widthNm, points, level)
    from += widthNm
  }
  if (exit !== null) run(from, from + leadNm, leadPoints, exit)
  const z = Float64Array.from(zNm)
  return {
    zNm: z,
    edge: Float64Array.from(edges),
    densityPerNm: peakEv === null || layers.length === 0 ? null : waveShape(system, peakEv, z),
  }
}

interface Levels {
  readonly entry: number
  /** Null behind a hard wall. */
  readonly exit: number | null
  readonly rows: readonly { readonly level: number; readonly widthNm: number }[]
}

/** Band edges in eV; of light the real part of the index at the peak, or at the reference. */
function levelsOf(situation: Situation, layers: readonly GrownLayer[], peakEv: number | null): Levels {
  if (situation.kind === 'light') {
    const nm = peakEv === null ? situation.referenceNm : hcEvNm / peakEv
    const index = (choice: GrownLayer['choice']) => {
      const of = resolveOptics(choice, situation).medium.index
      return typeof of === 'number' ? of : of(nm)
    }
    const rows = layers.map(({ choice, widthNm }) => ({ level: index(choice), widthNm }))
    return { entry: index(situation.entry), exit: index(situation.exit), rows }
  }
  const { regions, width } = slicedLayers(situation, layers)
  const exit = exitRegion(situation)
  return {
    entry: 0,
    exit: exit === 'hard wall' ? null : exit.potentialEv,
    rows: regions.map(({ potentialEv }, s) => ({ level: potentialEv, widthNm: width[s] })),
  }
}

import { complexStepSlopes } from './complexStep.js'
import { log10 } from './elementary.js'
import { gradientInto } from './gradient.js'
import { mediaTable } from './mediaTable.js'
import { slopeInto } from './slope.js'
import type { WaveSystem } from './types.js'

/** Decimal digits in which derivatives agree with complex steps, each relative to the largest of its kind. */
export interface GradientDigits {
  readonly energy: number
  readonly width: number
  readonly q: number
  readonly mu: number
}

/**
 * How well `slopeInto` and `gradientInto` agree with complex steps at one energy (eV) of a lossless stack; null where T = 0. 16 is
 * the most that doubles show.
 */
export function gradientDigits(system: WaveSystem, energy: number): GradientDigits | null {
  const truth = complexStepSlopes(system, energy)
  if (truth === null) return null
  const { media, stack } = system
  const layers = stack.medium.length
  const here = mediaTable(media, 1)
  const slope = mediaTable(media, 1)
  media.fill(Float64Array.of(energy), here)
  media.fillSlope(Float64Array.of(energy), slope)
  const T = new Float64Array(1)
  const dTdE = new Float64Array(1)
  slopeInto(here, slope, stack, { T, dTdE })
  const row = () => new Float64Array(layers)
  const out = { T, dTdWidth: row(), dTdQ: row(), dTdMu: row() }
  gradientInto(here, stack, out)
  const digits = (found: Float64Array, wanted: Float64Array) =>
    agreement(
      found.map((one) => one / T[0]),
      wanted,
    )
  return {
    energy: digits(dTdE, Float64Array.of(truth.energy)),
    width: digits(out.dTdWidth, truth.width),
    q: digits(out.dTdQ, truth.q),
    mu: digits(out.dTdMu, truth.mu),
  }
}

function agreement(found: Float64Array, wanted: Float64Array): number {
  let scale = 0
  let worst = 0
  for (let i = 0; i < wanted.length; i++) {
    scale = Math.max(scale, Math.abs(wanted[i]))
    worst = Math.max(worst, Math.abs(found[i] - wanted[i]))
  }
  if (worst === 0 || scale === 0) return worst === 0 ? 16 : 0
  return Math.min(16, Math.max(0, -log10(worst / scale)))
}

import { absorbingSpectrum } from './absorbing.js'
import { scaleByPowerOfTwo } from './bits.js'
import { log10 } from './elementary.js'
import { blockSize } from './layerBlock.js'
import { checkStack, lead, refuseClosed, refuseResult } from './stackChecks.js'
import { applyLayer, computeLayer, growth, media, renormalise, shift, startVectors, u1, u2, v1, v2 } from './sweep.js'
import type { MediaTable, Side, WaveStack } from './types.js'

/** What `spectrumInto` writes: at least `points` entries each. */
export interface SpectrumOut {
  readonly T: Float64Array
  readonly R: Float64Array
  /** -Infinity where T = 0; computed only when given. */
  readonly log10T?: Float64Array
  /** Share of the incident flux absorbed between the leads, and in each layer (e * layers + j); written only when given. */
  readonly A?: Float64Array
  readonly absorbed?: Float64Array
}

/**
 * Transmission and reflection at every point of the table; absorption too where it has imaginary parts
 * (`absorbingSpectrum`). For a lossless stack:
 *
 * Two real vectors (u, v) are swept from the far side to the side the wave comes from: they start as (1, 0) and
 * (0, Y) in an open lead, the wave being first + i second; as (1, -kappa/mu) alone in a closed one; as (0, 1) alone at
 * a hard wall. Then u = A + B, v = iY(A - B), T = (Y_far/Y_near)/|A|², R = |B|²/|A|², each from its own numbers, so that
 * T + R = 1 is a test. A running power of two beside the vectors lets any width through. Layers run outside, blocks of
 * 128 energies inside. Allocates nothing once its scratch has seen as many media.
 *
 * `from` 'exit': the wave comes from the exit's side. Returns the largest |T + R + A - 1|.
 * Throws RangeError where the lead the wave comes from is closed (q <= 0) or absorbs, for a negative width, and for a result that
 * is not finite, each with its number.
 */
export function spectrumInto(table: MediaTable, stack: WaveStack, out: SpectrumOut, from: Side = 'entry'): number {
  checkStack(stack)
  const near = lead(stack, from, true)
  const far = lead(stack, from, false)
  if (table.qIm) return absorbingSpectrum(table, stack, out, from, near, far)
  out.A?.fill(0)
  out.absorbed?.fill(0)
  media.assign(table, stack)
  let worst = 0
  for (let first = 0; first < table.points; first += blockSize) {
    const n = Math.min(blockSize, table.points - first)
    sweep(table, stack, from, far, first, n)
    worst = Math.max(worst, finish(table, near, far, first, n, out))
  }
  return worst
}

function sweep(table: MediaTable, stack: WaveStack, from: Side, far: number, first: number, n: number): void {
  const { medium, width } = stack
  const layers = medium.length
  startVectors(table, far, first, n)
  // Log2 of what the vectors may have grown or shrunk by since they were last brought to order one.
  let grown = 0
  for (let step = 0; step < layers; step++) {
    const j = from === 'entry' ? layers - 1 - step : step
    const slot = media.at(table, medium[j], first, n)
    const bound = growth(slot, width[j])
    if (grown + bound > 900) {
      renormalise(n)
      grown = 0
    }
    grown += bound
    computeLayer(table, medium[j], slot, width[j], first, n)
    applyLayer(table, medium[j], slot, first, n)
  }
  if (grown > 400) renormalise(n)
}

function finish(table: MediaTable, near: number, far: number, first: number, n: number, out: SpectrumOut): number {
  const { q, mu, points } = table
  const { T, R, log10T } = out
  const tn = near * points + first
  const tf = far * points + first
  let worst = 0
  for (let i = 0; i < n; i++) {
    const qn = q[tn + i]
    if (!(qn > 0)) refuseClosed(table, first + i, near)
    const Y = Math.sqrt(qn) / mu[tn + i]
    const qf = far < 0 ? 0 : q[tf + i]
    const Yfar = qf > 0 ? Math.sqrt(qf) / mu[tf + i] : 0
    const x = Y * u1[i]
    const y = Y * u2[i]
    const ar = x + v2[i]
    const ai = y - v1[i]
    const br = x - v2[i]
    const bi = y + v1[i]
    const a = ar * ar + ai * ai
    const ratio = (4 * (Y * Yfar)) / a
    const t = shift[i] === 0 ? ratio : scaleByPowerOfTwo(ratio, -2 * shift[i])
    const r = (br * br + bi * bi) / a
    const flux = Math.abs(t + r - 1)
    if (!(flux < Infinity)) refuseResult(table, first + i)
    T[first + i] = t
    R[first + i] = r
    if (log10T) log10T[first + i] = log10(ratio) - 2 * shift[i] * 0.3010299956639812
    worst = Math.max(worst, flux)
  }
  return worst
}

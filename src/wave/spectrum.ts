import { exponentOf, highWord, powerOfTwo, scaleByPowerOfTwo } from './bits.js'
import { log10 } from './elementary.js'
import { BlockMedia, blockSize, layerFunctions, thickest } from './layerBlock.js'
import { checkStack, lead, refuseClosed, refuseResult } from './stackChecks.js'
import type { MediaTable, Side, WaveStack } from './types.js'

/** What `spectrumInto` writes: at least `points` entries each. */
export interface SpectrumOut {
  readonly T: Float64Array
  readonly R: Float64Array
  /** -Infinity where T = 0; computed only when given. */
  readonly log10T?: Float64Array
}

const media = new BlockMedia()
const u1 = new Float64Array(blockSize)
const v1 = new Float64Array(blockSize)
const u2 = new Float64Array(blockSize)
const v2 = new Float64Array(blockSize)
const shift = new Float64Array(blockSize)
const c = new Float64Array(blockSize)
const s = new Float64Array(blockSize)

/**
 * Transmission and reflection of a lossless stack at every point of the table.
 *
 * Two real vectors (u, v) are swept from the far side to the side the wave comes from: they start as (1, 0) and
 * (0, Y) in an open lead, the wave being first + i second; as (1, -kappa/mu) alone in a closed one; as (0, 1) alone at
 * a hard wall. Then u = A + B, v = iY(A - B), T = (Y_far/Y_near)/|A|², R = |B|²/|A|², each from its own numbers, so that
 * T + R = 1 is a test. A running power of two beside the vectors lets any width through. Layers run outside, blocks of
 * 128 energies inside. Allocates nothing once its scratch has seen as many media.
 *
 * `from` 'exit': the wave comes from the exit's side. Returns the largest |T + R - 1|.
 * Throws RangeError where the lead the wave comes from is closed (q <= 0), for a negative width, and for a result that
 * is not finite, each with its number.
 */
export function spectrumInto(table: MediaTable, stack: WaveStack, out: SpectrumOut, from: Side = 'entry'): number {
  checkStack(stack)
  const near = lead(stack, from, true)
  const far = lead(stack, from, false)
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
  media.begin()
  start(table, far, first, n)
  // Log2 of what the vectors may have grown or shrunk by since they were last brought to order one.
  let grown = 0
  for (let step = 0; step < layers; step++) {
    const j = from === 'entry' ? layers - 1 - step : step
    const w = width[j]
    const slot = media.at(table, medium[j], first, n)
    const x = media.kappaMax[slot] * w
    const thick = x > thickest
    const bound = (thick ? 0 : x * 1.5) + 4 + exponentOf(1 + media.muBound[slot] * w) + exponentOf(media.yBound[slot])
    if (grown + bound > 900) {
      renormalise(n)
      grown = 0
    }
    grown += bound
    const t = medium[j] * table.points + first
    const o = slot * blockSize
    layerFunctions(table.q, t, media.k, o, w, n, c, s, thick ? shift : null)
    apply(table.q, t, o, n)
  }
  if (grown > 400) renormalise(n)
}

function start(table: MediaTable, far: number, first: number, n: number): void {
  const { q, mu } = table
  const t = far * table.points + first
  for (let i = 0; i < n; i++) {
    shift[i] = 0
    u2[i] = 0
    if (far < 0) {
      u1[i] = 0
      v1[i] = 1
      v2[i] = 0
    } else {
      const Y = Math.sqrt(Math.abs(q[t + i])) / mu[t + i]
      const open = q[t + i] > 0
      u1[i] = 1
      v1[i] = open ? 0 : -Y
      v2[i] = open ? Y : 0
    }
  }
}

function apply(q: Float64Array, t: number, o: number, n: number): void {
  const { y, z } = media
  for (let i = 0; i < n; i++) {
    const cos = c[i]
    const down = z[o + i] * s[i]
    const up = q[t + i] < 0 ? -(y[o + i] * s[i]) : y[o + i] * s[i]
    const a = u1[i]
    const b = v1[i]
    const d = u2[i]
    const e = v2[i]
    u1[i] = cos * a - down * b
    v1[i] = up * a + cos * b
    u2[i] = cos * d - down * e
    v2[i] = up * d + cos * e
  }
}

function renormalise(n: number): void {
  for (let i = 0; i < n; i++) {
    const size = Math.max(Math.max(Math.abs(u1[i]), Math.abs(v1[i])), Math.max(Math.abs(u2[i]), Math.abs(v2[i])))
    const exponent = (highWord(size) >> 20) - 1023
    const factor = powerOfTwo(-exponent)
    u1[i] *= factor
    v1[i] *= factor
    u2[i] *= factor
    v2[i] *= factor
    shift[i] += exponent
  }
}

function finish(table: MediaTable, near: number, far: number, first: number, n: number, out: SpectrumOut): number {
  const { q, mu, points } = table
  const { T, R, log10T } = out
  const tn = near * points + first
  const tf = far * points + first
  let worst = 0
  for (let i = 0; i < n; i++) {
    const qn = q[tn + i]
    if (!(qn > 0)) refuseClosed(first + i, qn, near)
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

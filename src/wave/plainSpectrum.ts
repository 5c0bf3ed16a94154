import { scaleByPowerOfTwo } from './bits.js'
import { log10 } from './elementary.js'
import { blockSize } from './layerBlock.js'
import type { SpectrumOut } from './spectrum.js'
import { refuseClosed, refuseResult } from './stackChecks.js'
import { applyLayer, computeLayer, growth, media, renormalise, shift, startVectors, u1, u2, v1, v2 } from './sweep.js'
import type { MediaTable, Side, WaveStack } from './types.js'

/**
 * The spectrum of a lossless stack in plain TypeScript, the twin of `kernel/spectrum.as`: the same operations in the
 * same order, so the same bits. Whoever changes one changes the other; a test compares them on a million points.
 */
export function plainSpectrum(
  table: MediaTable,
  stack: WaveStack,
  out: SpectrumOut,
  from: Side,
  near: number,
  far: number,
): number {
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
    computeLayer(table, medium[j], slot, width[j], first, n, false)
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

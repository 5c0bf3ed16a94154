import { absorbingSlope } from './absorbingDerivatives.js'
import { scaleByPowerOfTwo } from './bits.js'
import { blockSize } from './layerBlock.js'
import { checkStack, refuseClosed, refuseResult } from './stackChecks.js'
import {
  applyLayer,
  c,
  computeLayer,
  factor,
  g,
  growth,
  media,
  renormalise,
  s,
  shift,
  startVectors,
  u1,
  u2,
  v1,
  v2,
} from './sweep.js'
import type { MediaTable, WaveStack } from './types.js'

/** What `slopeInto` writes: `points` entries each, dT/dE per eV. */
export interface SlopeOut {
  readonly T: Float64Array
  readonly dTdE: Float64Array
}

const du1 = new Float64Array(blockSize)
const dv1 = new Float64Array(blockSize)
const du2 = new Float64Array(blockSize)
const dv2 = new Float64Array(blockSize)

/**
 * T and dT/dE, from the entry; for media that absorb see `absorbingSlope`. `slope` holds dq/dE and dmu/dE where `table` holds q and mu, leads
 * too. The sweep of `spectrumInto` with its tangent beside it (forward differentiation); the logarithmic derivative is
 * taken first, so that dT is right relative to however small a T. Both are 0 where the exit is closed. About twice a
 * spectrum. Throws as `spectrumInto`.
 */
export function slopeInto(table: MediaTable, slope: MediaTable, stack: WaveStack, out: SlopeOut): void {
  checkStack(stack)
  if (table.qIm) {
    absorbingSlope(table, slope, stack, out)
    return
  }
  media.assign(table, stack)
  for (let first = 0; first < table.points; first += blockSize) {
    const n = Math.min(blockSize, table.points - first)
    sweep(table, slope, stack, first, n)
    finish(table, slope, stack, first, n, out)
  }
}

function sweep(table: MediaTable, slope: MediaTable, stack: WaveStack, first: number, n: number): void {
  const { medium, width, exit } = stack
  startVectors(table, exit, first, n)
  startTangents(table, slope, exit, first, n)
  let grown = 0
  for (let j = medium.length - 1; j >= 0; j--) {
    const slot = media.at(table, medium[j], first, n)
    const bound = growth(slot, width[j])
    if (grown + bound > 900) {
      renormaliseAll(n)
      grown = 0
    }
    grown += bound
    computeLayer(table, medium[j], slot, width[j], first, n, true)
    tangents(table, slope, medium[j], slot, width[j], first, n)
    applyLayer(table, medium[j], slot, first, n)
  }
  if (grown > 400) renormaliseAll(n)
}

// Of the start vectors only (0, Y) depends on the energy; a closed exit lets nothing through whatever its tangent.
function startTangents(table: MediaTable, slope: MediaTable, exit: number, first: number, n: number): void {
  const t = exit * table.points + first
  for (let i = 0; i < n; i++) {
    du1[i] = 0
    dv1[i] = 0
    du2[i] = 0
    const open = exit >= 0 && table.q[t + i] > 0
    dv2[i] = open ? v2[i] * logSlopeOfY(table, slope, t + i) : 0
  }
}

// dx' = M dx + dM x, before the vectors x themselves move on.
function tangents(
  table: MediaTable,
  slope: MediaTable,
  m: number,
  slot: number,
  w: number,
  first: number,
  n: number,
): void {
  const { perK, y, z } = media
  const t = m * table.points + first
  const o = slot * blockSize
  for (let i = 0; i < n; i++) {
    const q = table.q[t + i]
    const mu = table.mu[t + i]
    const dq = slope.q[t + i]
    const dmu = slope.mu[t + i]
    const cos = c[i]
    const a = s[i] * perK[o + i]
    const down = z[o + i] * s[i]
    const up = q < 0 ? -(y[o + i] * s[i]) : y[o + i] * s[i]
    const dcos = -0.5 * w * a * dq
    const ddown = a * dmu + mu * g[i] * dq
    const dup = ((0.5 * (a + w * cos)) / mu) * dq - (up / mu) * dmu
    const p1 = du1[i]
    const p2 = du2[i]
    du1[i] = cos * p1 - down * dv1[i] + (dcos * u1[i] - ddown * v1[i])
    dv1[i] = up * p1 + cos * dv1[i] + (dup * u1[i] + dcos * v1[i])
    du2[i] = cos * p2 - down * dv2[i] + (dcos * u2[i] - ddown * v2[i])
    dv2[i] = up * p2 + cos * dv2[i] + (dup * u2[i] + dcos * v2[i])
  }
}

function renormaliseAll(n: number): void {
  renormalise(n)
  for (let i = 0; i < n; i++) {
    du1[i] *= factor[i]
    dv1[i] *= factor[i]
    du2[i] *= factor[i]
    dv2[i] *= factor[i]
  }
}

// d ln Y/dE with Y = sqrt(q)/mu.
function logSlopeOfY(table: MediaTable, slope: MediaTable, t: number): number {
  return (0.5 * slope.q[t]) / table.q[t] - slope.mu[t] / table.mu[t]
}

function finish(table: MediaTable, slope: MediaTable, stack: WaveStack, first: number, n: number, out: SlopeOut): void {
  const { q, mu, points } = table
  const { entry, exit } = stack
  for (let i = 0; i < n; i++) {
    const near = entry * points + first + i
    const far = exit * points + first + i
    if (!(q[near] > 0)) refuseClosed(table, first + i, entry)
    if (exit < 0 || !(q[far] > 0)) {
      out.T[first + i] = 0
      out.dTdE[first + i] = 0
      continue
    }
    const Y = Math.sqrt(q[near]) / mu[near]
    const Yfar = Math.sqrt(q[far]) / mu[far]
    const nearSlope = logSlopeOfY(table, slope, near)
    const ar = Y * u1[i] + v2[i]
    const ai = Y * u2[i] - v1[i]
    const dar = Y * (du1[i] + nearSlope * u1[i]) + dv2[i]
    const dai = Y * (du2[i] + nearSlope * u2[i]) - dv1[i]
    const a = ar * ar + ai * ai
    const ratio = (4 * (Y * Yfar)) / a
    const T = scaleByPowerOfTwo(ratio, -2 * shift[i])
    const dT = T * (nearSlope + logSlopeOfY(table, slope, far) - (2 * (ar * dar + ai * dai)) / a)
    if (!(Math.abs(dT) < Infinity && T < Infinity)) refuseResult(table, first + i)
    out.T[first + i] = T
    out.dTdE[first + i] = dT
  }
}

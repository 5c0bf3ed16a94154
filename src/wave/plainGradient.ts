import { scaleByPowerOfTwo } from './bits.js'
import type { GradientOut } from './gradient.js'
import { blockSize } from './layerBlock.js'
import { refuseClosed, refuseResult } from './stackChecks.js'
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

// For each layer and energy of a block: the vectors at its right face, c, S = sin(kw)/k and dS/dq. Seven rows
// a layer, `stride` apart.
const rows = 7
let store = new Float64Array(0)
// What the vectors were multiplied by just before a layer was crossed; read only where `rescaled` says so.
let factors = new Float64Array(0)
let rescaled = new Uint8Array(0)
// The functional d ln D as a row: what an infinitesimal change of the vectors does to the logarithm of |A|².
const gu1 = new Float64Array(blockSize)
const gv1 = new Float64Array(blockSize)
const gu2 = new Float64Array(blockSize)
const gv2 = new Float64Array(blockSize)
const transmission = new Float64Array(blockSize)

/** `gradientInto` in plain TypeScript, the twin of `kernel/gradient.as`: the same operations in the same order. */
export function plainGradient(table: MediaTable, stack: WaveStack, out: GradientOut): void {
  media.assign(table, stack)
  const layers = stack.medium.length
  // The store of a block should stay in the second cache: 256 KiB.
  const stride = Math.max(8, Math.min(blockSize, Math.floor(32768 / (rows * (layers + 1)))))
  if (store.length < layers * rows * stride) store = new Float64Array(layers * rows * stride)
  if (factors.length < (layers + 1) * stride) factors = new Float64Array((layers + 1) * stride)
  if (rescaled.length <= layers) rescaled = new Uint8Array(layers + 1)
  for (let first = 0; first < table.points; first += stride) {
    const n = Math.min(stride, table.points - first)
    forward(table, stack, first, n, stride)
    startRow(table, stack, first, n, out.T)
    backward(table, stack, first, n, stride, out)
  }
}

function forward(table: MediaTable, stack: WaveStack, first: number, n: number, stride: number): void {
  const { medium, width, exit } = stack
  startVectors(table, exit, first, n)
  let grown = 0
  for (let j = medium.length - 1; j >= 0; j--) {
    const slot = media.at(table, medium[j], first, n)
    const bound = growth(slot, width[j])
    rescaled[j + 1] = grown + bound > 400 ? 1 : 0
    if (rescaled[j + 1] === 1) {
      rescale(j + 1, n, stride)
      grown = 0
    }
    grown += bound
    computeLayer(table, medium[j], slot, width[j], first, n, true)
    keep(j, slot, n, stride)
    applyLayer(table, medium[j], slot, first, n)
  }
  rescaled[0] = grown > 0 ? 1 : 0
  if (grown > 0) rescale(0, n, stride)
}

function rescale(at: number, n: number, stride: number): void {
  renormalise(n)
  for (let i = 0; i < n; i++) factors[at * stride + i] = factor[i]
}

function keep(j: number, slot: number, n: number, stride: number): void {
  const o = j * rows * stride
  for (let i = 0; i < n; i++) {
    store[o + i] = u1[i]
    store[o + stride + i] = v1[i]
    store[o + 2 * stride + i] = u2[i]
    store[o + 3 * stride + i] = v2[i]
    store[o + 4 * stride + i] = c[i]
    store[o + 5 * stride + i] = s[i] * media.perK[slot * blockSize + i]
    store[o + 6 * stride + i] = g[i]
  }
}

function startRow(table: MediaTable, stack: WaveStack, first: number, n: number, T: Float64Array): void {
  const { q, mu, points } = table
  const { entry, exit } = stack
  for (let i = 0; i < n; i++) {
    const near = entry * points + first + i
    const far = exit * points + first + i
    if (!(q[near] > 0)) refuseClosed(table, first + i, entry)
    const Y = Math.sqrt(q[near]) / mu[near]
    const Yfar = exit >= 0 && q[far] > 0 ? Math.sqrt(q[far]) / mu[far] : 0
    const ar = Y * u1[i] + v2[i]
    const ai = Y * u2[i] - v1[i]
    const a = ar * ar + ai * ai
    const t = scaleByPowerOfTwo((4 * (Y * Yfar)) / a, -2 * shift[i])
    if (!(t < Infinity)) refuseResult(table, first + i)
    transmission[i] = t
    T[first + i] = t
    const twice = 2 / a
    gu1[i] = twice * ar * Y
    gv1[i] = -(twice * ai)
    gu2[i] = twice * ai * Y
    gv2[i] = twice * ar
  }
}

function backward(
  table: MediaTable,
  stack: WaveStack,
  first: number,
  n: number,
  stride: number,
  out: GradientOut,
): void {
  const { medium, width } = stack
  const layers = medium.length
  const { dTdWidth, dTdQ, dTdMu } = out
  if (rescaled[0] === 1) scaleRow(0, n, stride)
  for (let j = 0; j < layers; j++) {
    const m = medium[j]
    const w = width[j]
    const slot = media.at(table, m, first, n)
    const { perMu, ratio } = media
    const t = m * table.points + first
    const o = slot * blockSize
    const r = j * rows * stride
    for (let i = 0; i < n; i++) {
      const mu = table.mu[t + i]
      const cos = store[r + 4 * stride + i]
      const S = store[r + 5 * stride + i]
      const down = mu * S
      const up = ratio[o + i] * S
      const gu = gu1[i]
      const gv = gv1[i]
      const hu = gu2[i]
      const hv = gv2[i]
      const a1 = store[r + i]
      const b1 = store[r + stride + i]
      const a2 = store[r + 2 * stride + i]
      const b2 = store[r + 3 * stride + i]
      // What a change of the matrix [cos, -down; up, cos] by one of its entries does to ln D.
      const byCos = gu * a1 + gv * b1 + (hu * a2 + hv * b2)
      const byDown = gu * b1 + hu * b2
      const byUp = gv * a1 + hv * a2
      const alpha = byUp * perMu[o + i]
      const beta = mu * byDown
      const delta = cos * alpha - S * byCos
      const T = -transmission[i]
      const e = (first + i) * layers + j
      dTdWidth[e] = T * (table.q[t + i] * delta - cos * beta)
      dTdQ[e] = T * (0.5 * (S * alpha + w * delta) - store[r + 6 * stride + i] * beta)
      dTdMu[e] = transmission[i] * (S * byDown + up * alpha)
      gu1[i] = gu * cos + gv * up
      gv1[i] = gv * cos - gu * down
      gu2[i] = hu * cos + hv * up
      gv2[i] = hv * cos - hu * down
    }
    if (rescaled[j + 1] === 1) scaleRow(j + 1, n, stride)
  }
}

function scaleRow(at: number, n: number, stride: number): void {
  for (let i = 0; i < n; i++) {
    const scale = factors[at * stride + i]
    gu1[i] *= scale
    gv1[i] *= scale
    gu2[i] *= scale
    gv2[i] *= scale
  }
}

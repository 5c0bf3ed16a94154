import { absorbingGradient } from './absorbingDerivatives.js'
import { gradientInto, type Share } from './gradient.js'
import { checkStack } from './stackChecks.js'
import type { MediaTable, WaveStack, WaveSystem } from './types.js'

/** T: one entry an energy. gradient: entry (e * layers + j) * (1 + P) + i, P the media's number of parameters. */
export interface ParameterGradientOut {
  readonly T: Float64Array
  readonly gradient: Float64Array
}

let table: Required<MediaTable> = tableOf(0)
let dTdWidth = new Float64Array(0)
let dTdQ = new Float64Array(0)
let dTdMu = new Float64Array(0)
let dTdQIm = new Float64Array(0)
let dTdMuIm = new Float64Array(0)
let partials = new Float64Array(0)
/** Of every medium at one energy, and the number of the energy after which they were asked. */
let known = new Float64Array(0)
let asked = new Int32Array(0)
let rows = new Float64Array(0)

/**
 * T and its derivative by what describes each layer: i = 0 its width (1/nm), then each parameter of its medium in the
 * medium's own unit, every layer taken as if its medium were its own (leads and other layers of the same medium held
 * fixed); where the system's rows are mapped to fewer layers, by those. One adjoint sweep (`gradientInto`) and the media's partial derivatives. Of a `share` R, `out.T`
 * is R; `from` the exit, the wave comes from there. Throws as `spectrumInto`.
 */
export function parameterGradient(
  { media, stack: forward, rowMap }: WaveSystem,
  energies: Float64Array,
  out: ParameterGradientOut,
  share: Share = 'T',
  from: 'entry' | 'exit' = 'entry',
): void {
  const stack = from === 'entry' ? forward : mirrored(forward)
  const points = energies.length
  const layers = stack.medium.length
  const { parameters, lossless } = media
  grow(media.count, points, layers, parameters, rowMap !== undefined)
  const { q, mu, qIm, muIm } = table
  const real = { count: media.count, points, q, mu }
  const here = lossless ? real : { ...real, qIm, muIm }
  media.fill(energies, here)
  const slopes = { T: out.T, dTdWidth, dTdQ, dTdMu, ...(lossless ? {} : { dTdQIm, dTdMuIm }) }
  if (lossless) gradientInto(here, stack, slopes)
  else {
    checkStack(stack)
    absorbingGradient(here, stack, slopes, share)
  }
  // R = 1 - T where nothing absorbs.
  const sign = lossless && share === 'R' ? -1 : 1
  if (sign < 0) for (let e = 0; e < points; e++) out.T[e] = 1 - out.T[e]
  const stride = 1 + parameters
  const size = 4 * parameters
  asked.fill(-1, 0, media.count)
  for (let e = 0; e < points; e++) {
    const gradient = rowMap ? rows : out.gradient
    const first = rowMap ? 0 : e * layers
    for (let j = 0; j < layers; j++) {
      const own = from === 'entry' ? j : layers - 1 - j
      const cell = e * layers + own
      const to = (first + j) * stride
      gradient[to] = sign * dTdWidth[cell]
      const m = forward.medium[j]
      const k = m * size
      if (asked[m] !== e) {
        asked[m] = e
        media.partials(energies[e], m, partials)
        for (let i = 0; i < size; i++) known[k + i] = partials[i]
      }
      for (let p = 0; p < parameters; p++) {
        let slope = dTdQ[cell] * known[k + 2 * p] + dTdMu[cell] * known[k + 2 * p + 1]
        if (!lossless) {
          const o = k + 2 * (parameters + p)
          slope += dTdQIm[cell] * known[o] + dTdMuIm[cell] * known[o + 1]
        }
        gradient[to + 1 + p] = sign * slope
      }
    }
    if (rowMap) rowMap.toLayers(rows, 0, stride, out.gradient, e * rowMap.layers * stride)
  }
}

function mirrored({ entry, exit, medium, width }: WaveStack): WaveStack {
  return { entry: exit, exit: entry, medium: medium.slice().reverse(), width: width.slice().reverse() }
}

function tableOf(cells: number): Required<MediaTable> {
  const row = () => new Float64Array(cells)
  return { count: 0, points: 0, q: row(), mu: row(), qIm: row(), muIm: row() }
}

function grow(count: number, points: number, layers: number, parameters: number, mapped: boolean): void {
  const entries = layers * points
  if (table.q.length < count * points) table = tableOf(count * points)
  if (dTdWidth.length < entries) {
    dTdWidth = new Float64Array(entries)
    dTdQ = new Float64Array(entries)
    dTdMu = new Float64Array(entries)
    dTdQIm = new Float64Array(entries)
    dTdMuIm = new Float64Array(entries)
  }
  if (mapped && rows.length < layers * (1 + parameters)) rows = new Float64Array(layers * (1 + parameters))
  if (partials.length < 4 * parameters) partials = new Float64Array(4 * parameters)
  if (known.length < 4 * parameters * count) known = new Float64Array(4 * parameters * count)
  if (asked.length < count) asked = new Int32Array(count)
}

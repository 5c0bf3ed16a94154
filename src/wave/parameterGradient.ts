import { gradientInto } from './gradient.js'
import type { WaveSystem } from './types.js'

/** T: one entry an energy. gradient: entry (e * layers + j) * (1 + P) + i, P the media's number of parameters. */
export interface ParameterGradientOut {
  readonly T: Float64Array
  readonly gradient: Float64Array
}

let q = new Float64Array(0)
let mu = new Float64Array(0)
let dTdWidth = new Float64Array(0)
let dTdQ = new Float64Array(0)
let dTdMu = new Float64Array(0)
let partials = new Float64Array(0)
let rows = new Float64Array(0)

/**
 * T and its derivative by what describes each layer: i = 0 its width (1/nm), then each parameter of its medium in the
 * medium's own unit, every layer taken as if its medium were its own (leads and other layers of the same medium held
 * fixed); where the system's rows are mapped to fewer layers, by those. One adjoint sweep (`gradientInto`) and the media's partial derivatives. Throws as `spectrumInto`.
 */
export function parameterGradient(system: WaveSystem, energies: Float64Array, out: ParameterGradientOut): void {
  const { media, stack, rowMap } = system
  const points = energies.length
  const layers = stack.medium.length
  const parameters = media.parameters
  grow(media.count * points, layers * points, 2 * parameters, rowMap ? layers * (1 + parameters) : 0)
  const table = { count: media.count, points, q, mu }
  media.fill(energies, table)
  gradientInto(table, stack, { T: out.T, dTdWidth, dTdQ, dTdMu })
  const stride = 1 + parameters
  for (let e = 0; e < points; e++) {
    const gradient = rowMap ? rows : out.gradient
    const first = rowMap ? 0 : e * layers
    for (let j = 0; j < layers; j++) {
      const from = e * layers + j
      const to = (first + j) * stride
      gradient[to] = dTdWidth[from]
      media.partials(energies[e], stack.medium[j], partials)
      for (let p = 0; p < parameters; p++) {
        gradient[to + 1 + p] = dTdQ[from] * partials[2 * p] + dTdMu[from] * partials[2 * p + 1]
      }
    }
    if (rowMap) rowMap.toLayers(rows, 0, stride, out.gradient, e * rowMap.layers * stride)
  }
}

function grow(cells: number, entries: number, numbers: number, rowNumbers: number): void {
  if (q.length < cells) {
    q = new Float64Array(cells)
    mu = new Float64Array(cells)
  }
  if (dTdWidth.length < entries) {
    dTdWidth = new Float64Array(entries)
    dTdQ = new Float64Array(entries)
    dTdMu = new Float64Array(entries)
  }
  if (rows.length < rowNumbers) rows = new Float64Array(rowNumbers)
  if (partials.length < numbers) partials = new Float64Array(numbers)
}

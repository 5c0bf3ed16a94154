import { BlockMedia, blockSize, layerFunctions, thickest } from './layerBlock.js'
import type { WaveSystem } from './types.js'

/** What `layerMatrices` writes: entry e * layers + j belongs to layer j at energy number e. */
export interface LayerMatricesOut {
  /** [u; v] left of the layer = [[same, down], [up, same]] [u; v] right of it, but for a common sign. */
  readonly same: Float64Array
  readonly down: Float64Array
  readonly up: Float64Array
}

/** Leads at each energy, and the greatest arguments. */
export interface ChainEnds {
  /** k/mu of the leads; 0 where a lead is closed, or a hard wall. */
  readonly entryY: Float64Array
  readonly exitY: Float64Array
  /** The greatest kw of any layer. */
  readonly angle: Float64Array
  /** For each layer the greatest kw at which the wave decays in it. */
  readonly exponent: Float64Array
}

/**
 * The matrix of each layer of a lossless system for itself, at `energies` (eV), for whoever multiplies them in many orders. Layers
 * thicker than e^300 can't be written so: null.
 */
export function layerMatrices(
  { media, stack }: WaveSystem,
  energies: Float64Array,
  out: LayerMatricesOut,
): ChainEnds | null {
  const points = energies.length
  const layers = stack.medium.length
  const size = media.count * points
  const table = { count: media.count, points, q: new Float64Array(size), mu: new Float64Array(size) }
  media.fill(energies, table)
  const slots = new BlockMedia()
  slots.assign(table, stack)
  const c = new Float64Array(blockSize)
  const s = new Float64Array(blockSize)
  const angle = new Float64Array(points)
  const exponent = new Float64Array(layers)
  for (let first = 0; first < points; first += blockSize) {
    const n = Math.min(blockSize, points - first)
    slots.begin()
    for (let j = 0; j < layers; j++) {
      const w = stack.width[j]
      const slot = slots.at(table, stack.medium[j], first, n)
      if (slots.kappaMax[slot] * w > thickest) return null
      const t = stack.medium[j] * points + first
      const o = slot * blockSize
      layerFunctions(table.q, t, slots, o, w, n, c, s, null, null)
      for (let i = 0; i < n; i++) {
        const at = (first + i) * layers + j
        out.same[at] = c[i]
        out.down[at] = -(slots.z[o + i] * s[i])
        out.up[at] = table.q[t + i] < 0 ? -(slots.y[o + i] * s[i]) : slots.y[o + i] * s[i]
        const kw = slots.k[o + i] * w
        angle[first + i] = Math.max(angle[first + i], kw)
        if (table.q[t + i] < 0) exponent[j] = Math.max(exponent[j], kw)
      }
    }
  }
  return { entryY: admittance(stack.entry), exitY: admittance(stack.exit), angle, exponent }

  function admittance(lead: number): Float64Array {
    const Y = new Float64Array(points)
    if (lead < 0) return Y
    for (let e = 0; e < points; e++) {
      const q = table.q[lead * points + e]
      Y[e] = q > 0 ? Math.sqrt(q) / table.mu[lead * points + e] : 0
    }
    return Y
  }
}

import type { RowMap } from '../wave/index.js'
import { resolveRegion } from './resolveMedium.js'
import type { ElectronSituation, ModelLayer, Region } from './types.js'

/** Layers as the wave core reads them: rows of constant edge, and what the rows have to do with the layers (null: they are the layers). */
export interface SlicedLayers {
  readonly regions: readonly Region[]
  readonly width: Float64Array
  readonly rowMap: RowMap | null
}

/**
 * Under a bias U every layer is cut into its slices, of equal width, each at the potential of its middle: the edge falls linearly, from 0
 * to -U, over the layers that are biased. Throws as resolveMedium does.
 */
export function slicedLayers(situation: ElectronSituation, layers: readonly ModelLayer[]): SlicedLayers {
  const { biasV } = situation
  if (biasV === 0) {
    const width = new Float64Array(layers.length)
    for (let j = 0; j < width.length; j++) width[j] = layers[j].widthNm
    return { regions: layers.map(({ choice }) => resolveRegion(choice, situation).region), width, rowMap: null }
  }
  const total = layers.reduce((sum, { widthNm, biased }) => sum + (biased ? widthNm : 0), 0)
  const slices = layers.reduce((sum, layer) => sum + layer.slices, 0)
  const regions: Region[] = []
  const width = new Float64Array(slices)
  const fallen = new Float64Array(slices)
  let behind = false
  let begun = 0
  for (const { choice, widthNm, biased, slices: count } of layers) {
    const region = resolveRegion(choice, situation).region
    behind ||= biased
    for (let i = 0; i < count; i++) {
      const s = regions.length
      width[s] = widthNm / count
      // Layers of no width in all: the whole drop stands at their face.
      fallen[s] = !behind ? 0 : biased ? (total > 0 ? (begun + ((i + 0.5) * widthNm) / count) / total : 0.5) : 1
      regions.push({ ...region, potentialEv: region.potentialEv - biasV * fallen[s] })
    }
    if (biased) begun += widthNm
  }
  return { regions, width, rowMap: new BiasedRows(layers, fallen, total, biasV) }
}

/**
 * With f the share of the drop at the middle of a slice, i.5 slices into layer j, D the biased width and V = V_j - U f:
 * df/dw_k = ((1 for k before j, (i + 1/2)/n for k = j, else 0) - f)/D for biased layers k.
 */
class BiasedRows implements RowMap {
  readonly layers: number

  constructor(
    private readonly rows: readonly ModelLayer[],
    private readonly fallen: Float64Array,
    private readonly totalNm: number,
    private readonly biasV: number,
  ) {
    this.layers = rows.length
  }

  toLayers(rows: Float64Array, from: number, stride: number, out: Float64Array, to: number): void {
    const { rows: layers, fallen, totalNm, biasV } = this
    out.fill(0, to, to + layers.length * stride)
    // Slopes in the share of the drop: of the slices behind a layer, and all of them times their share.
    const perShare = totalNm > 0 ? -biasV / totalNm : 0
    let behind = 0
    let all = 0
    for (let j = layers.length - 1, s = fallen.length - 1; j >= 0; j--) {
      const { slices, biased } = layers[j]
      const o = to + j * stride
      let own = 0
      for (let i = slices - 1; i >= 0; i--, s--) {
        const r = from + s * stride
        out[o] += rows[r] / slices
        for (let p = 1; p < stride; p++) out[o + p] += rows[r + p]
        if (!biased) continue
        const slope = perShare * rows[r + 1]
        out[o] += slope * ((i + 0.5) / slices)
        own += slope
        all += slope * fallen[s]
      }
      if (biased) out[o] += behind
      behind += own
    }
    for (let j = 0; j < layers.length; j++) if (layers[j].biased) out[to + j * stride] -= all
  }
}

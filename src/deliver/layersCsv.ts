import { csv, meV } from './csv.js'
import { mlOf } from './layerText.js'
import type { LayerReport } from './types.js'

const header = [
  ...['no', 'from_substrate', 'id', 'material', 'x', 'ml', 'width_nm', 'potential_eV', 'mass_rel', 'alpha_per_eV'],
  ...['seconds', 'total_nm', 'tolerance_nm', 'shift_meV'],
]

/**
 * layers.csv: the growth sheet of one candidate. It runs from the substrate up, as the layers are grown, and so does the running
 * `total_nm`; `no` counts from entry to exit, as the wave meets them.
 *
 * @param layers from entry to exit
 */
export function layersCsv(layers: readonly LayerReport[]): string {
  let total = 0
  const grown = layers
    .map((layer, index) => ({ layer, no: index + 1 }))
    .sort((a, b) => a.layer.fromSubstrate - b.layer.fromSubstrate)
  return csv(
    header,
    grown.map(({ layer, no }) => {
      const { choice, resolved } = layer
      total += layer.widthNm
      return [
        ...[no, layer.fromSubstrate, layer.id, choice.kind === 'material' ? choice.material : choice.name],
        ...[choice.kind === 'material' ? choice.x : null, mlOf(layer), layer.widthNm],
        ...[resolved.region.potentialEv, resolved.region.massRel, resolved.region.alphaPerEv],
        ...[layer.seconds, total, layer.toleranceNm, meV(layer.shiftEv)],
      ]
    }),
  )
}

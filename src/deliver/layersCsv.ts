import type { Job, Kind } from '../job/index.js'
import { csv } from './csv.js'
import { mlOf } from './layerText.js'
import { spectralUnit } from './spectralUnit.js'
import type { LayerReport } from './types.js'

const numbers: Readonly<Record<Kind, readonly string[]>> = {
  electron: ['potential_eV', 'mass_rel', 'alpha_per_eV'],
  light: ['index', 'extinction'],
}

function headerOf(kind: Kind): string[] {
  return [
    ...['no', 'from_substrate', 'id', 'material', 'x', 'ml', 'width_nm', ...numbers[kind]],
    ...['seconds', 'total_nm', 'tolerance_nm', `shift_${spectralUnit(kind).name}`],
    ...(kind === 'light' ? ['qw', 'tooling', 'monitor_nm'] : []),
  ]
}

/**
 * layers.csv: the growth sheet of one candidate. It runs from the substrate up, as the layers are grown, and so does the running
 * `total_nm`; `no` counts from entry to exit, as the wave meets them. For light the index and extinction are those at the reference; then
 * come the width in quarter waves there, the tooling factor (thickness on the part over that on the monitor) and the width on the monitor.
 *
 * @param layers from entry to exit
 * @param peakEv where the shifts start; null without a peak
 */
export function layersCsv(
  layers: readonly LayerReport[],
  { kind, growth }: Pick<Job, 'kind' | 'growth'>,
  peakEv: number | null,
): string {
  let total = 0
  const grown = layers
    .map((layer, index) => ({ layer, no: index + 1 }))
    .sort((a, b) => a.layer.fromSubstrate - b.layer.fromSubstrate)
  return csv(
    headerOf(kind),
    grown.map(({ layer, no }) => {
      const { choice, resolved } = layer
      const name = choice.kind === 'material' ? (choice.own?.name ?? choice.material) : choice.name
      const tooling = growth.tooling[name ?? ''] ?? null
      total += layer.widthNm
      return [
        ...[no, layer.fromSubstrate, layer.id, name],
        ...[choice.kind === 'material' ? choice.x : null, mlOf(layer), layer.widthNm],
        ...(resolved.kind === 'electron'
          ? [resolved.region.potentialEv, resolved.region.massRel, resolved.region.alphaPerEv]
          : [resolved.index, resolved.extinction]),
        ...[layer.seconds, total, layer.toleranceNm, spectralUnit(kind).shiftCell(layer.shiftEv, peakEv)],
        ...(resolved.kind === 'light'
          ? [layer.widthNm / resolved.quarterNm, tooling, tooling && layer.widthNm / tooling]
          : []),
      ]
    }),
  )
}

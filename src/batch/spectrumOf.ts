import { mediaTable, spectrumInto, type WaveSystem } from '../wave/index.js'

export interface SystemSpectrum {
  readonly T: Float64Array
  readonly R: Float64Array
  readonly log10T: Float64Array
  readonly fluxError: number
}

/** T, R and log10 T of a system at energies in eV, from the entry. */
export function spectrumOf({ media, stack }: WaveSystem, energiesEv: Float64Array): SystemSpectrum {
  const points = energiesEv.length
  const table = mediaTable(media, points)
  media.fill(energiesEv, table)
  const row = () => new Float64Array(points).fill(Number.NaN)
  const out = { T: row(), R: row(), log10T: row() }
  return { ...out, fluxError: spectrumInto(table, stack, out) }
}

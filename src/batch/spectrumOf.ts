import { Response } from '../model/index.js'
import { log10, mediaTable, spectrumInto, type WaveSystem } from '../wave/index.js'

export interface SystemSpectrum {
  readonly T: Float64Array
  readonly R: Float64Array
  /** Null where nothing absorbs. */
  readonly A: Float64Array | null
  readonly log10T: Float64Array
  readonly fluxError: number
}

/** What comes of a wave from the entry at energies in eV: one wave, the mean of two, or with what a thick plate sends back. */
export function spectrumOf(system: WaveSystem, energiesEv: Float64Array): SystemSpectrum {
  const { media, beside, behind } = system
  if (beside === undefined && behind === undefined) return ofOneWave(system, energiesEv)
  const { T, R, A } = new Response(energiesEv).at(system)
  const log10T = T.map((share) => (share > 0 ? log10(share) : Number.NEGATIVE_INFINITY))
  const fluxError = T.reduce((worst, share, e) => Math.max(worst, Math.abs(share + R[e] + A[e] - 1)), 0)
  return { T, R, A: media.lossless ? null : A, log10T, fluxError }
}

function ofOneWave({ media, stack }: WaveSystem, energiesEv: Float64Array): SystemSpectrum {
  const points = energiesEv.length
  const table = mediaTable(media, points)
  media.fill(energiesEv, table)
  const row = () => new Float64Array(points).fill(Number.NaN)
  const out = { T: row(), R: row(), A: row(), log10T: row() }
  const fluxError = spectrumInto(table, stack, out)
  return { ...out, A: media.lossless ? null : out.A, fluxError }
}

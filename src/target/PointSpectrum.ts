import { type MediaTable, spectrumInto, type WaveSystem } from '../wave/index.js'

/** T at a fixed list of energies (eV) of one system after the other; allocates when a system has more media than any before. */
export class PointSpectrum {
  private readonly energies: Float64Array
  private readonly T: Float64Array
  private readonly R: Float64Array
  private q = new Float64Array(0)
  private mu = new Float64Array(0)

  constructor(energiesEv: readonly number[]) {
    this.energies = Float64Array.from(energiesEv)
    this.T = new Float64Array(energiesEv.length)
    this.R = new Float64Array(energiesEv.length)
  }

  /** The array is reused by the next call. */
  at({ media, stack }: WaveSystem): Float64Array {
    const { energies, T, R } = this
    const points = energies.length
    if (points === 0) return T
    if (this.q.length < media.count * points) {
      this.q = new Float64Array(media.count * points)
      this.mu = new Float64Array(media.count * points)
    }
    const table: MediaTable = { count: media.count, points, q: this.q, mu: this.mu }
    media.fill(energies, table)
    spectrumInto(table, stack, { T, R })
    return T
  }
}

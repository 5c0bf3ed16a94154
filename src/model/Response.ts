import { type MediaTable, mediaTable, spectrumInto, type WaveMedia, type WaveSystem } from '../wave/index.js'
import { incoherentBack } from './incoherentBack.js'

/** The transmitted, reflected and absorbed share of the incoming flux, one number an energy. */
export interface Shares {
  readonly T: Float64Array
  readonly R: Float64Array
  /** 0 in lossless stacks, and where it was not asked for. */
  readonly A: Float64Array
}

/**
 * What a job asks of systems at a fixed list of energies (eV): T, R and A of the wave, or the mean of it and the one beside it, with what
 * a thick plate behind the stack sends back. Media that come again are not asked again. A costs three times T and R.
 */
export class Response {
  private readonly shares: Shares
  private readonly other: Shares
  private readonly tables = new Map<WaveMedia, MediaTable>()

  constructor(
    private readonly energies: Float64Array,
    private readonly absorbed = true,
  ) {
    const row = () => new Float64Array(energies.length)
    this.shares = { T: row(), R: row(), A: row() }
    this.other = { T: row(), R: row(), A: row() }
  }

  /** The arrays are reused by the next call. */
  at(system: WaveSystem): Shares {
    const { shares, other } = this
    if (this.energies.length === 0) return shares
    this.one(system, shares)
    if (system.beside) {
      this.one(system.beside, other)
      for (const key of ['T', 'R', 'A'] as const) {
        for (let e = 0; e < this.energies.length; e++) shares[key][e] = 0.5 * (shares[key][e] + other[key][e])
      }
    }
    return shares
  }

  private one({ media, stack, behind }: WaveSystem, out: Shares): void {
    const table = this.tableOf(media)
    if (behind !== undefined) {
      const { T, R, A } = incoherentBack(table, stack, behind, 'entry', this.absorbed)
      out.T.set(T)
      out.R.set(R)
      out.A.set(A)
      return
    }
    if (media.lossless || !this.absorbed) spectrumInto(table, stack, { T: out.T, R: out.R })
    else spectrumInto(table, stack, out)
  }

  private tableOf(media: WaveMedia): MediaTable {
    const known = this.tables.get(media)
    if (known) return known
    // The last two: a wave and the one beside it.
    const oldest = this.tables.size >= 2 ? this.tables.keys().next().value : undefined
    const table = reusable(oldest && this.tables.get(oldest), media) ?? mediaTable(media, this.energies.length)
    if (oldest) this.tables.delete(oldest)
    media.fill(this.energies, table)
    this.tables.set(media, table)
    return table
  }
}

/** A table that has the room for other media. */
function reusable(table: MediaTable | undefined, media: WaveMedia): MediaTable | null {
  if (!table || table.q.length < media.count * table.points || media.lossless !== (table.qIm === undefined)) return null
  return { ...table, count: media.count }
}

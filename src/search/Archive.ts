import type { Score } from '../target/index.js'
import type { Found, UnitResult } from './types.js'

/**
 * What the units have found, folded in the order of their numbers: the best stacks, each once, and how the search went. The same units
 * leave the same archive, however they were grouped or kept on the way, as long as they are added in order.
 */
export class Archive {
  /** Units folded in. */
  units = 0
  /** Sums of the units' own accounts; a stack that two units looked at counts twice. */
  examined = 0
  cut = 0
  /** Merit of the best after each tenth of `total` units; shorter while the search goes on. */
  readonly meritAfterTenths: number[] = []
  private stacks: Found[] = []
  private readonly startsByBest = new Map<string, number>()
  private lastUnit = -1

  /** `compare`: negative when a comes first. `total`: the units of the whole search. `kept`: more than any ranking asks for. */
  constructor(
    private readonly compare: (a: Score, b: Score) => number,
    private readonly total: number,
    private readonly kept = 1024,
  ) {}

  /** Throws RangeError for a unit out of order. */
  add(result: UnitResult): void {
    if (result.unit <= this.lastUnit) {
      throw new RangeError(`Unit ${result.unit} comes after unit ${this.lastUnit}: an archive is folded in order.`)
    }
    this.lastUnit = result.unit
    this.units++
    this.examined += result.examined
    this.cut += result.cut
    const first = result.found.at(0)
    if (first) this.startsByBest.set(first.score.id, (this.startsByBest.get(first.score.id) ?? 0) + 1)
    this.merge(result.found)
    while (this.units >= (this.total * (this.meritAfterTenths.length + 1)) / 10 && this.meritAfterTenths.length < 10) {
      this.meritAfterTenths.push(this.stacks.at(0)?.score.merit ?? Number.NaN)
    }
  }

  /** The first `count` of the order. */
  best(count: number): Found[] {
    return this.stacks.slice(0, count)
  }

  /** How many units have the best stack of all as their own best. */
  get startsInBest(): number {
    const best = this.stacks.at(0)
    return best ? (this.startsByBest.get(best.score.id) ?? 0) : 0
  }

  /**
   * About the chance that one more start ends in a stack in which none has ended, as it must where it finds a better one: Good's
   * estimate, end points seen once over starts (I. J. Good, Biometrika 40, 237, 1953; after Turing). Null before the first start.
   */
  get unseenShare(): number | null {
    if (this.units === 0) return null
    let once = 0
    for (const starts of this.startsByBest.values()) if (starts === 1) once++
    return once / this.units
  }

  private merge(found: readonly Found[]): void {
    const known = new Set(this.stacks.map(({ score }) => score.id))
    const fresh = found.filter(({ score }) => !known.has(score.id))
    if (fresh.length === 0) return
    const sorted = [...this.stacks, ...fresh].sort((a, b) => this.compare(a.score, b.score))
    this.stacks = sorted.slice(0, this.kept)
  }
}

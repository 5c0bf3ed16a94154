import type { Score } from '../../target/index.js'
import type { Found, SearchProblem } from '../types.js'

/** The first stacks of the order that a complete search finds exactly. */
export const mostKept = 256

/**
 * The first 256 distinct stacks of the order among those offered, and the bound that a further one must not exceed. It never loosens:
 * a start bound, where given, is the 256th of stacks that exist, so that whatever comes after it is not among the first 256.
 */
export class BestStacks {
  private readonly stacks: Found[] = []
  private readonly ids = new Set<string>()
  private limit: number

  constructor(
    private readonly problem: Pick<SearchProblem, 'compare' | 'reach'>,
    private readonly start: Score | null,
  ) {
    this.limit = start === null ? Number.POSITIVE_INFINITY : problem.reach(start)
  }

  /** The largest bound that a stack may have which could still be among the first; never cut on equality. */
  get reach(): number {
    return this.limit
  }

  /** Takes a stack in where it belongs, under the assignment that it is listed by. */
  offer(assignment: Int32Array, score: Score): void {
    const { problem, stacks, start } = this
    if (start !== null && problem.compare(score, start) > 0) return
    if (stacks.length === mostKept && problem.compare(score, stacks[mostKept - 1].score) >= 0) return
    if (this.ids.has(score.id)) return
    let low = 0
    let high = stacks.length
    while (low < high) {
      const middle = (low + high) >> 1
      if (problem.compare(stacks[middle].score, score) <= 0) low = middle + 1
      else high = middle
    }
    const { met, merit, margin, totalNm, id } = score
    stacks.splice(low, 0, { assignment: [...assignment], score: { met, merit, margin, totalNm, id } })
    this.ids.add(id)
    if (stacks.length > mostKept) this.ids.delete(stacks.pop()!.score.id)
    if (stacks.length === mostKept) this.limit = Math.min(this.limit, problem.reach(stacks[mostKept - 1].score))
  }

  /** The best first. */
  get found(): readonly Found[] {
    return this.stacks
  }
}

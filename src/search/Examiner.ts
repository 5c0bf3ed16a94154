import type { Score } from '../target/index.js'
import { PricedMoves, pricedChain } from './PricedMoves.js'
import type { Found, SearchProblem } from './types.js'

/** A stack with its score. */
export interface Reached {
  readonly stack: Int32Array
  readonly score: Score
}

/** The most stacks that a unit leaves. */
const mostFound = 64

/**
 * Looks at stacks once each, the bound first, and keeps the account of a unit: what each cost against its budget, what was looked at
 * and what the bound cut. Costs are counted in bounds, never timed.
 */
export class Examiner {
  private readonly bounds = new Map<string, { readonly assignment: Int32Array; readonly bound: number }>()
  private readonly scores = new Map<string, Score>()
  private spent = 0
  private moves: PricedMoves | null = null

  constructor(
    readonly problem: SearchProblem,
    private readonly budget: number,
  ) {}

  get exhausted(): boolean {
    return this.spent >= this.budget
  }

  /** Takes an account of work that is not a stack's: so many bounds' worth. */
  charge(cost: number): void {
    this.spent += cost
  }

  bound(assignment: Int32Array): number {
    const key = assignment.join()
    const known = this.bounds.get(key)
    if (known) return known.bound
    this.spent++
    const bound = this.problem.bound(assignment)
    this.bounds.set(key, { assignment: Int32Array.from(assignment), bound })
    return bound
  }

  score(assignment: Int32Array): Score {
    const key = assignment.join()
    const known = this.scores.get(key)
    if (known) return known
    this.bound(assignment)
    this.spent += scoreCost
    const score = this.problem.score(assignment)
    this.scores.set(key, score)
    return score
  }

  /** The score of a stack that comes before `than`; null when it does not. Only stacks within reach pay for the whole score. */
  better(assignment: Int32Array, than: Score): Score | null {
    if (this.bound(assignment) > this.problem.reach(than)) return null
    const score = this.score(assignment)
    return this.problem.compare(score, than) < 0 ? score : null
  }

  /** Whether the neighbours of a stack can be priced: a chain says what its points add, and its points what it lacks. */
  priced({ score }: Reached): boolean {
    return score.merit > 0 && pricedChain(this.problem) !== null
  }

  /** The feasible stacks with so many places moved whose points leave them within reach of one, at most `most`, the best first. */
  pricedMoves({ stack, score }: Reached, together: number, most: number): Int32Array[] {
    const { problem } = this
    const chain = pricedChain(problem)!
    this.moves ??= new PricedMoves(chain, problem.places, stack)
    const reach = problem.reach(score)
    const before = this.moves.prices
    const moves = this.moves.below(stack, together, reach * reach, most)
    this.charge((priceCost * (this.moves.prices - before)) / chain.points.length)
    return moves.map((move) => move.stack).filter((moved) => problem.feasible(moved))
  }

  /** What a global phase goes by. */
  guide(assignment: Int32Array): number {
    return this.problem.boundGuides ? this.bound(assignment) : this.score(assignment).merit
  }

  /** The best of some stacks; only the most promising by bound, in their order where equal, pay for the whole score. */
  best(assignments: readonly Int32Array[]): Reached {
    const bounds = assignments.map((assignment) => ({ assignment, bound: this.bound(assignment) }))
    const promising = bounds.sort((a, b) => a.bound - b.bound).slice(0, mostCompared)
    return promising
      .map(({ assignment }) => ({ stack: assignment, score: this.score(assignment) }))
      .reduce((best, one) => (this.problem.compare(one.score, best.score) < 0 ? one : best))
  }

  /** The best stacks, as listed and each once: those scored, and the most promising of those only bounded, now scored too. */
  found(): Found[] {
    const bounded = [...this.bounds.values()].sort((a, b) => a.bound - b.bound).slice(0, mostFound)
    for (const { assignment } of bounded) this.score(assignment)
    const listed = new Map<string, Found>()
    for (const key of [...this.scores.keys()]) {
      const assignment = this.problem.canonical(this.bounds.get(key)!.assignment)
      const score = this.score(assignment)
      listed.set(assignment.join(), { assignment: [...assignment], score })
    }
    const best = [...listed.values()].sort((a, b) => this.problem.compare(a.score, b.score))
    const distinct: Found[] = []
    for (const { assignment, score } of best) {
      const { met, merit, margin, totalNm, id } = score
      if (!distinct.some((other) => other.score.id === id)) {
        distinct.push({ assignment, score: { met, merit, margin, totalNm, id } })
      }
      if (distinct.length === mostFound) break
    }
    return distinct
  }

  get account(): { readonly examined: number; readonly cut: number } {
    return { examined: this.scores.size, cut: this.bounds.size - this.scores.size }
  }
}

/** Stacks of which `best` asks the whole score. */
const mostCompared = 6

/** A price at all points in bounds. */
const priceCost = 1.5

/** A whole merit in bounds: extremes and resonances cost five to ten times the points. */
const scoreCost = 8

import type { Score } from '../../target/index.js'
import { LowDiscrepancy } from '../lowDiscrepancy.js'
import { neighbours } from '../neighbours.js'
import { PricedMoves, pricedChain } from '../PricedMoves.js'
import { runUnit } from '../runUnit.js'
import type { Found, SearchProblem } from '../types.js'
import { BestStacks, mostKept } from './BestStacks.js'
import type { CompletePlan } from './types.js'

/**
 * The round before the slices: good stacks, at most 256, the best first. Where the lattice is large a few sampled units find the best
 * basins; then the neighbourhoods of the best are looked at, the best first: by price, one, two and three places moved, as long as that
 * tightens the 256th; else until those of the first 256 are known or the budget is spent. Depends on problem, plan and seed alone.
 */
export function firstRound(problem: SearchProblem, plan: CompletePlan, seed: Uint32Array | string): readonly Found[] {
  const best = new BestStacks(problem, null)
  const seen = new Set<string>()
  const look = (assignment: Int32Array): void => {
    const listed = problem.canonical(assignment)
    const key = listed.join()
    if (seen.has(key)) return
    seen.add(key)
    if (problem.bound(listed) <= best.reach) best.offer(listed, problem.score(listed))
  }
  const sequence = new LowDiscrepancy(problem.places.length, seed)
  for (let i = 0; i < draws; i++) {
    look(
      problem.repair(Int32Array.from(sequence.point(i), (value, d) => Math.floor(value * problem.places[d].choices))),
    )
  }
  const { units, cost } = plan.assignments > veryMany ? ample : plan.assignments > many ? short : none
  for (let unit = 0; unit < units; unit++) {
    for (const { assignment } of runUnit(problem, unit, seed, cost).found) look(Int32Array.from(assignment))
  }
  const chain = pricedChain(problem)
  if (chain === null) spread((stack) => neighbours(problem, stack, mostNeighbours), budget)
  else {
    const moves = new PricedMoves(chain, problem.places, Int32Array.from(best.found[0].assignment))
    for (const together of [1, 2, 3]) {
      const end = moves.prices + Math.min(mostPrices, 4 * plan.assignments)
      const around = (stack: Int32Array) =>
        moves.prices > end
          ? []
          : moves.below(stack, together, best.reach * best.reach, mostKept).map((move) => move.stack)
      spread((stack) => around(stack).filter(problem.feasible), mostVain)
    }
  }
  return best.found

  /** Looks around the best stacks, the best first, until none is left, the budget is spent, or so many in a row tighten nothing. */
  function spread(around: (stack: Int32Array) => Iterable<Int32Array>, most: number): void {
    const done = new Set<string>()
    let vain = 0
    while (seen.size < budget && vain < most) {
      const next = best.found.find(({ score }) => !done.has(score.id))
      if (!next) break
      done.add(next.score.id)
      const { reach } = best
      for (const near of around(Int32Array.from(next.assignment))) look(near)
      vain = best.reach < reach || best.found.length < mostKept ? 0 : vain + 1
    }
  }
}

/** The 256th of a round, from which the slices start; null when there are fewer. */
export function startBoundOf(round: readonly Found[]): Score | null {
  return round.length < mostKept ? null : round[mostKept - 1].score
}

const draws = 512

/** Sampled units, and what each may cost in bounds, by the assignments that there are. */
const many = 1e6
const veryMany = 1e9
const none = { units: 0, cost: 0 }
const short = { units: 1, cost: 3_000 }
const ample = { units: 4, cost: 12_000 }

/** Priced neighbourhoods in a row that tighten nothing. */
const mostVain = 12

/** Of each kind of neighbours: a quarter of a second's. */
const mostPrices = 2_000_000

/** Looks at distinct stacks. */
const budget = 8192

/** Of each kind: one place moved, two, three. */
const mostNeighbours = 40

import type { Score } from '../../target/index.js'
import { LowDiscrepancy } from '../lowDiscrepancy.js'
import { neighbours } from '../neighbours.js'
import { runUnit } from '../runUnit.js'
import type { Found, SearchProblem } from '../types.js'
import { BestStacks, mostKept } from './BestStacks.js'
import type { CompletePlan } from './types.js'

/**
 * The round before the slices: good stacks, at most 256, the best first. Where the lattice is large a few sampled units find the best
 * basins; then the neighbourhoods of the best are looked at, the best first, until those of the first 256 are known or the budget is
 * spent. Depends on problem, plan and seed alone.
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
  const units = plan.assignments > manyStacks ? sampledUnits : 0
  for (let unit = 0; unit < units; unit++) {
    for (const { assignment } of runUnit(problem, unit, seed).found) look(Int32Array.from(assignment))
  }
  const spread = new Set<string>()
  while (seen.size < budget) {
    const next = best.found.find(({ score }) => !spread.has(score.id))
    if (!next) break
    spread.add(next.score.id)
    for (const near of neighbours(problem, Int32Array.from(next.assignment), mostNeighbours)) look(near)
  }
  return best.found
}

/** The 256th of a round, from which the slices start; null when there are fewer. */
export function startBoundOf(round: readonly Found[]): Score | null {
  return round.length < mostKept ? null : round[mostKept - 1].score
}

const draws = 512
const manyStacks = 1e6
const sampledUnits = 4

/** Looks at distinct stacks. */
const budget = 8192

/** Of each kind: one place moved, two, three. */
const mostNeighbours = 40

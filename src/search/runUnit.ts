import { randomStream } from '../growth/index.js'
import { corners } from './corners.js'
import { descend, fitCost, type Reached } from './descend.js'
import { Examiner } from './Examiner.js'
import { leastSquares } from './leastSquares.js'
import { LowDiscrepancy } from './lowDiscrepancy.js'
import { evolve } from './population.js'
import type { SearchProblem, UnitResult } from './types.js'

/** The numbers of a unit: populations, evaluations of a fit, corners, all in one budget counted in bounds. */
const population = 24
const generations = 6
const fitEvaluations = 30
const refitEvaluations = 12
const mostCorners = 48
const budget = 12_000

/**
 * One independent start of the sampled method (design 7.2): the best of a short evolution from low-discrepancy points, a fit of the
 * continuous widths, compositions and numbers, the corners around it, descent on the lattice; then every other choice of each
 * unordered list, with a fit of its own, until none helps. The result depends on the problem, the seed and the unit's number alone.
 */
export function runUnit(problem: SearchProblem, unit: number, seed: Uint32Array | string): UnitResult {
  const examiner = new Examiner(problem, budget)
  const sequence = new LowDiscrepancy(problem.places.length, seed)
  const start = evolve(examiner, sequence, unit, randomStream(seed, 'unit', unit), population, generations)
  let here = descend(examiner, refined(examiner, start, fitEvaluations))
  for (let next: Reached | null = here; next !== null; ) {
    here = next
    next = otherList(examiner, here)
  }
  const { exhausted } = examiner
  const found = examiner.found()
  return { unit, found, ...examiner.account, stop: exhausted ? 'budget of evaluations' : 'no move helps' }
}

/** The best by bound among a stack and the corners around a fit from it. */
function refined(examiner: Examiner, stack: Int32Array, evaluations: number): Int32Array {
  const { problem } = examiner
  const relaxed = problem.relax(stack)
  if (relaxed.start.length === 0 || relaxed.residuals < 2) return stack
  const fitted = leastSquares(relaxed, relaxed.start, evaluations)
  examiner.charge(fitCost * fitted.evaluations)
  const around = corners(problem.places, relaxed, fitted, stack, mostCorners).filter((corner) =>
    problem.feasible(corner),
  )
  return examiner.leastBound([stack, relaxed.snap(fitted.variables), ...around])!
}

/** The first stack that helps with another choice of an unordered list, everything ordered fitted anew and descended from there. */
function otherList(examiner: Examiner, here: Reached): Reached | null {
  const { problem } = examiner
  for (let place = 0; place < problem.places.length; place++) {
    const { choices, ordered } = problem.places[place]
    if (ordered) continue
    for (let choice = 0; choice < choices; choice++) {
      if (examiner.exhausted) return null
      if (choice === here.stack[place]) continue
      const other = Int32Array.from(here.stack)
      other[place] = choice
      const repaired = problem.repair(other)
      const reached = descend(examiner, refined(examiner, repaired, refitEvaluations))
      if (problem.compare(reached.score, here.score) < 0) return reached
    }
  }
  return null
}

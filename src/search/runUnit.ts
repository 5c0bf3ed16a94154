import { type RandomStream, randomStream } from '../growth/index.js'
import { corners } from './corners.js'
import { descend, fitCost } from './descend.js'
import { Examiner, type Reached } from './Examiner.js'
import { leastSquares } from './leastSquares.js'
import { LowDiscrepancy } from './lowDiscrepancy.js'
import { evolve } from './population.js'
import type { SearchProblem, UnitResult } from './types.js'

/** What a unit may cost, in bounds; a fit of a start and of a kicked stack, in evaluations of residuals and Jacobian. */
const budget = 12_000
const fitEvaluations = 30
const refitEvaluations = 12
/** Members of the population that are fitted. */
const fitted = 6
const mostCorners = 48
const kicks = 6
/** Where moves are priced: kicks in vain, one after the other, that end a unit. */
const kicksInVain = 32

/**
 * One independent start of the sampled method (design 7.2): the best of a short evolution from low-discrepancy points, each fitted in
 * its continuous widths, compositions and numbers and taken to the best corner around the fit; the best of them descends on the
 * lattice. Then the basins around: other choices of each unordered list, another structure where the slope speaks for one, and kicks:
 * where moves are priced, kicks of up to five places that descend at once, as long as some help; else a few of up to three, each with
 * a fit of its own. The result depends on the problem, the seed and the unit's number alone; `seed` is the same for all units of a
 * search. `cost`: what it may cost, in bounds.
 */
export function runUnit(problem: SearchProblem, unit: number, seed: Uint32Array | string, cost = budget): UnitResult {
  const examiner = new Examiner(problem, cost)
  const stream = randomStream(seed, 'unit', unit)
  const members = distinct(evolve(examiner, new LowDiscrepancy(problem.places.length, seed), unit, stream))
  const starts = members.slice(0, fitted).map((member) => {
    const start = refined(examiner, member, fitEvaluations)
    return examiner.priced(start) ? descend(examiner, start, 1) : start
  })
  const first = starts.reduce((best, one) => (problem.compare(one.score, best.score) < 0 ? one : best))
  const listed = chooseLists(examiner, descend(examiner, first))
  kicked(examiner, restructure(examiner, listed), stream)
  const found = examiner.found()
  const stop = examiner.exhausted ? 'budget of evaluations' : 'no move helps'
  return { unit, found, ...examiner.account, stop }
}

function distinct(stacks: readonly Int32Array[]): Int32Array[] {
  return [...new Map(stacks.map((stack) => [stack.join(), stack])).values()]
}

/** The best among a stack and the corners around a fit from it. */
function refined(examiner: Examiner, stack: Int32Array, evaluations: number): Reached {
  const { problem } = examiner
  const relaxed = problem.relax(stack)
  // The library under the fit takes no fewer than two residuals.
  if (relaxed.start.length === 0 || relaxed.residuals < 2) return examiner.best([stack])
  const fit = leastSquares(relaxed, relaxed.start, evaluations)
  examiner.charge(fitCost * fit.evaluations)
  const around = corners(problem.places, relaxed, fit, stack, mostCorners).filter((corner) => problem.feasible(corner))
  return examiner.best([relaxed.snap(fit.variables), ...around, stack])
}

/** Tries every other choice of each unordered list until none helps. */
function chooseLists(examiner: Examiner, from: Reached): Reached {
  const { places } = examiner.problem
  let here = from
  let helped = true
  while (helped) {
    helped = false
    for (let place = 0; place < places.length; place++) {
      for (let choice = 0; choice < places[place].choices && !places[place].ordered; choice++) {
        if (choice === here.stack[place] || examiner.exhausted) continue
        const other = Int32Array.from(here.stack)
        other[place] = choice
        const reached = settled(examiner, other, here)
        helped ||= reached !== here
        here = reached
      }
    }
  }
  return here
}

/** Takes on another structure as long as one of the most promising comes out better after a fit. */
function restructure(examiner: Examiner, from: Reached): Reached {
  const { problem } = examiner
  let here = from
  for (let round = 0; round < mostRestructured && problem.restructured; round++) {
    const before = here
    for (const other of problem.restructured(here.stack).slice(0, promising)) {
      if (examiner.exhausted) return here
      here = settled(examiner, other, here, fitEvaluations)
      if (here !== before) break
    }
    if (here === before) break
  }
  return here
}

/** Other structures that are tried before a stack counts as settled, and how often one may be taken on. */
const promising = 8
const mostRestructured = 12

function kicked(examiner: Examiner, from: Reached, stream: RandomStream): Reached {
  const { problem } = examiner
  const { places } = problem
  let here = from
  let vain = 0
  for (let kick = 0; !examiner.exhausted && places.length > 0; kick++) {
    const priced = examiner.priced(here)
    if (priced ? vain === kicksInVain : kick >= kicks) break
    const other = Int32Array.from(here.stack)
    for (let moves = 1 + stream.integer(priced ? mostPlaces.priced : mostPlaces.fitted); moves > 0; moves--) {
      const place = stream.integer(places.length)
      const { choices, ordered } = places[place]
      const by = (1 + stream.integer(farthestKick)) * (stream.integer(2) === 0 ? -1 : 1)
      other[place] = ordered ? Math.min(Math.max(other[place] + by, 0), choices - 1) : stream.integer(choices)
    }
    const reached = priced
      ? better(examiner, descendFrom(examiner, problem.repair(other)), here)
      : settled(examiner, other, here)
    vain = reached === here ? vain + 1 : 0
    here = reached
  }
  return here
}

/** Places that a kick moves at most. */
const mostPlaces = { priced: 5, fitted: 3 }
const farthestKick = 6

/** Where a changed stack settles after a fit and, if it comes near, a descent; `here` where that is no better. */
function settled(examiner: Examiner, changed: Int32Array, here: Reached, evaluations = refitEvaluations): Reached {
  const { problem } = examiner
  const start = refined(examiner, problem.repair(changed), evaluations)
  if (examiner.bound(start.stack) / near > problem.reach(here.score)) return here
  return better(examiner, descend(examiner, start), here)
}

function descendFrom(examiner: Examiner, stack: Int32Array): Reached {
  return descend(examiner, { stack, score: examiner.score(stack) })
}

function better({ problem }: Examiner, reached: Reached, here: Reached): Reached {
  return problem.compare(reached.score, here.score) < 0 ? reached : here
}

/** A start with a bound this many times the merit to beat may still descend below it. */
const near = 3

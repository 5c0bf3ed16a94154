import { LowDiscrepancy } from '../lowDiscrepancy.js'
import type { SearchProblem } from '../types.js'
import { assignmentsOf } from './everyStack.js'
import { type Split, splitChain } from './splitChain.js'
import { mostMet, tooManyMet } from './TooManyMet.js'
import type { CompletePlan, Refusal } from './types.js'

/** How a complete search of the problem goes, or why there is none. The same for the same problem, on any machine. */
export function planComplete(problem: SearchProblem): CompletePlan | Refusal {
  const assignments = assignmentsOf(problem)
  const stacks = problem.stackCount()
  const halves = splitOf(problem)
  const [most, one] = halves ? [mostPaired, 'in pairs of halves'] : [mostEnumerated, 'one by one']
  if (assignments > most) {
    return {
      refused:
        `The lattice holds ${assignments} assignments, and stacks of this structure are looked at ${one}, at most ${most} of ` +
        'them. Narrow the ranges, or write "method: sampled".',
    }
  }
  const met = stacks > mostMet ? stacks * shareMet(problem) : 0
  if (met > mostMet) return { refused: tooManyMet(`About ${Number(met.toPrecision(1))}`) }
  return {
    method: halves ? 'halves' : 'every stack',
    stacks,
    assignments,
    slices: halves ? slicesOfHalves(halves) : Math.ceil(assignments / stacksOfSlice),
    cost: stacks * problem.points,
    statement: `exhaustive, rounding margin ${roundingMargin}`,
  }
}

/** The cut of a problem whose stacks are searched as pairs of halves; null where they are not. */
export function splitOf(problem: SearchProblem): Split | null {
  const chain = problem.chain()
  return chain && splitChain(chain, problem.places)
}

function slicesOfHalves({ commons, sliced, held }: Split): number {
  const rows = commons * sliced.size
  const forThreads = Math.min(leastSlices, Math.ceil((rows * held.size) / pairsOfSlice))
  return Math.max(Math.ceil(rows / rowsOfSlice), Math.min(rows, forThreads))
}

/** Sliced halves of a slice: their tables take some dozen megabytes. */
const rowsOfSlice = 65_536

/** Large searches have so many slices for threads to share; small ones one for so many pairs. */
const leastSlices = 32
const pairsOfSlice = 2_000_000

/** Relative; the margins of `reach` are ten times this. */
const roundingMargin = 1e-9

/** Assignments of a slice where each is built: a few seconds of work at most. */
const stacksOfSlice = 32_768

/** Some weeks of work. */
const mostEnumerated = 1e11
const mostPaired = 1e15

/** The least share of the stacks that meets all limits, by a sample: two standard deviations below what it shows. */
function shareMet(problem: SearchProblem): number {
  const sequence = new LowDiscrepancy(problem.places.length, 'share met')
  let met = 0
  for (let i = 0; i < samples; i++) {
    const choices = Int32Array.from(sequence.point(i), (value, d) => Math.floor(value * problem.places[d].choices))
    const stack = problem.repair(choices)
    if (problem.bound(stack) > nothing) continue
    const score = problem.score(stack)
    if (score.met && score.merit <= nothing) met++
  }
  return Math.max(0, met - 2 * Math.sqrt(met)) / samples
}

const samples = 1024

/** Merits that count as met (design 3), with room for rounding. */
const nothing = 2e-9

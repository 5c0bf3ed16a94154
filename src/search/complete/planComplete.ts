import { LowDiscrepancy } from '../lowDiscrepancy.js'
import type { SearchProblem } from '../types.js'
import { assignmentsOf } from './everyStack.js'
import { mostMet, tooManyMet } from './TooManyMet.js'
import type { CompletePlan, Refusal } from './types.js'

/** How a complete search of the problem goes, or why there is none. The same for the same problem, on any machine. */
export function planComplete(problem: SearchProblem): CompletePlan | Refusal {
  const assignments = assignmentsOf(problem)
  const stacks = problem.stackCount()
  if (assignments > mostEnumerated) {
    return {
      refused:
        `The lattice holds ${assignments} assignments, and stacks of this structure are looked at one by one, at most ` +
        `${mostEnumerated} of them. Narrow the ranges, or write "method: sampled".`,
    }
  }
  const met = stacks > mostMet ? stacks * shareMet(problem) : 0
  if (met > mostMet) return { refused: tooManyMet(`About ${Number(met.toPrecision(1))}`) }
  return {
    method: 'every stack',
    stacks,
    assignments,
    slices: Math.max(1, Math.ceil(assignments / perSlice)),
    cost: stacks * problem.points,
    statement: `exhaustive, rounding margin ${roundingMargin}`,
  }
}

/** Relative; the margins of `reach` are ten times this. */
const roundingMargin = 1e-9

/** Assignments of a slice: a few seconds of work at most. */
const perSlice = 32_768

/** Some weeks of work. */
const mostEnumerated = 1e11

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

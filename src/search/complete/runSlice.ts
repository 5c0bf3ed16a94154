import type { Score } from '../../target/index.js'
import type { SearchProblem } from '../types.js'
import { BestStacks } from './BestStacks.js'
import { everyStack } from './everyStack.js'
import { HalvesSearch } from './HalvesSearch.js'
import { HalvesSlice } from './HalvesSlice.js'
import { splitOf } from './planComplete.js'
import { mostMet, TooManyMet } from './TooManyMet.js'
import type { CompletePlan, SliceResult } from './types.js'

/**
 * One slice of a complete search: the first 256 stacks of the order among its own, none behind `startBound`, the 256th of stacks
 * found before (null: there are fewer). The same for the same arguments always: the bound tightens by the slice's own finds only.
 * Throws TooManyMet.
 */
export function runSlice(
  problem: SearchProblem,
  plan: CompletePlan,
  slice: number,
  startBound: Score | null,
): SliceResult {
  if (plan.method === 'halves') return new HalvesSlice(searchOf(problem, startBound), startBound).run(plan, slice)
  const best = new BestStacks(problem, startBound)
  let examined = 0
  let met = 0
  let cut = 0
  const from = Math.floor((plan.assignments / plan.slices) * slice)
  const to = slice + 1 === plan.slices ? plan.assignments : Math.floor((plan.assignments / plan.slices) * (slice + 1))
  for (const assignment of everyStack(problem, from, to)) {
    if (problem.bound(assignment) > best.reach) {
      cut++
      continue
    }
    // The listed image of a stack has its own turn.
    if (problem.canonical(assignment) !== assignment) continue
    const score = problem.score(assignment)
    examined++
    if (score.met && ++met > mostMet) throw new TooManyMet(met)
    best.offer(assignment, score)
  }
  return { slice, found: best.found, examined, cut: { 'point terms': cut } }
}

/** What the slices of a search by halves share is made once for a problem and a start bound. */
const searches = new WeakMap<SearchProblem, { readonly id: string | null; readonly search: HalvesSearch }>()

function searchOf(problem: SearchProblem, startBound: Score | null): HalvesSearch {
  const id = startBound && JSON.stringify(startBound)
  const known = searches.get(problem)
  if (known?.id === id) return known.search
  const search = new HalvesSearch(problem, problem.chain()!, splitOf(problem)!, startBound)
  searches.set(problem, { id, search })
  return search
}

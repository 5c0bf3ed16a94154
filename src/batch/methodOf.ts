import type { SearchSpec } from '../job/index.js'
import { type CompletePlan, planComplete, type SearchProblem } from '../search/index.js'
import { RunError } from './RunError.js'

/** How a job is searched; null plan: by independent starts. */
export interface Method {
  readonly plan: CompletePlan | null
  /** Independent units of work. */
  readonly units: number
}

/** Effort is counted, never timed: independent units of the sampled method. */
const sampledUnits: Readonly<Record<SearchSpec['effort'], number>> = { brief: 64, standard: 1024, overnight: 16384 }

/**
 * What an effort lets `auto` search completely: stacks times points, and the stacks that must be looked at one by one. The first is the
 * contract's; the second keeps a night a night where stacks can't be taken as pairs of halves, at some 20 us a stack.
 */
const completeUpTo: Readonly<Record<SearchSpec['effort'], { readonly cost: number; readonly stacks: number }>> = {
  brief: { cost: 1e8, stacks: 1e6 },
  standard: { cost: 1e12, stacks: 3e8 },
  overnight: { cost: 1e14, stacks: 3e9 },
}

/** A stack without point terms needs its whole merit: as much as so many bounds. */
const wholeMerit = 15

/**
 * The method that a job asks for; `auto` is complete where its effort allows it.
 *
 * @throws RunError for a complete search that can't be had, with the number that forbids it
 */
export function methodOf({ method, effort }: SearchSpec, problem: SearchProblem): Method {
  const sampled = { plan: null, units: sampledUnits[effort] }
  if (method === 'sampled') return sampled
  const plan = planComplete(problem)
  if ('refused' in plan) {
    if (method === 'complete') throw new RunError(plan.refused)
    return sampled
  }
  const { cost, stacks } = completeUpTo[effort]
  const each = problem.points > 0 ? 1 : wholeMerit
  const fits = plan.cost <= cost && (plan.method !== 'every stack' || plan.assignments * each <= stacks)
  return method === 'complete' || fits ? { plan, units: plan.slices } : sampled
}

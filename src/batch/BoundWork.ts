import { type Yield, yieldOf } from '../growth/index.js'
import type { Job } from '../job/index.js'
import {
  type CompletePlan,
  type Found,
  firstRound,
  planComplete,
  runSlice,
  runUnit,
  type SliceResult,
  type UnitResult,
} from '../search/index.js'
import type { Score } from '../target/index.js'
import { searchSeed } from './hashes.js'
import { type BoundJob, problemOf } from './problem.js'

/** One piece of work for a worker: a unit, the first round or a slice of a complete search, the yield of a stack. */
export type Task =
  | { readonly unit: number }
  | { readonly round: true }
  | { readonly slice: number; readonly startBound: Score | null }
  | { readonly grow: readonly number[]; readonly trials: number }

export type TaskResult = UnitResult | readonly Found[] | SliceResult | Yield

/** What a worker gives back, with the seconds that it took. */
export type Done<T> = { readonly result: T; readonly seconds: number }

/** A job ready for work: what it gives for a task depends on the job and the task alone. */
export class BoundWork {
  private readonly bound: BoundJob
  private readonly seed: string
  private knownPlan: CompletePlan | null = null

  constructor(private readonly job: Job) {
    this.bound = problemOf(job)
    this.seed = searchSeed(job)
  }

  do(task: Task): TaskResult {
    const { problem } = this.bound
    if ('unit' in task) return runUnit(problem, task.unit, this.seed)
    if ('round' in task) return firstRound(problem, this.plan, this.seed)
    if ('slice' in task) return runSlice(problem, this.plan, task.slice, task.startBound)
    return this.grow(task.grow, task.trials)
  }

  private get plan(): CompletePlan {
    if (this.knownPlan === null) {
      const plan = planComplete(this.bound.problem)
      if ('refused' in plan) throw new RangeError(plan.refused)
      this.knownPlan = plan
    }
    return this.knownPlan
  }

  private grow(assignment: readonly number[], trials: number): Yield {
    const { design, accepted: target } = this.bound
    const { situations } = design
    const { growth } = this.job
    const layers = design.layers(Int32Array.from(assignment))
    return yieldOf({ layers, situations, growth, target, trials, seed: this.seed })
  }
}

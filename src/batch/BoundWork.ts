import { type Yield, yieldOf } from '../growth/index.js'
import type { Job } from '../job/index.js'
import { runUnit, type UnitResult } from '../search/index.js'
import { searchSeed } from './hashes.js'
import { type BoundJob, problemOf } from './problem.js'

/** One piece of work for a worker. */
export type Task = { readonly unit: number } | { readonly grow: readonly number[]; readonly trials: number }

/** What a worker gives back, with the seconds that it took. */
export type Done<T> = { readonly result: T; readonly seconds: number }

/** A job ready for work: what it gives for a task depends on the job and the task alone. */
export class BoundWork {
  private readonly bound: BoundJob
  private readonly seed: string

  constructor(private readonly job: Job) {
    this.bound = problemOf(job)
    this.seed = searchSeed(job)
  }

  do(task: Task): UnitResult | Yield {
    return 'unit' in task ? this.unit(task.unit) : this.grow(task.grow, task.trials)
  }

  private unit(unit: number): UnitResult {
    return runUnit(this.bound.problem, unit, this.seed)
  }

  private grow(assignment: readonly number[], trials: number): Yield {
    const { design, accepted: target } = this.bound
    const { situations } = design
    const { growth } = this.job
    const layers = design.layers(Int32Array.from(assignment))
    return yieldOf({ layers, situations, growth, target, trials, seed: this.seed })
  }
}

import { sheetOf } from '../growth/index.js'
import type { Job } from '../job/index.js'
import { runUnit } from '../search/index.js'
import type { BoundJob } from './problem.js'

/** What one unit of work already says of a job. */
export interface FirstLook {
  readonly stack: string
  readonly merit: number
  readonly meets: boolean
  /** The layer of which one more monolayer (or step) moves the first peak most, and by how much (eV); null without a peak. */
  readonly mostSensitive: { readonly layer: string; readonly shiftEv: number } | null
}

/** The best stack of one unit, and how a monolayer more of each of its layers moves its peak. */
export function firstLook(job: Job, { problem, design, target }: BoundJob): FirstLook {
  const [best] = runUnit(problem, 0, 'first look').found
  const assignment = Int32Array.from(best.assignment)
  const layers = design.layers(assignment)
  const systems = design.systems(assignment)
  const evaluation = target.evaluate(systems)
  const limits = target.limits(systems, evaluation)
  const { rows } = sheetOf({
    layers,
    situation: design.situations[evaluation.peakCondition],
    growth: job.growth,
    target,
    evaluation,
    limits,
  })
  let mostSensitive: FirstLook['mostSensitive'] = null
  rows.forEach(({ shiftEv }, j) => {
    if (shiftEv === null || Math.abs(shiftEv) <= Math.abs(mostSensitive?.shiftEv ?? 0)) return
    mostSensitive = { layer: layers[j].id, shiftEv }
  })
  return { stack: design.text(assignment), merit: best.score.merit, meets: best.score.met, mostSensitive }
}

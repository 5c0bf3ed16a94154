import type { GrownLayer } from '../design/index.js'
import type { Job } from '../job/index.js'
import { buildSystem } from '../model/index.js'
import type { Evaluation } from '../target/index.js'
import type { BoundJob } from './problem.js'

/** How far the slices of a biased stack are from the tilted edge that they stand for: what twice as many would change. */
export function sliceNotes(
  job: Job,
  { design, target }: Pick<BoundJob, 'design' | 'target'>,
  layers: readonly GrownLayer[],
  { merit, demands }: Evaluation,
): string[] {
  if (job.conditions.every(({ biasV }) => biasV === 0)) return []
  const finer = layers.map((layer) => ({ ...layer, slices: 2 * layer.slices }))
  const twice = target.evaluate(design.situations.map((situation) => buildSystem(situation, finer)))
  const merits = `the merit changes by ${digits(twice.merit - merit)}`
  const shifts = demands.flatMap(({ peak }, d) => {
    const other = twice.demands[d].peak
    return peak && other ? [Math.abs(other.energyEv - peak.energyEv)] : []
  })
  const peaks = shifts.length > 0 ? ` and a peak by at most ${digits(1000 * Math.max(...shifts))} meV` : ''
  return [`With twice as many slices under bias ${merits}${peaks}.`]
}

function digits(value: number): string {
  return String(Number(value.toPrecision(2)))
}

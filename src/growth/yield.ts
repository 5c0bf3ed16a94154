import type { GrownLayer } from '../design/index.js'
import type { GrowthSpec } from '../job/index.js'
import { buildSystem, type Situation } from '../model/index.js'
import type { Target } from '../target/index.js'
import { Trials } from './Trials.js'
import type { Yield } from './types.js'
import { wilson } from './wilson.js'

export interface YieldTask {
  /** From entry to exit. */
  readonly layers: readonly GrownLayer[]
  /** One a condition of the job. */
  readonly situations: readonly Situation[]
  readonly growth: Pick<GrowthSpec, 'startsAt' | 'sources' | 'spread'>
  readonly target: Pick<Target, 'meets'>
  readonly trials: number
  readonly seed: Uint32Array | string
}

/** The share of trials that meet every limit at every condition. Depends on the task alone; see Trials for what a trial draws. */
export function yieldOf({ layers, situations, growth, target, trials, seed }: YieldTask): Yield {
  const grown = new Trials(layers, growth, seed)
  let passed = 0
  let failures: number[] = []
  for (let k = 0; k < trials; k++) {
    const trial = grown.next()
    const met = target.meets(situations.map((situation) => buildSystem(situation, trial)))
    if (k === 0) failures = met.map(() => 0)
    met.forEach((one, d) => {
      if (!one) failures[d]++
    })
    if (met.every((one) => one)) passed++
  }
  const [low, high] = wilson(passed, trials)
  return { trials, passed, pct: (100 * passed) / trials, lowPct: 100 * low, highPct: 100 * high, failures }
}

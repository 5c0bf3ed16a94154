import type { Limit } from '../target/index.js'
import type { GrowthError } from './types.js'

/** No margin is larger. */
const largest = 99

/**
 * How many standard deviations of growth a stack that meets all limits has left: the least g / sqrt(sum (dg/dp)² sd_p²) over its
 * limits g and the independent errors p, to first order; capped at 99, rounded to 6 significant digits. Null without limits.
 */
export function marginOf(limits: readonly Limit[], errors: readonly GrowthError[]): number | null {
  if (limits.length === 0) return null
  let least = largest
  for (const limit of limits) least = Math.min(least, limitMargin(limit, errors))
  return Number(least.toPrecision(6))
}

/** The margin of one limit, neither capped nor rounded; 0 where no slack is left, Infinity where no error moves it. */
export function limitMargin({ slack, gradient }: Limit, errors: readonly GrowthError[]): number {
  if (slack <= 0) return 0
  let variance = 0
  for (const { sd, direction } of errors) {
    let slope = 0
    for (let k = 0; k < direction.length; k++) slope += gradient[k] * direction[k]
    variance += slope * sd * (slope * sd)
  }
  return slack / Math.sqrt(variance)
}

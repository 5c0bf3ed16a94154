import type { Judge } from './Judge.js'
import type { PointShare } from './types.js'

/** The shares of a demand's points in the merit squared, at each condition at which it holds. `weights`: of all demands. */
export function pointShares(
  { terms, weight }: Judge,
  conditions: readonly number[],
  weights: readonly number[],
): PointShare[] {
  if (!terms) return []
  const total = weights.reduce((sum, one) => sum + one, 0)
  const scale = weight / total / conditions.length
  return conditions.flatMap((condition) =>
    terms.energiesEv.map((energyEv, i) => ({
      condition,
      energyEv,
      square: (T: number) => scale * terms.share(i) * squareOf(terms.residual(i, T)),
      extreme: (T: number) => scale * squareOf(terms.extreme(i, T)),
      goal: terms.goal(i),
    })),
  )
}

function squareOf(residual: number): number {
  return residual * residual
}

import type { PointTerms } from './Judge.js'

/** Sum of share residual² over the points of a demand, T being that at all points of the target. */
export function meanSquare({ energiesEv, first, share, residual }: PointTerms, T: Float64Array): number {
  let sum = 0
  for (let i = 0; i < energiesEv.length; i++) {
    const r = residual(i, T[first + i])
    if (r !== 0) sum += share(i) * (r * r)
  }
  return sum
}

/** The least square that the extreme of a demand adds, by its points: it is at least as bad as the worst of them. */
export function leastExtremeSquare({ energiesEv, first, extreme }: PointTerms, T: Float64Array): number {
  let worst = 0
  for (let i = 0; i < energiesEv.length; i++) worst = Math.max(worst, extreme(i, T[first + i]))
  return worst * worst
}

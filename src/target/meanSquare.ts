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

import type { HalfList, VectorTable } from './HalfVectors.js'
import { bucketOf, type PointTables } from './PointTables.js'

/**
 * The bound of pairs of halves by the tabulated points: sums of what each adds, until they exceed what is missing. `sliced[k]` and
 * `held[k]` are the halves' tables at the k-th point.
 */
export class PairTest {
  /** Bounds above it are cut: the reach squared without what every stack adds. */
  limit = Number.POSITIVE_INFINITY

  constructor(
    private readonly points: readonly PointTables[],
    private readonly sliced: readonly VectorTable[],
    private readonly held: readonly VectorTable[],
  ) {}

  /** Whether the points from the `from`-th on, with `sum` of those before, leave the pair within the limit. */
  within(a: number, b: number, from: number, sum: number, worst: number): boolean {
    const { points, sliced, held, limit } = this
    for (let k = from; k < points.length; k++) {
      const { tooLow, tooHigh, lowExtreme, highExtreme } = points[k]
      const A = sliced[k]
      const B = held[k]
      const rest = A.d[a] * B.d[b] + A.e[a] * B.e[b]
      if (tooLow !== null) {
        const bucket = bucketOf(A.low[a] * B.low[b] + rest)
        sum += tooLow[bucket]
        if (lowExtreme !== null && lowExtreme[bucket] > worst) worst = lowExtreme[bucket]
      }
      if (tooHigh !== null) {
        const bucket = bucketOf(A.high[a] * B.high[b] + rest)
        sum += tooHigh[bucket]
        if (highExtreme !== null && highExtreme[bucket] > worst) worst = highExtreme[bucket]
      }
      if (sum + worst > limit) return false
    }
    return true
  }

  /** Calls `found` for every compatible pair within the limit; the first point, which cuts most, in a loop of its own. */
  everyPair(A: HalfList, B: HalfList, fits: Uint8Array, found: (a: number, b: number) => void): void {
    const [first] = this.points
    const [a0, b0] = [this.sliced[0], this.held[0]]
    const sets = B.labelSets.length
    for (let a = 0; a < A.count; a++) {
      const row = A.labelSet[a] * sets
      for (let b = 0; b < B.count; b++) {
        let sum = 0
        let worst = 0
        if (first !== undefined) {
          const rest = a0.d[a] * b0.d[b] + a0.e[a] * b0.e[b]
          if (first.tooLow !== null) {
            const bucket = bucketOf(a0.low[a] * b0.low[b] + rest)
            sum = first.tooLow[bucket]
            if (first.lowExtreme !== null) worst = first.lowExtreme[bucket]
          }
          if (first.tooHigh !== null) {
            const bucket = bucketOf(a0.high[a] * b0.high[b] + rest)
            sum += first.tooHigh[bucket]
            if (first.highExtreme !== null && first.highExtreme[bucket] > worst) worst = first.highExtreme[bucket]
          }
          if (sum + worst > this.limit) continue
        }
        if (fits[row + B.labelSet[b]] === 1 && this.within(a, b, 1, sum, worst)) found(a, b)
      }
    }
  }
}

import type { HalfList, VectorTable } from './HalfVectors.js'
import { bucketOf, type PointTables } from './PointTables.js'

/** The compatible pairs of two lists that no point has cut so far, with what the points add to each. */
export class RemainingPairs {
  count = 0
  /** Numbers in the lists; the first `count` entries. */
  readonly a: Int32Array
  readonly b: Int32Array
  private readonly sum: Float64Array
  private readonly worst: Float64Array

  constructor(A: HalfList, B: HalfList, fits: Uint8Array) {
    const size = A.count * B.count
    this.a = new Int32Array(size)
    this.b = new Int32Array(size)
    this.sum = new Float64Array(size)
    this.worst = new Float64Array(size)
    for (let a = 0; a < A.count; a++) {
      for (let b = 0; b < B.count; b++) {
        if (fits[A.labelSet[a] * B.labelSets.length + B.labelSet[b]] === 0) continue
        this.a[this.count] = a
        this.b[this.count++] = b
      }
    }
  }

  /** Adds a point, and drops the pairs that come above `limit`. */
  add({ tooLow, tooHigh, lowExtreme, highExtreme }: PointTables, A: VectorTable, B: VectorTable, limit: number): void {
    const { a, b, sum, worst } = this
    let left = 0
    for (let i = 0; i < this.count; i++) {
      const [one, other] = [a[i], b[i]]
      let total = sum[i]
      let extreme = worst[i]
      const rest = A.d[one] * B.d[other] + A.e[one] * B.e[other]
      if (tooLow !== null) {
        const bucket = bucketOf(A.low[one] * B.low[other] + rest)
        total += tooLow[bucket]
        if (lowExtreme !== null && lowExtreme[bucket] > extreme) extreme = lowExtreme[bucket]
      }
      if (tooHigh !== null) {
        const bucket = bucketOf(A.high[one] * B.high[other] + rest)
        total += tooHigh[bucket]
        if (highExtreme !== null && highExtreme[bucket] > extreme) extreme = highExtreme[bucket]
      }
      if (total + extreme > limit) continue
      a[left] = one
      b[left] = other
      sum[left] = total
      worst[left++] = extreme
    }
    this.count = left
  }
}

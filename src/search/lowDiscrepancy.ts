import { type RandomStream, randomStream } from '../growth/index.js'

/**
 * Points of a low-discrepancy sequence in the unit cube: Halton's (Numer. Math. 2, 84, 1960; from memory), every digit of every
 * coordinate permuted by the seed (so that the long bases of high dimensions do not run in step). Any point can be had without those
 * before it. Each coordinate of base b takes each of its b strata once in any b points that follow one another.
 */
export class LowDiscrepancy {
  private readonly bases: readonly number[]
  /** permutations[coordinate][digit][value]. */
  private readonly permutations: readonly Int32Array[][]

  constructor(
    readonly dimensions: number,
    seed: Uint32Array | string,
  ) {
    this.bases = primes(dimensions)
    this.permutations = this.bases.map((base, d) => {
      const stream = randomStream(seed, 'starts', d)
      return Array.from({ length: digitsOf(base) }, () => permutation(base, stream))
    })
  }

  /** Point `index` (below 2^32), coordinates in [0, 1). */
  point(index: number): Float64Array {
    return Float64Array.from(this.bases, (base, d) => {
      let rest = index
      let value = 0
      let weight = 1
      for (const digits of this.permutations[d]) {
        weight /= base
        value += weight * digits[rest % base]
        rest = Math.floor(rest / base)
      }
      // Rounding may carry the largest points up to 1.
      return Math.min(value, belowOne)
    })
  }
}

const belowOne = 1 - Number.EPSILON / 2

/** Digits of 32 bits: no two indices share a point. */
function digitsOf(base: number): number {
  let digits = 0
  for (let span = 1; span < 4294967296; span *= base) digits++
  return digits
}

function permutation(size: number, stream: RandomStream): Int32Array {
  const order = Int32Array.from({ length: size }, (_, i) => i)
  for (let i = size - 1; i > 0; i--) {
    const j = stream.integer(i + 1)
    ;[order[i], order[j]] = [order[j], order[i]]
  }
  return order
}

function primes(count: number): number[] {
  const found: number[] = []
  for (let n = 2; found.length < count; n++) if (found.every((prime) => n % prime !== 0)) found.push(n)
  return found
}

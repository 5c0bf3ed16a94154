import type { ChainPoint } from '../types.js'

/**
 * Lower bounds of what a point adds to the merit squared, by buckets of cosh(distance) = 2/T - 1: a bucket is the exponent and the
 * first six bits of the mantissa, numbers below 1 counting as bucket 0, so that a bound costs a shift and a look-up whatever the
 * demand's scale. `tooLow`: where T is below the goal, from a lower bound of cosh; `tooHigh`: above it, from an upper bound.
 * `lowExtreme`, `highExtreme`: the same for the extreme of the point's demand. Null where a point has nothing of the kind.
 */
export interface PointTables {
  readonly tooLow: Float64Array | null
  readonly tooHigh: Float64Array | null
  readonly lowExtreme: Float64Array | null
  readonly highExtreme: Float64Array | null
}

export function pointTables({ square, extreme, goal }: ChainPoint): PointTables {
  const [from, to] = goal
  return {
    tooLow: side((T) => (T < from ? square(T) : 0), 'greatest'),
    tooHigh: side((T) => (T > to ? square(T) : 0), 'least'),
    lowExtreme: side((T) => (T < from ? extreme(T) : 0), 'greatest'),
    highExtreme: side((T) => (T > to ? extreme(T) : 0), 'least'),
  }
}

function side(added: (T: number) => number, end: 'greatest' | 'least'): Float64Array | null {
  const table = new Float64Array(buckets)
  let any = false
  for (let i = 0; i < buckets; i++) {
    // The greatest T of a bucket belongs to its least cosh; the last bucket has no least T.
    const cosh = bucketStart(end === 'greatest' ? i : i + 1)
    const T = end === 'least' && i === buckets - 1 ? 0 : 2 / (1 + cosh)
    const value = added(end === 'greatest' ? T * (1 + rounding) : T * (1 - rounding))
    table[i] = Math.max(value, 0)
    any ||= value > 0
  }
  return any ? table : null
}

const rounding = 1e-14

/** Bits of the mantissa that tell buckets apart, and binary exponents that have buckets. */
const bits = 6
const exponents = 112
export const buckets = exponents << bits

const double = new Float64Array(1)
const words = new Int32Array(double.buffer)
const highWord = new Uint8Array(Uint32Array.of(1).buffer)[0] === 1 ? 1 : 0

function bucketStart(bucket: number): number {
  words[1 - highWord] = 0
  words[highWord] = ((1023 << bits) + bucket) << (20 - bits)
  return double[0]
}

export function bucketOf(cosh: number): number {
  double[0] = cosh
  const bucket = (words[highWord] >> (20 - bits)) - (1023 << bits)
  return bucket < 0 ? 0 : bucket >= buckets ? buckets - 1 : bucket
}

/** The half octave of a number from 1 on. */
export function exponentBand(x: number): number {
  double[0] = x
  return words[highWord] >> 19
}

/**
 * The bits of a double, for exact scaling by powers of two. Word order is found once, so that the results are the same
 * on a machine of either byte order.
 */

const double = new Float64Array(1)
const words = new Int32Array(double.buffer)
double[0] = 1
const high = words[1] !== 0 ? 1 : 0
const low = 1 - high

/** Upper 32 bits: sign, eleven bits of exponent, twenty of the mantissa. */
export function highWord(x: number): number {
  double[0] = x
  return words[high]
}

/** The same number with other upper 32 bits. */
export function withHighWord(x: number, word: number): number {
  double[0] = x
  words[high] = word
  return double[0]
}

/** floor(log2 |x|) of a normal number; -1023 for zero and subnormals, 1024 for infinities and NaN. */
export function exponentOf(x: number): number {
  return ((highWord(x) >>> 20) & 0x7ff) - 1023
}

/** 2^n for an integer n in -1022..1023. */
export function powerOfTwo(n: number): number {
  words[low] = 0
  words[high] = (n + 1023) << 20
  return double[0]
}

/** x 2^n for any integer n; rounds once where the result is subnormal and x is normal. */
export function scaleByPowerOfTwo(x: number, n: number): number {
  let value = x
  let left = n
  if (left > 1023) {
    value *= powerOfTwo(1023)
    left -= 1023
    if (left > 1023) {
      value *= powerOfTwo(1023)
      left = Math.min(left - 1023, 1023)
    }
  } else if (left < -969) {
    // 2^-969 = 2^-1022 2^53 keeps the intermediate result normal, or makes the final one zero.
    value *= powerOfTwo(-969)
    left += 969
    if (left < -969) {
      value *= powerOfTwo(-969)
      left = Math.max(left + 969, -1022)
    }
  }
  return value * powerOfTwo(left)
}

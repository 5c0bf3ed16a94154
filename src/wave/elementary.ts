import { highWord, scaleByPowerOfTwo, withHighWord } from './bits.js'

/**
 * Elementary functions from + - * / and floor alone: the same bits on every machine and Node version, which the
 * built-in ones do not promise. Each reduces its argument with a constant split in two or three parts, then takes a
 * polynomial (interpolation at Chebyshev nodes in 60 digits). Errors against 50 digits, in units in the last place:
 * exp 0.8, log 1.1, sine and cosine 0.8, log10 and log1p 2, atan2 2.
 */

const ln2High = 0.6931471805582987
const ln2Low = 1.6465949582897082e-12

/** e^x; 0 below -745.13, Infinity above 709.78. */
export function exp(x: number): number {
  if (Number.isNaN(x)) return x
  if (x > 709.782712893384) return Infinity
  if (x < -745.1332191019412) return 0
  const n = Math.floor(x * Math.LOG2E + 0.5)
  const head = x - n * ln2High
  const tail = n * ln2Low
  const r = head - tail
  const p =
    0.5 +
    r *
      (0.1666666666666667 +
        r *
          (0.04166666666666667 +
            r *
              (0.008333333333326141 +
                r *
                  (0.0013888888888883752 +
                    r *
                      (0.00019841269874802504 +
                        r *
                          (2.48015873255348e-5 +
                            r *
                              (2.755725542319278e-6 +
                                r *
                                  (2.755727365952505e-7 + r * (2.5105207436985358e-8 + r * 2.091468013569995e-9)))))))))
  return scaleByPowerOfTwo(1 + (head - (tail - r * r * p)), n)
}

// What splitLog found: the binary exponent and log of the mantissa, which lies in sqrt(1/2)..sqrt(2).
let logExponent = 0
let logMantissa = 0

/** Natural logarithm: -Infinity at 0, NaN below. */
export function log(x: number): number {
  if (!splitLog(x)) return logMantissa
  return logExponent === 0 ? logMantissa : logExponent * ln2High + (logExponent * ln2Low + logMantissa)
}

/** Decimal logarithm: -Infinity at 0, NaN below. */
export function log10(x: number): number {
  if (!splitLog(x)) return logMantissa
  return logExponent * 0.30102999566361177 + (logExponent * 3.694239077158931e-13 + logMantissa * Math.LOG10E)
}

/** log(1 + x), right also where x is far below the spacing of doubles at 1. */
export function log1p(x: number): number {
  const u = 1 + x
  if (u === 1 || u === Infinity) return x
  if (!(u > 0)) return log(u)
  return log(u) + (x - (u - 1)) / u
}

// log m = 2 atanh s with s = f/(2 + f), m = 1 + f; written so that f, which is exact, carries the leading digits.
function splitLog(x: number): boolean {
  if (!(x > 0) || x === Infinity) {
    logMantissa = x === 0 ? -Infinity : x > 0 ? x : NaN
    return false
  }
  let y = x
  let k = 0
  if (y < 2.2250738585072014e-308) {
    y *= 18014398509481984
    k = -54
  }
  const word = highWord(y)
  // 0x95f64 moves the cut of the mantissa's range from 2 down to sqrt(2).
  const carry = ((word & 0xfffff) + 0x95f64) & 0x100000
  k += (word >> 20) - 1023 + (carry >> 20)
  const f = withHighWord(y, (word & 0xfffff) | (carry ^ 0x3ff00000)) - 1
  const s = f / (2 + f)
  const w = s * s
  const tail =
    w *
    (0.666666666666667 +
      w *
        (0.3999999999989938 +
          w *
            (0.28571428626031065 +
              w *
                (0.2222221112572281 +
                  w * (0.18182889786191042 + w * (0.15331699633543858 + w * 0.14616721179861816))))))
  const half = 0.5 * f * f
  logExponent = k
  logMantissa = f - (half - s * (half + tail))
  return true
}

/**
 * Sine to out[0], cosine to out[1]. Full accuracy up to |x| = 1.6e6; above, the reduction is as coarse as the spacing
 * of doubles at x.
 */
export function sinCos(x: number, out: Float64Array): void {
  const n = Math.floor(x * 0.6366197723675814 + 0.5)
  // pi/2 in parts of 33, 33 and 53 bits: the first two products are exact, and s + tail is x - n pi/2 to 2^-100.
  const t = x - n * 1.5707963267341256
  const w = n * 6.077100506303966e-11
  const s = t - w
  const back = s - t
  const tail = t - (s - back) - (w + back) - n * 2.0222662487959506e-21
  const r = s + tail
  const rest = s - r + tail
  const z = r * r
  const p =
    -0.16666666666666666 +
    z *
      (0.008333333333330948 +
        z *
          (-0.00019841269836758213 +
            z * (2.755731610236554e-6 + z * (-2.5051131806051286e-8 + z * 1.5918126488531496e-10))))
  const q =
    0.041666666666666664 +
    z *
      (-0.0013888888888887398 +
        z *
          (2.4801587298765462e-5 +
            z * (-2.755731727161287e-7 + z * (2.0876146244035124e-9 - z * 1.1382630669902987e-11))))
  const half = 0.5 * z
  const sine = r + (r * z * p + rest * (1 - half))
  const one = 1 - half
  const cosine = one + (1 - one - half + (z * z * q - r * rest))
  const quadrant = n - 4 * Math.floor(n * 0.25)
  if (quadrant === 0) {
    out[0] = sine
    out[1] = cosine
  } else if (quadrant === 1) {
    out[0] = cosine
    out[1] = -sine
  } else if (quadrant === 2) {
    out[0] = -sine
    out[1] = -cosine
  } else {
    out[0] = -cosine
    out[1] = sine
  }
}

const pair = new Float64Array(2)

export function sin(x: number): number {
  sinCos(x, pair)
  return pair[0]
}

export function cos(x: number): number {
  sinCos(x, pair)
  return pair[1]
}

const halfPi = 1.5707963267948966
const halfPiRest = 6.123233995736766e-17

// atan(i/8) and what is missing in its last bit.
const arcs = new Float64Array([
  0, 0.12435499454676144, 0.24497866312686414, 0.35877067027057225, 0.4636476090008061, 0.5585993153435624,
  0.6435011087932844, 0.7188299996216245, 0.7853981633974483,
])
const arcRests = new Float64Array([
  0, -3.1253241424539383e-18, 1.0698755618734451e-17, -2.4623815582638635e-17, 2.2698777452961687e-17,
  -5.4556305485916264e-18, 1.5834785051444286e-17, -2.1478388444456983e-17, 3.061616997868383e-17,
])

/** Angle of the point (x, y) in -pi..pi, signed zeros and infinities as the standard library has them. */
export function atan2(y: number, x: number): number {
  if (Number.isNaN(x) || Number.isNaN(y)) return NaN
  const ax = Math.abs(x)
  const ay = Math.abs(y)
  const steep = ay > ax
  const ratio = ax === ay ? (ax === 0 ? 0 : 1) : steep ? ax / ay : ay / ax
  const i = Math.floor(ratio * 8 + 0.5)
  const centre = i * 0.125
  const t = (ratio - centre) / (1 + ratio * centre)
  const z = t * t
  const p =
    0.3333333333333332 +
    z * (-0.1999999999982517 + z * (0.1428571392824613 + z * (-0.11110855188251079 + z * 0.09016051576691446)))
  let angle = arcs[i] + (t - (t * z * p - arcRests[i]))
  const left = x < 0 || (x === 0 && 1 / x < 0)
  if (steep) angle = left ? halfPi + (angle + halfPiRest) : halfPi - (angle - halfPiRest)
  else if (left) angle = Math.PI - (angle - 2 * halfPiRest)
  return y < 0 || (y === 0 && 1 / y < 0) ? -angle : angle
}

import { powerOfTwo } from './bits.js'
import { sinCos } from './elementary.js'

/**
 * Layer functions for complex q, one layer and one energy at a time: c = cos kw and a = sin(kw)/k, both entire in q, so
 * that the sign of k does not matter. For real q they reduce to the real functions without a spurious imaginary part.
 */

/** Re c, Im c, Re a, Im a, all divided by 2^n; the root k (Re k, Im k >= 0). Overwritten by every call. */
export const layer = { cRe: 0, cIm: 0, aRe: 0, aIm: 0, n: 0, kRe: 0, kIm: 0 }

const circular = new Float64Array(2)
const hyperbolic = new Float64Array(2)

/** Fills `layer` for a width w (nm) and q (1/nm²). |q| below 1e-200 counts as 1e-200: the limit at a band edge. */
export function complexLayer(qRe: number, qIm: number, w: number): void {
  complexRoot(qRe, qIm)
  const kRe = root.re
  const kIm = root.im
  layer.kRe = kRe
  layer.kIm = kIm
  sinCos(kRe * w, circular)
  const n = scaledHyperbolic(kIm * w, hyperbolic)
  layer.n = n
  layer.cRe = circular[1] * hyperbolic[0]
  layer.cIm = -circular[0] * hyperbolic[1]
  const sRe = circular[0] * hyperbolic[0]
  const sIm = circular[1] * hyperbolic[1]
  const size = kRe * kRe + kIm * kIm
  layer.aRe = (sRe * kRe + sIm * kIm) / size
  layer.aIm = (sIm * kRe - sRe * kIm) / size
}

/** Result of `complexRoot`. */
export const root = { re: 0, im: 0 }

/** Square root with Re >= 0, on the positive imaginary axis for negative real q; |q| is taken as 1e-200 at least. */
export function complexRoot(qRe: number, qIm: number): void {
  const scale = Math.max(Math.abs(qRe), Math.abs(qIm))
  if (scale < 1e-200) {
    root.re = 1e-100
    root.im = 0
    return
  }
  const x = qRe / scale
  const y = qIm / scale
  const big = Math.sqrt(scale) * Math.sqrt(0.5 * (Math.sqrt(x * x + y * y) + Math.abs(x)))
  const small = (0.5 * qIm) / big
  root.re = qRe >= 0 ? big : Math.abs(small)
  root.im = qRe >= 0 ? small : qIm < 0 ? -big : big
}

/** Result of `complexSlopeOfSine`. */
export const slopeOfA = { re: 0, im: 0 }

// (-1)^k k/(2k + 1)! for k = 1, 2, ...: the series of (c - a/w)/(2z) in z = q w².
const series = [
  -0.16666666666666666, 0.016666666666666666, -0.0005952380952380953, 1.1022927689594357e-5, -1.252605419272086e-7,
  9.635426302092969e-10, -5.353014612273871e-12, 2.2491658034764165e-14, -7.398571721961897e-17,
]

/** da/dq = (w c - a)/(2q) of the layer last computed, divided by 2^n as c and a are. */
export function complexSlopeOfSine(qRe: number, qIm: number, w: number): void {
  const zRe = qRe * w * w
  const zIm = qIm * w * w
  if (zRe * zRe + zIm * zIm >= 1) {
    const tRe = 0.5 * (w * layer.cRe - layer.aRe)
    const tIm = 0.5 * (w * layer.cIm - layer.aIm)
    const size = qRe * qRe + qIm * qIm
    slopeOfA.re = (tRe * qRe + tIm * qIm) / size
    slopeOfA.im = (tIm * qRe - tRe * qIm) / size
    return
  }
  let re = series[8]
  let im = 0
  for (let i = 7; i >= 0; i--) {
    const next = re * zRe - im * zIm + series[i]
    im = re * zIm + im * zRe
    re = next
  }
  // |kw| < 1 allows n = 1 at most.
  const scale = w * w * w * (layer.n === 0 ? 1 : 0.5)
  slopeOfA.re = re * scale
  slopeOfA.im = im * scale
}

/** cosh y/2^n and sinh y/2^n into `out`; returns n = round(|y|/ln 2). sinh keeps its digits towards 0. */
export function scaledHyperbolic(y: number, out: Float64Array): number {
  const size = Math.abs(y)
  const n = Math.floor(size * Math.LOG2E + 0.5)
  const r = size - n * 0.6931471805598903 - n * 5.497923018708371e-14
  const a = r * r
  const odd =
    r +
    r *
      a *
      (0.16666666666666669 +
        a *
          (0.008333333333330065 + a * (0.00019841269863041851 + a * (2.7557268478279004e-6 + a * 2.51003767988125e-8))))
  const even =
    1 +
    (0.5 * a +
      a *
        a *
        (0.041666666666666664 +
          a *
            (0.0013888888888886554 +
              a * (2.48015873171361e-5 + a * (2.755728298260548e-7 + a * 2.091123041977771e-9)))))
  const down = n < 511 ? powerOfTwo(-2 * n) : 0
  const h = 0.5 * (1 + down)
  const d = 0.5 * (1 - down)
  const sinh = even * d + odd * h
  out[0] = even * h + odd * d
  out[1] = y < 0 ? -sinh : sinh
  return n
}

import { powerOfTwo } from './bits.js'
import { complexRoot, root, scaledHyperbolic } from './complexLayer.js'
import { sinCos } from './elementary.js'
import type { Faces } from './pointSweep.js'
import type { MediaTable } from './types.js'

/** Integrals over one layer, nm times the squares of u and v, in units of 4^(exponent of the near face). */
export const integral = { u: 0, v: 0 }

const circular = new Float64Array(2)
const hyperbolic = new Float64Array(2)

/**
 * The integrals of |u|² and |v|² over a layer of width w, in closed form, from the vectors at its faces `near` and `far`
 * (numbers of interfaces). Media: entry t of the table.
 *
 * Where the wave can decay (Im k w > 1) both faces are used, u(x) = (u_near sin kx + u_far sin k(w - x))/sin kw with x
 * from the far face, so that a wave that falls towards the near face does not lose its digits; elsewhere the far face
 * alone, u = u_far cos kx - mu v_far sin(kx)/k. The same for v, with q/mu for -mu.
 */
export function layerIntegrals(table: MediaTable, t: number, w: number, faces: Faces, near: number, far: number): void {
  const qRe = table.q[t]
  const qIm = table.qIm ? table.qIm[t] : 0
  complexRoot(qRe, qIm)
  const x = root.re
  const y = root.im
  sinCos(x * w, circular)
  const n = scaledHyperbolic(y * w, hyperbolic)
  // sin(2xw)/(2x) and sinh(2yw)/(2y), the second divided by 4^n; `down` brings the first to the same unit.
  const down = n < 511 ? powerOfTwo(-2 * n) : 0
  const round = x * w < 1e-9 ? w : (circular[0] * circular[1]) / x
  const steep = y * w < 1e-9 ? w : (hyperbolic[0] * hyperbolic[1]) / y
  const { vectors, exponents } = faces
  const scale = powerOfTwo(Math.max(-1022, Math.min(1023, exponents[far] - exponents[near])))
  const uRe = vectors[4 * far] * scale
  const uIm = vectors[4 * far + 1] * scale
  const vRe = vectors[4 * far + 2] * scale
  const vIm = vectors[4 * far + 3] * scale
  if (y * w > 1) {
    const size = circular[0] * circular[0] * down + hyperbolic[1] * hyperbolic[1]
    const same = (0.5 * (steep - round * down)) / size
    // Re sin(kw)/x and Im sin(kw)/y over 2^n, and one more 2^-n.
    const re = x * w < 1e-9 ? w * hyperbolic[0] : (circular[0] * hyperbolic[0]) / x
    const im = (circular[1] * hyperbolic[1]) / y
    const cross = (n < 1023 ? powerOfTwo(-n) : 0) * ((re - im) / size)
    const pRe = vectors[4 * near]
    const pIm = vectors[4 * near + 1]
    const rRe = vectors[4 * near + 2]
    const rIm = vectors[4 * near + 3]
    integral.u = same * (uRe * uRe + uIm * uIm + pRe * pRe + pIm * pIm) + cross * (uRe * pRe + uIm * pIm)
    integral.v = same * (vRe * vRe + vIm * vIm + rRe * rRe + rIm * rIm) + cross * (vRe * rRe + vIm * rIm)
    return
  }
  const k2 = x * x + y * y
  const cc = 0.5 * (steep + round * down)
  const ss = k2 * w * w > 0.5 ? (0.5 * (steep - round * down)) / k2 : sineSquares(x, y, w) * down
  // Integral of cos(kx) conj(sin(kx)/k) = (sin²(xw)/x - i sinh²(yw)/y)/2 k/|k|²
  const p = x === 0 ? 0 : ((circular[0] * circular[0]) / x) * down
  const s = y === 0 ? 0 : (hyperbolic[1] * hyperbolic[1]) / y
  const csRe = (0.5 * (p * x + s * y)) / k2
  const csIm = (0.5 * (p * y - s * x)) / k2
  const muRe = table.mu[t]
  const muIm = table.muIm ? table.muIm[t] : 0
  const mass = muRe * muRe + muIm * muIm
  const gRe = muRe * vRe - muIm * vIm
  const gIm = muRe * vIm + muIm * vRe
  const fRe = (qRe * muRe + qIm * muIm) / mass
  const fIm = (qIm * muRe - qRe * muIm) / mass
  const hRe = fRe * uRe - fIm * uIm
  const hIm = fRe * uIm + fIm * uRe
  const grow = down > 0 ? 1 / down : 0
  const ug = (uRe * gRe + uIm * gIm) * csRe - (uIm * gRe - uRe * gIm) * csIm
  const vh = (vRe * hRe + vIm * hIm) * csRe - (vIm * hRe - vRe * hIm) * csIm
  integral.u = ((uRe * uRe + uIm * uIm) * cc + (gRe * gRe + gIm * gIm) * ss - 2 * ug) * grow
  integral.v = ((vRe * vRe + vIm * vIm) * cc + (hRe * hRe + hIm * hIm) * ss + 2 * vh) * grow
}

// Integral of |sin(kx)/k|² for |kw| < 1: 2 w³ sum of h_j/(2j + 1)!, h_1 = 1, h_(j+1) = p h_j + (-m)^j with p = (2yw)²,
// m = (2xw)²: the difference of the two series with the common factor p + m divided out.
function sineSquares(x: number, y: number, w: number): number {
  const p = 4 * y * y * w * w
  const m = 4 * x * x * w * w
  let h = 1
  let power = 1
  let factorial = 6
  let sum = 1 / 6
  for (let j = 2; j <= 14; j++) {
    power *= -m
    h = p * h + power
    factorial *= 2 * j * (2 * j + 1)
    sum += h / factorial
  }
  return 2 * w * w * w * sum
}

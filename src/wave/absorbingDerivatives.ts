import { powerOfTwo, scaleByPowerOfTwo } from './bits.js'
import { complexLayer, complexSlopeOfSine, layer, slopeOfA } from './complexLayer.js'
import type { GradientOut, Share } from './gradient.js'
import { admittance, Faces, lead, sweepPoint, wave } from './pointSweep.js'
import type { SlopeOut } from './slope.js'
import { refuseClosed, refuseResult } from './stackChecks.js'
import type { MediaTable, WaveStack } from './types.js'

// 2YA and 2YB (what comes back) at the near face, and T: overwritten by `transmission`.
const amplitude = { re: 0, im: 0, T: 0, Y: 0, farY: 0, backRe: 0, backIm: 0 }
const faces = new Faces()

/**
 * The branch of `slopeInto` for media that absorb: d ln T = d ln Re Y_far + d ln Y - 2 Re(d(2YA)/(2YA)), with the
 * derivative carried along the sweep.
 */
export function absorbingSlope(table: MediaTable, slope: MediaTable, stack: WaveStack, out: SlopeOut): void {
  for (let e = 0; e < table.points; e++) {
    transmission(table, slope, stack, e, null)
    out.T[e] = amplitude.T
    out.dTdE[e] = 0
    if (amplitude.farY === 0) continue
    admittance(table, slope, stack.exit * table.points + e)
    const far = lead.dRe / lead.re
    admittance(table, slope, stack.entry * table.points + e)
    const dRe = lead.re * wave.duRe + lead.dRe * wave.uRe + wave.dvIm
    const dIm = lead.re * wave.duIm + lead.dRe * wave.uIm - wave.dvRe
    const { re, im } = amplitude
    const dT = amplitude.T * (far + lead.dRe / lead.re - (2 * (dRe * re + dIm * im)) / (re * re + im * im))
    if (!(Math.abs(dT) < Infinity)) refuseResult(table, e)
    out.dTdE[e] = dT
  }
}

/**
 * The branch of `gradientInto` for media that absorb, by the widths and both parts of q and mu: one sweep that keeps the vectors, one
 * adjoint sweep of a row s, the slope being -2 Re of what it finds:
 *
 *     T: s = T (Y, -i)/(2YA)     R: s = R (Y, -i)/(2YA) - conj(2YB)(Y, i)/|2YA|²
 *
 * Of R, `out.T` is R.
 */
export function absorbingGradient(table: MediaTable, stack: WaveStack, out: GradientOut, share: Share = 'T'): void {
  const { medium, width } = stack
  const layers = medium.length
  faces.grow(layers)
  const { vectors, exponents } = faces
  for (let e = 0; e < table.points; e++) {
    transmission(table, null, stack, e, faces)
    const { re, im, T, Y, backRe, backIm } = amplitude
    const size = re * re + im * im
    const value = share === 'T' ? T : (backRe * backRe + backIm * backIm) / size
    out.T[e] = value
    let gRe = (value * (Y * re)) / size
    let gIm = (value * (-Y * im)) / size
    let hRe = (value * -im) / size
    let hIm = (value * -re) / size
    if (share === 'R') {
      gRe -= (Y * backRe) / size
      gIm += (Y * backIm) / size
      hRe -= backIm / size
      hIm -= backRe / size
    }
    for (let j = 0; j < layers; j++) {
      const t = medium[j] * table.points + e
      const w = width[j]
      const qRe = table.q[t]
      const qIm = table.qIm ? table.qIm[t] : 0
      const muRe = table.mu[t]
      const muIm = table.muIm ? table.muIm[t] : 0
      complexLayer(qRe, qIm, w)
      complexSlopeOfSine(qRe, qIm, w)
      const { cRe, cIm, aRe, aIm, n } = layer
      const mass = muRe * muRe + muIm * muIm
      const o = 4 * (j + 1)
      const uRe = vectors[o]
      const uIm = vectors[o + 1]
      const vRe = vectors[o + 2]
      const vIm = vectors[o + 3]
      // What the sweep multiplied the result of this layer by, beside 2^-n: the row must be told.
      const scale = powerOfTwo(n + exponents[j + 1] - exponents[j])
      const byCosRe = (gRe * uRe - gIm * uIm + hRe * vRe - hIm * vIm) * scale
      const byCosIm = (gRe * uIm + gIm * uRe + hRe * vIm + hIm * vRe) * scale
      const byDownRe = (gRe * vRe - gIm * vIm) * scale
      const byDownIm = (gRe * vIm + gIm * vRe) * scale
      const byUpRe = (hRe * uRe - hIm * uIm) * scale
      const byUpIm = (hRe * uIm + hIm * uRe) * scale
      // alpha = byUp/mu, beta = mu byDown, delta = c alpha - S byCos, as in `plainGradient`.
      const alphaRe = (byUpRe * muRe + byUpIm * muIm) / mass
      const alphaIm = (byUpIm * muRe - byUpRe * muIm) / mass
      const betaRe = muRe * byDownRe - muIm * byDownIm
      const betaIm = muRe * byDownIm + muIm * byDownRe
      const deltaRe = cRe * alphaRe - cIm * alphaIm - (aRe * byCosRe - aIm * byCosIm)
      const deltaIm = cRe * alphaIm + cIm * alphaRe - (aRe * byCosIm + aIm * byCosRe)
      // up = (q/mu) S
      const fRe = (qRe * muRe + qIm * muIm) / mass
      const fIm = (qIm * muRe - qRe * muIm) / mass
      const upRe = fRe * aRe - fIm * aIm
      const upIm = fRe * aIm + fIm * aRe
      const downRe = muRe * aRe - muIm * aIm
      const downIm = muRe * aIm + muIm * aRe
      const to = e * layers + j
      out.dTdWidth[to] = -2 * (qRe * deltaRe - qIm * deltaIm - (cRe * betaRe - cIm * betaIm))
      out.dTdQ[to] =
        -2 * (0.5 * (aRe * alphaRe - aIm * alphaIm + w * deltaRe) - (slopeOfA.re * betaRe - slopeOfA.im * betaIm))
      out.dTdMu[to] = 2 * (aRe * byDownRe - aIm * byDownIm + (upRe * alphaRe - upIm * alphaIm))
      if (out.dTdQIm) {
        out.dTdQIm[to] =
          2 * (0.5 * (aRe * alphaIm + aIm * alphaRe + w * deltaIm) - (slopeOfA.re * betaIm + slopeOfA.im * betaRe))
      }
      if (out.dTdMuIm) out.dTdMuIm[to] = -2 * (aRe * byDownIm + aIm * byDownRe + (upRe * alphaIm + upIm * alphaRe))
      const nextRe = (gRe * cRe - gIm * cIm + hRe * upRe - hIm * upIm) * scale
      const nextIm = (gRe * cIm + gIm * cRe + hRe * upIm + hIm * upRe) * scale
      const otherRe = (hRe * cRe - hIm * cIm - (gRe * downRe - gIm * downIm)) * scale
      const otherIm = (hRe * cIm + hIm * cRe - (gRe * downIm + gIm * downRe)) * scale
      gRe = nextRe
      gIm = nextIm
      hRe = otherRe
      hIm = otherIm
    }
  }
}

function transmission(
  table: MediaTable,
  slope: MediaTable | null,
  stack: WaveStack,
  e: number,
  keep: Faces | null,
): void {
  const t = stack.entry * table.points + e
  if (!(table.q[t] > 0) || table.qIm?.[t] !== 0) refuseClosed(table, e, stack.entry)
  amplitude.farY = 0
  if (stack.exit >= 0) {
    admittance(table, slope, stack.exit * table.points + e)
    amplitude.farY = lead.re
  }
  sweepPoint(table, slope, stack, 'entry', stack.exit, e, keep)
  admittance(table, null, t)
  const Y = lead.re
  const re = Y * wave.uRe + wave.vIm
  const im = Y * wave.uIm - wave.vRe
  const T = scaleByPowerOfTwo((4 * (Y * amplitude.farY)) / (re * re + im * im), -2 * wave.exponent)
  if (!(T < Infinity)) refuseResult(table, e)
  amplitude.re = re
  amplitude.im = im
  amplitude.backRe = Y * wave.uRe - wave.vIm
  amplitude.backIm = Y * wave.uIm + wave.vRe
  amplitude.Y = Y
  amplitude.T = T
}

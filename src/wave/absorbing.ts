import { scaleByPowerOfTwo } from './bits.js'
import { log10 } from './elementary.js'
import { integral, layerIntegrals } from './layerIntegrals.js'
import { admittance, Faces, lead, sweepPoint, wave } from './pointSweep.js'
import type { SpectrumOut } from './spectrum.js'
import { refuseClosed, refuseResult } from './stackChecks.js'
import type { MediaTable, Side, WaveStack } from './types.js'

const faces = new Faces()

/**
 * T, R and what each layer absorbs, for media of which some absorb: the branch of `spectrumInto` for tables with
 * imaginary parts. The flux Im(u* v) falls within a layer by
 *
 *   Im(q/mu) integral |u|² + Im(mu) integral |v|²,
 *
 * taken in closed form, so that T + R + A = 1 tests the whole. An absorbing exit carries away Re(Y)|u|² at its face.
 */
export function absorbingSpectrum(
  table: MediaTable,
  stack: WaveStack,
  out: SpectrumOut,
  from: Side,
  near: number,
  far: number,
): number {
  const layers = stack.medium.length
  faces.grow(layers)
  let worst = 0
  for (let e = 0; e < table.points; e++) {
    const t = near * table.points + e
    if (!(table.q[t] > 0) || table.qIm?.[t] !== 0) refuseClosed(table, e, near)
    let farY = 0
    if (far >= 0) {
      admittance(table, null, far * table.points + e)
      farY = lead.re
    }
    sweepPoint(table, null, stack, from, far, e, faces)
    admittance(table, null, t)
    const Y = lead.re
    const aRe = Y * wave.uRe + wave.vIm
    const aIm = Y * wave.uIm - wave.vRe
    const bRe = Y * wave.uRe - wave.vIm
    const bIm = Y * wave.uIm + wave.vRe
    const a = aRe * aRe + aIm * aIm
    const ratio = (4 * (Y * farY)) / a
    const T = scaleByPowerOfTwo(ratio, -2 * wave.exponent)
    const R = (bRe * bRe + bIm * bIm) / a
    const A = absorbed(table, stack, from, e, (4 * Y) / a, out.absorbed)
    const flux = Math.abs(T + R + A - 1)
    if (!(flux < Infinity)) refuseResult(table, e)
    out.T[e] = T
    out.R[e] = R
    if (out.A) out.A[e] = A
    if (out.log10T) out.log10T[e] = log10(ratio) - 2 * wave.exponent * 0.3010299956639812
    worst = Math.max(worst, flux)
  }
  return worst
}

// `perFlux`: what turns a flux in units of 4^(exponent at the near lead) into a share of the incident one.
function absorbed(
  table: MediaTable,
  stack: WaveStack,
  from: Side,
  e: number,
  perFlux: number,
  out: Float64Array | undefined,
): number {
  const { medium, width } = stack
  const layers = medium.length
  const { exponents } = faces
  const last = exponents[from === 'entry' ? 0 : layers]
  let sum = 0
  for (let j = 0; j < layers; j++) {
    const t = medium[j] * table.points + e
    const qIm = table.qIm ? table.qIm[t] : 0
    const muIm = table.muIm ? table.muIm[t] : 0
    let share = 0
    if (qIm !== 0 || muIm !== 0) {
      const nearFace = from === 'entry' ? j : j + 1
      layerIntegrals(table, t, width[j], faces, nearFace, from === 'entry' ? j + 1 : j)
      const mu = table.mu[t]
      const ratioIm = (qIm * mu - table.q[t] * muIm) / (mu * mu + muIm * muIm)
      const flux = ratioIm * integral.u + muIm * integral.v
      share = scaleByPowerOfTwo(flux * perFlux, 2 * (exponents[nearFace] - last))
    }
    sum += share
    if (out) out[e * layers + j] = share
  }
  return sum
}

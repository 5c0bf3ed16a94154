import { atan2 } from './elementary.js'
import { admittance, lead, sweepPoint, wave } from './pointSweep.js'
import { checkStack, lead as leadOf, refuseClosed } from './stackChecks.js'
import type { MediaTable, Side, WaveStack } from './types.js'

/** What `amplitudesInto` writes, one entry a point. NaN where no wave leaves (t) or none returns (r). */
export interface AmplitudesOut {
  /** arg t, radians in -pi..pi, from the face the wave enters to the face it leaves. */
  readonly phaseT: Float64Array
  /** arg r, radians in -pi..pi, at the face the wave enters. */
  readonly phaseR: Float64Array
  /** d arg t/dE and d arg r/dE, rad/eV: times hbar (0.6582 eV fs) the phase time, or group delay. */
  readonly slopeT: Float64Array
  readonly slopeR: Float64Array
}

export interface AmplitudesOptions {
  /** The side the wave comes from; 'entry' unless given. */
  readonly from?: Side
  /**
   * Amplitudes of v instead of u: t = (Y_far/Y_near)/A and r = -B/A. For p light u is the tangential magnetic field,
   * and the ratios of tangential electric fields are those of v.
   */
  readonly ofV?: boolean
}

/**
 * Phases of the amplitudes t and r and their derivatives by energy, time factor e^(-iEt/hbar), wave e^(ikz) in the
 * direction of incidence. `slope` holds dq/dE and dmu/dE. On the very edge of the far lead the derivative of arg r
 * is that from above (from below it is infinite). Throws RangeError as `spectrumInto`.
 */
export function amplitudesInto(
  table: MediaTable,
  slope: MediaTable,
  stack: WaveStack,
  out: AmplitudesOut,
  options: AmplitudesOptions = {},
): void {
  const { from = 'entry', ofV = false } = options
  checkStack(stack)
  const near = leadOf(stack, from, true)
  const far = leadOf(stack, from, false)
  for (let e = 0; e < table.points; e++) {
    const t = near * table.points + e
    if (!(table.q[t] > 0) || (table.qIm && table.qIm[t] !== 0)) refuseClosed(table, e, near)
    let farRe = 0
    let farIm = 0
    let farSlope = 0
    if (far >= 0) {
      admittance(table, slope, far * table.points + e)
      farRe = lead.re
      farIm = lead.im
      farSlope = (lead.dIm * lead.re - lead.dRe * lead.im) / (lead.re * lead.re + lead.im * lead.im)
    }
    sweepPoint(table, slope, stack, from, far, e, null)
    admittance(table, slope, t)
    const Y = lead.re
    const dY = lead.dRe
    // 2YA and 2YB
    const aRe = Y * wave.uRe + wave.vIm
    const aIm = Y * wave.uIm - wave.vRe
    const bRe = Y * wave.uRe - wave.vIm
    const bIm = Y * wave.uIm + wave.vRe
    const daRe = Y * wave.duRe + dY * wave.uRe + wave.dvIm
    const daIm = Y * wave.duIm + dY * wave.uIm - wave.dvRe
    const dbRe = Y * wave.duRe + dY * wave.uRe - wave.dvIm
    const dbIm = Y * wave.duIm + dY * wave.uIm + wave.dvRe
    const argA = atan2(aIm, aRe)
    const slopeA = (daIm * aRe - daRe * aIm) / (aRe * aRe + aIm * aIm)
    const b = bRe * bRe + bIm * bIm
    out.phaseR[e] = b > 0 ? wrap(atan2(bIm, bRe) - argA + (ofV ? Math.PI : 0)) : Number.NaN
    out.slopeR[e] = (dbIm * bRe - dbRe * bIm) / b - slopeA
    // An exit that is closed has Re Y = 0 and carries nothing away.
    out.phaseT[e] = farRe !== 0 ? wrap((ofV ? atan2(farIm, farRe) : 0) - argA) : Number.NaN
    out.slopeT[e] = farRe !== 0 ? (ofV ? farSlope : 0) - slopeA : Number.NaN
  }
}

function wrap(angle: number): number {
  if (angle > Math.PI) return angle - 2 * Math.PI
  return angle <= -Math.PI ? angle + 2 * Math.PI : angle
}

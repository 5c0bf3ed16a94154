import { exponentOf, powerOfTwo } from './bits.js'
import { complexLayer, complexRoot, complexSlopeOfSine, layer, root, slopeOfA } from './complexLayer.js'
import type { MediaTable, Side, WaveStack } from './types.js'

/**
 * The complex vector (u, v) of one energy on its way from the far lead to the near one, for media with or without
 * absorption, with its derivative by energy beside it: the path for everything that is not T and R of lossless stacks.
 * v is that of a wave running towards the far side, so seen from the exit the stack is its own mirror image.
 */

/** The vector at the face the sweep has reached; the true one is 2^exponent times this. Overwritten by every sweep. */
export const wave = { uRe: 0, uIm: 0, vRe: 0, vIm: 0, duRe: 0, duIm: 0, dvRe: 0, dvIm: 0, exponent: 0 }

/** Admittance Y = k/mu of a lead and its derivative by energy. Overwritten by `admittance`. */
export const lead = { re: 0, im: 0, dRe: 0, dIm: 0 }

/**
 * The vector at every interface, four numbers each (Re u, Im u, Re v, Im v), and its exponent. Interface 0 is the
 * entry's face, interface j the one behind layer j - 1, whichever side the wave comes from.
 */
export class Faces {
  vectors = new Float64Array(4)
  exponents = new Float64Array(1)

  /** Makes room for the interfaces of so many layers. */
  grow(layers: number): void {
    if (this.exponents.length > layers) return
    this.vectors = new Float64Array(4 * (layers + 1))
    this.exponents = new Float64Array(layers + 1)
  }

  /** Takes `wave` as it is. */
  keep(interfaceNumber: number): void {
    const o = 4 * interfaceNumber
    this.vectors[o] = wave.uRe
    this.vectors[o + 1] = wave.uIm
    this.vectors[o + 2] = wave.vRe
    this.vectors[o + 3] = wave.vIm
    this.exponents[interfaceNumber] = wave.exponent
  }
}

/**
 * Sweeps point e from the far lead (hard wall: far < 0) to the near one into `wave`. `slope` null: no derivatives.
 */
export function sweepPoint(
  table: MediaTable,
  slope: MediaTable | null,
  stack: WaveStack,
  from: Side,
  far: number,
  e: number,
  faces: Faces | null,
): void {
  const { medium, width } = stack
  const layers = medium.length
  start(table, slope, far, e)
  if (faces !== null) faces.keep(from === 'entry' ? layers : 0)
  for (let step = 0; step < layers; step++) {
    const j = from === 'entry' ? layers - 1 - step : step
    cross(table, slope, medium[j] * table.points + e, width[j])
    if (faces !== null) faces.keep(from === 'entry' ? j : j + 1)
  }
}

/** Y of a lead at entry t of the table into `lead`: outgoing where open, decaying where closed. */
export function admittance(table: MediaTable, slope: MediaTable | null, t: number): void {
  complexRoot(table.q[t], table.qIm ? table.qIm[t] : 0)
  const kRe = root.re
  const kIm = root.im
  const muRe = table.mu[t]
  const muIm = table.muIm ? table.muIm[t] : 0
  const mass = muRe * muRe + muIm * muIm
  lead.re = (kRe * muRe + kIm * muIm) / mass
  lead.im = (kIm * muRe - kRe * muIm) / mass
  // Exactly on the edge of a real lead the limit from below: no wave leaves.
  if (table.q[t] === 0 && !(table.qIm && table.qIm[t] !== 0)) {
    lead.re = 0
    lead.im = 0
  }
  lead.dRe = 0
  lead.dIm = 0
  if (slope === null) return
  // dY = (dq/(2k) - Y dmu)/mu
  const size = 2 * (kRe * kRe + kIm * kIm)
  const dqIm = slope.qIm ? slope.qIm[t] : 0
  const dmuRe = slope.mu[t]
  const dmuIm = slope.muIm ? slope.muIm[t] : 0
  const re = (slope.q[t] * kRe + dqIm * kIm) / size - (lead.re * dmuRe - lead.im * dmuIm)
  const im = (dqIm * kRe - slope.q[t] * kIm) / size - (lead.re * dmuIm + lead.im * dmuRe)
  lead.dRe = (re * muRe + im * muIm) / mass
  lead.dIm = (im * muRe - re * muIm) / mass
}

function start(table: MediaTable, slope: MediaTable | null, far: number, e: number): void {
  wave.uIm = 0
  wave.duRe = 0
  wave.duIm = 0
  wave.exponent = 0
  if (far < 0) {
    wave.uRe = 0
    wave.vRe = 1
    wave.vIm = 0
    wave.dvRe = 0
    wave.dvIm = 0
    return
  }
  admittance(table, slope, far * table.points + e)
  wave.uRe = 1
  wave.vRe = -lead.im
  wave.vIm = lead.re
  wave.dvRe = -lead.dIm
  wave.dvIm = lead.dRe
}

function cross(table: MediaTable, slope: MediaTable | null, t: number, w: number): void {
  const qRe = table.q[t]
  const qIm = table.qIm ? table.qIm[t] : 0
  const muRe = table.mu[t]
  const muIm = table.muIm ? table.muIm[t] : 0
  complexLayer(qRe, qIm, w)
  const { cRe, cIm, aRe, aIm, n } = layer
  // down = mu a, up = (q/mu) a
  const mass = muRe * muRe + muIm * muIm
  const fRe = (qRe * muRe + qIm * muIm) / mass
  const fIm = (qIm * muRe - qRe * muIm) / mass
  const downRe = muRe * aRe - muIm * aIm
  const downIm = muRe * aIm + muIm * aRe
  const upRe = fRe * aRe - fIm * aIm
  const upIm = fRe * aIm + fIm * aRe
  const { uRe, uIm, vRe, vIm } = wave
  if (slope !== null) {
    const dqRe = slope.q[t]
    const dqIm = slope.qIm ? slope.qIm[t] : 0
    const dmuRe = slope.mu[t]
    const dmuIm = slope.muIm ? slope.muIm[t] : 0
    complexSlopeOfSine(qRe, qIm, w)
    const dcRe = -0.5 * w * (aRe * dqRe - aIm * dqIm)
    const dcIm = -0.5 * w * (aRe * dqIm + aIm * dqRe)
    const daRe = slopeOfA.re * dqRe - slopeOfA.im * dqIm
    const daIm = slopeOfA.re * dqIm + slopeOfA.im * dqRe
    const ddownRe = dmuRe * aRe - dmuIm * aIm + muRe * daRe - muIm * daIm
    const ddownIm = dmuRe * aIm + dmuIm * aRe + muRe * daIm + muIm * daRe
    // d(q a) = (a + w c)/2 dq; d up = (d(q a) - up dmu)/mu
    const hRe = 0.5 * (aRe + w * cRe)
    const hIm = 0.5 * (aIm + w * cIm)
    const pRe = hRe * dqRe - hIm * dqIm - (upRe * dmuRe - upIm * dmuIm)
    const pIm = hRe * dqIm + hIm * dqRe - (upRe * dmuIm + upIm * dmuRe)
    const dupRe = (pRe * muRe + pIm * muIm) / mass
    const dupIm = (pIm * muRe - pRe * muIm) / mass
    const { duRe, duIm, dvRe, dvIm } = wave
    wave.duRe =
      cRe * duRe -
      cIm * duIm -
      downRe * dvRe +
      downIm * dvIm +
      (dcRe * uRe - dcIm * uIm - ddownRe * vRe + ddownIm * vIm)
    wave.duIm =
      cRe * duIm +
      cIm * duRe -
      downRe * dvIm -
      downIm * dvRe +
      (dcRe * uIm + dcIm * uRe - ddownRe * vIm - ddownIm * vRe)
    wave.dvRe =
      upRe * duRe - upIm * duIm + cRe * dvRe - cIm * dvIm + (dupRe * uRe - dupIm * uIm + dcRe * vRe - dcIm * vIm)
    wave.dvIm =
      upRe * duIm + upIm * duRe + cRe * dvIm + cIm * dvRe + (dupRe * uIm + dupIm * uRe + dcRe * vIm + dcIm * vRe)
  }
  wave.uRe = cRe * uRe - cIm * uIm - downRe * vRe + downIm * vIm
  wave.uIm = cRe * uIm + cIm * uRe - downRe * vIm - downIm * vRe
  wave.vRe = upRe * uRe - upIm * uIm + cRe * vRe - cIm * vIm
  wave.vIm = upRe * uIm + upIm * uRe + cRe * vIm + cIm * vRe
  wave.exponent += n
  normalise()
}

function normalise(): void {
  const size = Math.max(
    Math.max(Math.abs(wave.uRe), Math.abs(wave.uIm)),
    Math.max(Math.abs(wave.vRe), Math.abs(wave.vIm)),
  )
  const exponent = exponentOf(size)
  if ((exponent < 50 && exponent > -50) || !(size > 0 && size < Infinity)) return
  const scale = powerOfTwo(-exponent)
  wave.uRe *= scale
  wave.uIm *= scale
  wave.vRe *= scale
  wave.vIm *= scale
  wave.duRe *= scale
  wave.duIm *= scale
  wave.dvRe *= scale
  wave.dvIm *= scale
  wave.exponent += exponent
}

import { admittance, type ComplexSweep, type Continuation, layerTrig } from './complexSweep.js'
import { exp, log, sinCos } from './elementary.js'
import { hardWall } from './types.js'

/** Rates (eV) at which a resonance empties: through the entry, through the exit, by absorption. */
export interface PartialWidths {
  readonly entry: number
  readonly exit: number
  readonly absorbed: number
}

/**
 * Partial widths of the pole E0 - i Gamma/2 from its own wave, by conservation of flux, exact at any width:
 *
 *   Gamma_side = 2 Re(Y_side) |u_side|² / N,   N = integral of D[q/mu] |u|² + D[mu] |v|²,   D[f] = -2 Im f(E)/Gamma
 *
 * (df/dE for a narrow line; with absorption D[f] = -2 (Im f(E) - Im f(E0))/Gamma and Im f(E0) gives the rest.) The wave
 * is swept from both faces inwards, where it grows, and joined at the face at which it is largest: swept through a thick
 * barrier in the other direction it would be rounding noise. A closed exit keeps its evanescent tail in N.
 */
export function partialWidths(sweep: ComplexSweep, energy: number, width: number, branch: Continuation): PartialWidths {
  const { stack, media } = sweep.system
  const { medium, width: widths, entry, exit } = stack
  const layers = medium.length
  const weights = densities(sweep, energy, width, media.lossless)
  const left = new Side(layers)
  const right = new Side(layers)
  const lead = new Float64Array(4)

  admittance(sweep.at, entry, branch.entryOpen, lead)
  left.start(1, 0, lead[1], -lead[0], 2 * lead[0])
  for (let n = 0; n < layers; n++) left.advance(sweep, medium[n], widths[n], 1, weights)
  if (exit === hardWall) right.start(0, 0, 1, 0, 0)
  else {
    admittance(sweep.at, exit, branch.exitOpen, lead)
    right.start(1, 0, -lead[1], lead[0], branch.exitOpen ? 2 * lead[0] : 0)
    if (!branch.exitOpen) right.addTail(sweep, exit, lead, weights)
  }
  for (let n = layers - 1; n >= 0; n--) right.advance(sweep, medium[n], widths[n], -1, weights)

  // Face j has j layers on its left.
  let join = 0
  let largest = -Infinity
  for (let j = 0; j <= layers; j++) {
    const size = left.height[j] + right.height[layers - j]
    if (size > largest) {
      largest = size
      join = j
    }
  }
  const r = layers - join
  const ratio = left.size2[join] / right.size2[r]
  const norm = left.norm[join] + ratio * right.norm[r]
  return {
    entry: left.flux[join] / norm,
    exit: (ratio * right.flux[r]) / norm,
    absorbed: (left.lost[join] + ratio * right.lost[r]) / norm,
  }
}

/** Weights of |u|² and |v|² in N and in the absorption, medium by medium: [D[f], D[mu], 2 Im f(E0), 2 Im mu(E0)]. */
function densities(sweep: ComplexSweep, energy: number, width: number, lossless: boolean): Float64Array {
  const { at, system } = sweep
  const n = system.media.count
  const weights = new Float64Array(4 * n)
  if (!lossless) {
    sweep.prepare(energy, 0)
    for (let m = 0; m < n; m++) {
      weights[4 * m + 2] = 2 * sweep.fIm[m]
      weights[4 * m + 3] = 2 * at.muIm[m]
    }
  }
  sweep.prepare(energy, -0.5 * width)
  const narrow = width < 1e-6 * energy
  for (let m = 0; m < n; m++) {
    weights[4 * m] = narrow ? sweep.dfRe[m] : (-2 * sweep.fIm[m] + weights[4 * m + 2]) / width
    weights[4 * m + 1] = narrow ? at.dmuRe[m] : (-2 * at.muIm[m] + weights[4 * m + 3]) / width
  }
  return weights
}

/** The wave swept from one face inwards, with everything rescaled to the size it has at the face reached. */
class Side {
  readonly norm: Float64Array
  readonly flux: Float64Array
  readonly lost: Float64Array
  /** |u|² + |v|² as swept, and log of its true root. */
  readonly size2: Float64Array
  readonly height: Float64Array
  private n = 0
  private ur = 0
  private ui = 0
  private vr = 0
  private vi = 0
  private grown = 0
  private readonly trig = new Float64Array(4)

  constructor(layers: number) {
    this.norm = new Float64Array(layers + 1)
    this.flux = new Float64Array(layers + 1)
    this.lost = new Float64Array(layers + 1)
    this.size2 = new Float64Array(layers + 1)
    this.height = new Float64Array(layers + 1)
  }

  start(ur: number, ui: number, vr: number, vi: number, flux: number): void {
    this.ur = ur
    this.ui = ui
    this.vr = vr
    this.vi = vi
    this.flux[0] = flux
    this.size2[0] = ur * ur + ui * ui + vr * vr + vi * vi
    this.height[0] = 0.5 * log(this.size2[0])
  }

  /** |u|² and |v|² fall like exp(-2 kappa z) in a closed lead; kappa = Im k. */
  addTail(sweep: ComplexSweep, m: number, lead: Float64Array, weights: Float64Array): void {
    const { at } = sweep
    const kappa = lead[0] * at.muIm[m] + lead[1] * at.muRe[m]
    const y2 = lead[0] * lead[0] + lead[1] * lead[1]
    this.norm[0] += (weights[4 * m] + weights[4 * m + 1] * y2) / (2 * kappa)
    this.lost[0] += (weights[4 * m + 2] + weights[4 * m + 3] * y2) / (2 * kappa)
  }

  /** Across one layer; sign 1 to the right, -1 to the left. */
  advance(sweep: ComplexSweep, m: number, w: number, sign: number, weights: Float64Array): void {
    const { ur, ui, vr, vi, n, trig } = this
    const { at, kRe, kIm, jRe, jIm } = sweep
    const mr = at.muRe[m]
    const mi = at.muIm[m]
    const fr = sweep.fRe[m]
    const fi = sweep.fIm[m]
    const x = kRe[m] * w
    const y = kIm[m] * w
    const small = layerTrig(x, y, jRe[m], jIm[m], trig)
    const cr = trig[0]
    const ci = trig[1]
    const Sr = trig[2]
    const Si = trig[3]
    // u(z) = u cos kz + p sin(kz)/k, v(z) = v cos kz + g sin(kz)/k
    const pr = sign * (mr * vr - mi * vi)
    const pi = sign * (mr * vi + mi * vr)
    const gr = -sign * (fr * ur - fi * ui)
    const gi = -sign * (fr * ui + fi * ur)

    // With K = k: |cos|² = (cosh 2 Im K z + cos 2 Re K z)/2, |sin|² their difference, conj(cos) sin = (sin + i sinh)/2.
    const k2 = kRe[m] * kRe[m] + kIm[m] * kIm[m]
    const fade2 = small ? 1 : exp(-2 * Math.abs(y))
    const growing = w * sinhc(2 * y, small)
    const turning = w * sinc(2 * x, trig) * fade2
    const cc = 0.5 * (growing + turning)
    const tiny = k2 * w * w < 1e-6
    const ss = tiny ? (w * w * w) / 3 : (0.5 * (growing - turning)) / k2
    // integral of conj(cos kz) sin(kz)/k = (1 - cos 2 Re K w)/(4 Re K) + i (cosh 2 Im K w - 1)/(4 Im K), times 1/k
    const sx = w * sinc(x, trig)
    const sy = w * sinhc(y, small)
    const ar = 0.5 * kRe[m] * sx * sx * fade2
    const ai = 0.5 * kIm[m] * sy * sy
    const csr = tiny ? 0.5 * w * w : ar * jRe[m] - ai * jIm[m]
    const csi = tiny ? 0 : ar * jIm[m] + ai * jRe[m]
    const uu =
      (ur * ur + ui * ui) * cc + (pr * pr + pi * pi) * ss + 2 * ((ur * pr + ui * pi) * csr - (ur * pi - ui * pr) * csi)
    const vv =
      (vr * vr + vi * vi) * cc + (gr * gr + gi * gi) * ss + 2 * ((vr * gr + vi * gi) * csr - (vr * gi - vi * gr) * csi)

    let ur1 = cr * ur - ci * ui + Sr * pr - Si * pi
    let ui1 = cr * ui + ci * ur + Sr * pi + Si * pr
    let vr1 = cr * vr - ci * vi + Sr * gr - Si * gi
    let vi1 = cr * vi + ci * vr + Sr * gi + Si * gr
    this.grown += small ? 0 : Math.abs(y)
    let size2 = ur1 * ur1 + ui1 * ui1 + vr1 * vr1 + vi1 * vi1
    let norm = this.norm[n] * fade2 + weights[4 * m] * uu + weights[4 * m + 1] * vv
    let lost = this.lost[n] * fade2 + weights[4 * m + 2] * uu + weights[4 * m + 3] * vv
    let flux = this.flux[n] * fade2
    if (size2 > 1e100 || size2 < 1e-100) {
      const scale = 1 / Math.sqrt(size2)
      this.grown -= log(scale)
      ur1 *= scale
      ui1 *= scale
      vr1 *= scale
      vi1 *= scale
      size2 = 1
      norm *= scale * scale
      lost *= scale * scale
      flux *= scale * scale
    }
    this.ur = ur1
    this.ui = ui1
    this.vr = vr1
    this.vi = vi1
    this.n = n + 1
    this.norm[n + 1] = norm
    this.lost[n + 1] = lost
    this.flux[n + 1] = flux
    this.size2[n + 1] = size2
    this.height[n + 1] = this.grown + 0.5 * log(size2)
  }
}

function sinc(x: number, scratch: Float64Array): number {
  if (x < 1e-4 && x > -1e-4) return 1 - (x * x) / 6
  sinCos(x, scratch)
  return scratch[0] / x
}

/** sinh(x)/x, or that times exp(-|x|) where it may be large. */
function sinhc(x: number, small: boolean): number {
  const xx = x * x
  if (small) return 1 + (xx / 6) * (1 + (xx / 20) * (1 + (xx / 42) * (1 + (xx / 72) * (1 + xx / 110))))
  const a = Math.abs(x)
  return (1 - exp(-2 * a)) / (2 * a)
}

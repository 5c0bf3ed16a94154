import { hcEvNm } from '../media/index.js'
import { type MediaAtEnergy, type MediaTable, sinCos, type WaveMedia } from '../wave/index.js'
import { StackError } from './StackError.js'
import type { Medium, OfWavelength } from './types.js'

/** How light comes in: the medium it comes from (a number in the list of media) and the angle there. */
export interface Incidence {
  readonly medium: number
  readonly angleDeg: number
  readonly polarisation: 's' | 'p'
}

/**
 * Light in homogeneous media, N = n + i kappa, at a real angle in the medium it comes from:
 *
 *     q = k0² (N² - N_from² sin²)        mu = 1 (s), N² (p)        k0 = 2 pi E / hc, E the photon energy in eV
 *
 * A function of the wavelength is called with hc/E, which may differ from the nm that the user wrote by one last place. Off the
 * real axis it is continued as N(Re E) + i Im E dN/dE, with dN/dE by a central difference of 1e-5 relative. One parameter, the
 * index n, kappa held.
 */
export function lightMedia(media: readonly Medium[], incidence: Incidence): WaveMedia {
  return new LightMedia(media, incidence)
}

/** Slots of the scratch: N, dN/dE, N_from, dN_from/dE, D = N² - N_from² sin², dD/dE; real and imaginary part of each. */
const [indexAt, slopeAt, fromAt, fromSlopeAt, normalAt, normalSlopeAt, slots] = [0, 2, 4, 6, 8, 10, 12]

class LightMedia implements WaveMedia {
  readonly count: number
  readonly lossless: boolean
  readonly parameters: number
  private readonly scratch = new Float64Array(slots)
  private readonly sin2: number
  private readonly cos2: number
  private readonly isP: boolean

  constructor(
    private readonly media: readonly Medium[],
    private readonly incidence: Incidence,
  ) {
    this.count = media.length
    this.lossless = media.every(({ extinction = 0 }) => extinction === 0)
    this.parameters = 1
    this.isP = incidence.polarisation === 'p'
    const [sin, cos] = sinCosOfDegrees(incidence.angleDeg)
    this.sin2 = sin * sin
    this.cos2 = cos * cos
  }

  fill(energies: Float64Array, table: MediaTable): void {
    const { scratch, isP } = this
    for (let m = 0; m < this.count; m++) {
      for (let e = 0, i = m * table.points; e < table.points; e++, i++) {
        const k0 = energies[e] * k0PerEv
        this.index(m, energies[e], indexAt)
        this.index(this.incidence.medium, energies[e], fromAt)
        this.normal()
        const nRe = scratch[indexAt]
        const nIm = scratch[indexAt + 1]
        table.q[i] = k0 * k0 * scratch[normalAt]
        table.mu[i] = isP ? nRe * nRe - nIm * nIm : 1
        if (table.qIm) table.qIm[i] = k0 * k0 * scratch[normalAt + 1]
        if (table.muIm) table.muIm[i] = isP ? 2 * nRe * nIm : 0
      }
    }
  }

  fillSlope(energies: Float64Array, slope: MediaTable): void {
    const { scratch, isP } = this
    const k2 = k0PerEv * k0PerEv
    for (let m = 0; m < this.count; m++) {
      for (let e = 0, i = m * slope.points; e < slope.points; e++, i++) {
        const E = energies[e]
        this.continued(m, E, 0)
        const [nRe, nIm] = [scratch[indexAt], scratch[indexAt + 1]]
        const [dnRe, dnIm] = [scratch[slopeAt], scratch[slopeAt + 1]]
        slope.q[i] = k2 * E * (2 * scratch[normalAt] + E * scratch[normalSlopeAt])
        slope.mu[i] = isP ? 2 * (nRe * dnRe - nIm * dnIm) : 0
        if (slope.qIm) slope.qIm[i] = k2 * E * (2 * scratch[normalAt + 1] + E * scratch[normalSlopeAt + 1])
        if (slope.muIm) slope.muIm[i] = isP ? 2 * (nRe * dnIm + nIm * dnRe) : 0
      }
    }
  }

  at(re: number, im: number, out: MediaAtEnergy): void {
    const { scratch, isP } = this
    const k2 = k0PerEv * k0PerEv
    const [squareRe, squareIm] = [re * re - im * im, 2 * re * im]
    for (let m = 0; m < this.count; m++) {
      this.continued(m, re, im)
      const [nRe, nIm] = [scratch[indexAt], scratch[indexAt + 1]]
      const [dnRe, dnIm] = [scratch[slopeAt], scratch[slopeAt + 1]]
      const [dRe, dIm] = [scratch[normalAt], scratch[normalAt + 1]]
      const [sRe, sIm] = [scratch[normalSlopeAt], scratch[normalSlopeAt + 1]]
      out.qRe[m] = k2 * (squareRe * dRe - squareIm * dIm)
      out.qIm[m] = k2 * (squareRe * dIm + squareIm * dRe)
      out.dqRe[m] = k2 * (2 * (re * dRe - im * dIm) + squareRe * sRe - squareIm * sIm)
      out.dqIm[m] = k2 * (2 * (re * dIm + im * dRe) + squareRe * sIm + squareIm * sRe)
      out.muRe[m] = isP ? nRe * nRe - nIm * nIm : 1
      out.muIm[m] = isP ? 2 * nRe * nIm : 0
      out.dmuRe[m] = isP ? 2 * (nRe * dnRe - nIm * dnIm) : 0
      out.dmuIm[m] = isP ? 2 * (nRe * dnIm + nIm * dnRe) : 0
    }
  }

  partials(energy: number, m: number, out: Float64Array): void {
    this.index(m, energy, indexAt)
    const k0 = energy * k0PerEv
    const n = this.scratch[indexAt]
    const kappa = this.scratch[indexAt + 1]
    out[0] = 2 * n * k0 * k0
    out[1] = this.isP ? 2 * n : 0
    if (this.lossless) return
    out[2] = 2 * kappa * k0 * k0
    out[3] = this.isP ? 2 * kappa : 0
  }

  /** N, N_from, D and their slopes at the complex energy re + i im. */
  private continued(m: number, re: number, im: number): void {
    const { scratch, sin2 } = this
    const { medium: from } = this.incidence
    this.index(m, re, indexAt)
    this.slope(m, re, slopeAt)
    this.index(from, re, fromAt)
    this.slope(from, re, fromSlopeAt)
    scratch[indexAt] -= im * scratch[slopeAt + 1]
    scratch[indexAt + 1] += im * scratch[slopeAt]
    scratch[fromAt] -= im * scratch[fromSlopeAt + 1]
    scratch[fromAt + 1] += im * scratch[fromSlopeAt]
    this.normal()
    const [nRe, nIm, dnRe, dnIm] = [scratch[0], scratch[1], scratch[2], scratch[3]]
    const [fRe, fIm, dfRe, dfIm] = [scratch[4], scratch[5], scratch[6], scratch[7]]
    scratch[normalSlopeAt] = 2 * (nRe * dnRe - nIm * dnIm - sin2 * (fRe * dfRe - fIm * dfIm))
    scratch[normalSlopeAt + 1] = 2 * (nRe * dnIm + nIm * dnRe - sin2 * (fRe * dfIm + fIm * dfRe))
  }

  /**
   * D = N² - F² sin² as (N - F)(N + F) + F² cos² when the angle is steep, so that a grazing wave keeps its digits; else as
   * N² - F² sin², so that a small N beside a large F keeps its own.
   */
  private normal(): void {
    const { scratch, sin2, cos2 } = this
    const [nRe, nIm, fRe, fIm] = [scratch[0], scratch[1], scratch[4], scratch[5]]
    const fromRe = fRe * fRe - fIm * fIm
    const fromIm = 2 * fRe * fIm
    if (sin2 > cos2) {
      const [minusRe, minusIm, plusRe, plusIm] = [nRe - fRe, nIm - fIm, nRe + fRe, nIm + fIm]
      scratch[normalAt] = minusRe * plusRe - minusIm * plusIm + fromRe * cos2
      scratch[normalAt + 1] = minusRe * plusIm + minusIm * plusRe + fromIm * cos2
    } else {
      scratch[normalAt] = nRe * nRe - nIm * nIm - fromRe * sin2
      scratch[normalAt + 1] = 2 * nRe * nIm - fromIm * sin2
    }
  }

  private index(m: number, energy: number, slot: number): void {
    const { index, extinction = 0 } = this.media[m]
    const nm = hcEvNm / energy
    this.scratch[slot] = valueAt(index, nm)
    this.scratch[slot + 1] = valueAt(extinction, nm)
  }

  private slope(m: number, energy: number, slot: number): void {
    const { index, extinction = 0 } = this.media[m]
    this.scratch[slot] = slopeOf(index, energy)
    this.scratch[slot + 1] = slopeOf(extinction, energy)
  }
}

const k0PerEv = (2 * Math.PI) / hcEvNm

function valueAt(of: OfWavelength, nm: number): number {
  if (typeof of === 'number') return of
  const value = of(nm)
  if (!Number.isFinite(value)) throw new StackError(`A refractive index or extinction is ${value} at ${nm} nm.`)
  return value
}

function slopeOf(of: OfWavelength, energy: number): number {
  if (typeof of === 'number') return 0
  const step = energy * 1e-5
  const up = energy + step
  const down = energy - step
  return (valueAt(of, hcEvNm / up) - valueAt(of, hcEvNm / down)) / (up - down)
}

/** Above 45 degrees through the complement, which is exact, so that the cosine of a grazing angle keeps its digits. */
function sinCosOfDegrees(degrees: number): [sin: number, cos: number] {
  const pair = new Float64Array(2)
  sinCos(((degrees <= 45 ? degrees : 90 - degrees) * Math.PI) / 180, pair)
  return degrees <= 45 ? [pair[0], pair[1]] : [pair[1], pair[0]]
}

import { hbar2Over2m0 } from '../media/index.js'
import type { MediaAtEnergy, MediaTable, WaveMedia } from '../wave/index.js'
import { StackError } from './StackError.js'
import type { Region } from './types.js'

/**
 * Electrons in regions of constant edge: with d = E - V, m(E) = m (1 + alpha d) and C = hbar²/2m0,
 *
 *     q = m(E) d / C - k_par²        mu = m(E)
 *
 * One medium a region, in their order; energies in eV, q in 1/nm². Parameters: potential (eV), mass (m0), alpha (1/eV).
 * `fill` and `fillSlope` throw StackError where m(E) <= 0: the energy lies at or below the valence edge, where the one-band
 * picture fails (broken gap). `at` follows the same formulas anywhere in the complex plane and throws nothing.
 */
export function electronMedia(regions: readonly Region[], inPlaneKPerNm = 0): WaveMedia {
  return new ElectronMedia(regions, inPlaneKPerNm)
}

class ElectronMedia implements WaveMedia {
  readonly count: number
  readonly lossless = true
  readonly parameters = 3
  private readonly potential: Float64Array
  private readonly mass: Float64Array
  private readonly alpha: Float64Array
  private readonly inPlane2: number

  constructor(regions: readonly Region[], inPlaneKPerNm: number) {
    const count = regions.length
    this.count = count
    this.potential = new Float64Array(count)
    this.mass = new Float64Array(count)
    this.alpha = new Float64Array(count)
    for (let m = 0; m < count; m++) {
      this.potential[m] = regions[m].potentialEv
      this.mass[m] = regions[m].massRel
      this.alpha[m] = regions[m].alphaPerEv ?? 0
    }
    this.inPlane2 = inPlaneKPerNm * inPlaneKPerNm
  }

  fill(energies: Float64Array, table: MediaTable): void {
    const { q, mu, points } = table
    const { inPlane2 } = this
    for (let m = 0; m < this.count; m++) {
      const potential = this.potential[m]
      const mass = this.mass[m]
      const alpha = this.alpha[m]
      for (let e = 0, i = m * points; e < points; e++, i++) {
        const above = energies[e] - potential
        const massAtE = mass * (1 + alpha * above)
        if (!(massAtE > 0)) this.refuse(m, energies[e], massAtE)
        q[i] = (massAtE / hbar2Over2m0) * above - inPlane2
        mu[i] = massAtE
      }
    }
    table.qIm?.fill(0)
    table.muIm?.fill(0)
  }

  fillSlope(energies: Float64Array, slope: MediaTable): void {
    const { q, mu, points } = slope
    for (let m = 0; m < this.count; m++) {
      const potential = this.potential[m]
      const mass = this.mass[m]
      const alpha = this.alpha[m]
      for (let e = 0, i = m * points; e < points; e++, i++) {
        const above = energies[e] - potential
        if (!(mass * (1 + alpha * above) > 0)) this.refuse(m, energies[e], mass * (1 + alpha * above))
        q[i] = (mass / hbar2Over2m0) * (1 + 2 * alpha * above)
        mu[i] = mass * alpha
      }
    }
    slope.qIm?.fill(0)
    slope.muIm?.fill(0)
  }

  at(re: number, im: number, out: MediaAtEnergy): void {
    for (let m = 0; m < this.count; m++) {
      const mass = this.mass[m]
      const alpha = this.alpha[m]
      const above = re - this.potential[m]
      const massRe = mass * (1 + alpha * above)
      const massIm = mass * alpha * im
      out.qRe[m] = (massRe / hbar2Over2m0) * above - (massIm / hbar2Over2m0) * im - this.inPlane2
      out.qIm[m] = (massRe / hbar2Over2m0) * im + (massIm / hbar2Over2m0) * above
      out.muRe[m] = massRe
      out.muIm[m] = massIm
      out.dqRe[m] = (mass / hbar2Over2m0) * (1 + 2 * alpha * above)
      out.dqIm[m] = (mass / hbar2Over2m0) * (2 * alpha * im)
      out.dmuRe[m] = mass * alpha
      out.dmuIm[m] = 0
    }
  }

  partials(energy: number, m: number, out: Float64Array): void {
    const mass = this.mass[m]
    const alpha = this.alpha[m]
    const above = energy - this.potential[m]
    out[0] = -(mass / hbar2Over2m0) * (1 + 2 * alpha * above)
    out[1] = -mass * alpha
    out[2] = ((1 + alpha * above) * above) / hbar2Over2m0
    out[3] = 1 + alpha * above
    out[4] = (mass * above * above) / hbar2Over2m0
    out[5] = mass * above
  }

  private refuse(m: number, energy: number, massAtE: number): never {
    throw new StackError(
      `Broken gap: at ${energy} eV the mass m(E) of a region with its edge at ${this.potential[m]} eV is ${massAtE}. ` +
        'The energy lies at or below its valence edge, where the one-band picture fails. Ask for higher energies.',
    )
  }
}

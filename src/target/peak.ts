import { energiesAround, type PeakDemand, type Quantity } from '../job/index.js'
import type { Extremum } from '../wave/index.js'
import { decibelSlope, excess, unitDb } from './decibels.js'
import type { JudgeLimit } from './Judge.js'
import type { Landscape } from './Landscape.js'
import { LineJudge, offPlace, offWidth, placeSlope, scaled, widthOn, widthSlope, widthSlopeOn } from './LineJudge.js'
import { type LineScale, lineScale } from './lineScale.js'
import { peakSlopes } from './peakSlopes.js'
import type { PeakFigures } from './types.js'

/** A local maximum of T: its energy, and what is stated of its width, its height and the other maxima in the scan. */
export class PeakJudge extends LineJudge<PeakFigures> {
  readonly kind = 'peak'
  readonly id: string
  readonly weight: number
  readonly parts: number
  readonly quantity: Quantity
  readonly rangeEv: readonly [number, number]

  private readonly scale: LineScale

  constructor(
    private readonly demand: PeakDemand,
    private readonly scanEv: readonly [number, number],
  ) {
    super()
    const { id, weight, quantity, axis, within, fwhm, height, alone } = demand
    this.id = id
    this.weight = weight
    this.quantity = quantity
    this.scale = lineScale(axis)
    // A width that is cut at twice its limit beyond the last allowed position is too wide for certain.
    const around = energiesAround(demand, within + 2 * (fwhm?.[1] ?? within))
    this.rangeEv = alone === null ? around : [Math.min(around[0], scanEv[0]), Math.max(around[1], scanEv[1])]
    this.parts = 1 + (fwhm ? 1 : 0) + (height === null ? 0 : 1) + (alone === null ? 0 : 1)
  }

  protected figures(landscape: Landscape, maximum: Extremum): PeakFigures {
    return landscape.figuresOf(maximum)
  }

  protected energyOf({ energyEv }: PeakFigures): number {
    return energyEv
  }

  protected verdict(peak: PeakFigures) {
    return { reached: peak.energyEv, peak }
  }

  /** All but the width. */
  protected cheap(landscape: Landscape, at: { readonly energyEv: number; readonly T: number }): number[] {
    const { height, alone } = this.demand
    const parts = [offPlace(this.scale.of(at.energyEv), this.demand)]
    if (height !== null) parts.push(Math.max(0, height - at.T) / Math.max(1 - height, 0.01))
    if (alone !== null) parts.push(excess(this.other(landscape, at.energyEv)?.T ?? 0, alone))
    return parts
  }

  protected residuals(landscape: Landscape, peak: PeakFigures): number[] {
    const { fwhm } = this.demand
    const [position, ...rest] = this.cheap(landscape, peak)
    return fwhm ? [position, offWidth(widthOn(this.scale, peak), fwhm), ...rest] : [position, ...rest]
  }

  protected slopes(landscape: Landscape, peak: PeakFigures): Float64Array[] {
    const { fwhm, height, alone } = this.demand
    const { scale } = this
    const slopes = peakSlopes(landscape, peak)
    const [x, dx] = [scale.of(peak.energyEv), scale.slope(peak.energyEv)]
    const rows = [scaled(slopes.energy, placeSlope(x, this.demand) * dx)]
    if (fwhm) rows.push(scaled(widthSlopeOn(scale, peak, slopes), widthSlope(widthOn(scale, peak), fwhm)))
    if (height !== null) rows.push(scaled(slopes.height, -1 / Math.max(1 - height, 0.01)))
    if (alone !== null) rows.push(scaled(this.otherSlope(landscape, peak.energyEv), 1 / unitDb))
    return rows
  }

  protected limitsOf(landscape: Landscape, peak: PeakFigures): JudgeLimit[] {
    const { axis, centre, within, fwhm, height, alone } = this.demand
    const { scale } = this
    const slopes = peakSlopes(landscape, peak)
    const [x, dx] = [scale.of(peak.energyEv), scale.slope(peak.energyEv)]
    const [lowest, highest] = endsOf[axis]
    const limits = [
      this.limit(lowest, x - centre + within, scaled(slopes.energy, dx)),
      this.limit(highest, centre + within - x, scaled(slopes.energy, -dx)),
    ]
    if (fwhm) {
      const [width, slope] = [widthOn(scale, peak), widthSlopeOn(scale, peak, slopes)]
      limits.push(this.limit('least fwhm', width - fwhm[0], slope))
      limits.push(this.limit('greatest fwhm', fwhm[1] - width, scaled(slope, -1)))
    }
    if (height !== null) limits.push(this.limit('height', peak.T - height, slopes.height))
    const other = alone === null ? null : this.other(landscape, peak.energyEv)
    if (other && alone !== null) {
      const slack = -unitDb * signedExcess(other.T, alone)
      limits.push(this.limit('alone', slack, scaled(this.otherSlope(landscape, peak.energyEv), -1)))
    }
    return limits
  }

  /** The highest other maximum in the scan. */
  private other({ extrema }: Landscape, energyEv: number): Extremum | null {
    const [low, high] = this.scanEv
    let highest: Extremum | null = null
    for (const one of extrema) {
      if (one.kind !== 'maximum' || one.energyEv === energyEv || one.energyEv < low || one.energyEv > high) continue
      if (highest === null || one.T > highest.T) highest = one
    }
    return highest
  }

  /** d(10 log10 T)/d(layer parameter) of that maximum, at its own energy (envelope theorem). */
  private otherSlope(landscape: Landscape, energyEv: number): Float64Array {
    const other = this.other(landscape, energyEv)
    if (other === null) return new Float64Array(landscape.layerParameters)
    const { T, gradient } = landscape.gradient([other.energyEv])
    return scaled(gradient, decibelSlope(T[0]))
  }
}

/** What the ends of `within` are called. */
export const endsOf = {
  eV: ['lowest energy', 'highest energy'],
  nm: ['shortest wavelength', 'longest wavelength'],
} as const

function signedExcess(T: number, t: number): number {
  return T > t ? excess(T, t) : -excess(t, T)
}

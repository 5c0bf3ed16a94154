import { type BandDemand, energiesAround, type Quantity } from '../job/index.js'
import type { Extremum } from '../wave/index.js'
import { type BandShape, type BandSlopes, bandShapeOf, bandSlopes } from './bandFigures.js'
import type { JudgeLimit } from './Judge.js'
import type { Landscape } from './Landscape.js'
import { LineJudge, offPlace, offWidth, placeSlope, scaled, widthOn, widthSlope, widthSlopeOn } from './LineJudge.js'
import { type LineScale, lineScale } from './lineScale.js'
import { endsOf } from './peak.js'
import type { PeakFigures } from './types.js'

/** A flat top: its centre, and what is stated of its width, its mean height and its greatest dip. */
export class BandJudge extends LineJudge<BandShape> {
  readonly kind = 'band'
  readonly id: string
  readonly weight: number
  readonly parts: number
  readonly quantity: Quantity
  readonly rangeEv: readonly [number, number]
  private readonly scale: LineScale

  constructor(private readonly demand: BandDemand) {
    super()
    const { id, weight, quantity, axis, within, fwhm, top, ripple } = demand
    this.id = id
    this.weight = weight
    this.quantity = quantity
    this.scale = lineScale(axis)
    // As for a peak; the maximum may lie half a width from the centre.
    this.rangeEv = fwhm ? energiesAround(demand, within + 3 * fwhm[1]) : [0, Number.POSITIVE_INFINITY]
    this.parts = 1 + (fwhm ? 1 : 0) + (top === null ? 0 : 1) + (ripple === null ? 0 : 1)
  }

  protected figures(landscape: Landscape, maximum: Extremum): BandShape {
    return bandShapeOf(landscape, maximum)
  }

  protected energyOf({ peak }: BandShape): number {
    return peak.energyEv
  }

  protected verdict({ centreEv, top, ripple, peak }: BandShape) {
    const { scale } = this
    return { reached: scale.energy(this.centreOf(peak)), peak, band: { centreEv, top, ripple, peak } }
  }

  /** Half way between the half-height points, on the axis of the demand. */
  private centreOf({ lowEv, highEv }: PeakFigures): number {
    return 0.5 * (this.scale.of(lowEv) + this.scale.of(highEv))
  }

  private centreSlope({ lowEv, highEv }: PeakFigures, { low, high }: BandSlopes): Float64Array {
    const { scale } = this
    return low.map((one, k) => 0.5 * (scale.slope(lowEv) * one + scale.slope(highEv) * high[k]))
  }

  /** What the half-height points tell. */
  protected cheap(landscape: Landscape, maximum: Extremum): number[] {
    const peak = landscape.figuresOf(maximum)
    const { fwhm } = this.demand
    const position = offPlace(this.centreOf(peak), this.demand)
    return fwhm ? [position, offWidth(widthOn(this.scale, peak), fwhm)] : [position]
  }

  protected residuals(_: Landscape, { top, ripple, peak }: BandShape): number[] {
    const { fwhm, top: least, ripple: most } = this.demand
    const parts = [offPlace(this.centreOf(peak), this.demand)]
    if (fwhm) parts.push(offWidth(widthOn(this.scale, peak), fwhm))
    if (least !== null) parts.push(Math.max(0, least - top) / Math.max(1 - least, 0.01))
    if (most !== null) parts.push(Math.max(0, ripple - most) / Math.max(most, 0.01))
    return parts
  }

  protected slopes(landscape: Landscape, band: BandShape): Float64Array[] {
    const { fwhm, top, ripple } = this.demand
    const { scale } = this
    const slopes = bandSlopes(landscape, band)
    const { peak } = band
    const rows = [scaled(this.centreSlope(peak, slopes), placeSlope(this.centreOf(peak), this.demand))]
    if (fwhm) rows.push(scaled(widthSlopeOn(scale, peak, slopes), widthSlope(widthOn(scale, peak), fwhm)))
    if (top !== null) rows.push(scaled(slopes.top, -1 / Math.max(1 - top, 0.01)))
    if (ripple !== null) rows.push(scaled(slopes.ripple, 1 / Math.max(ripple, 0.01)))
    return rows
  }

  protected limitsOf(landscape: Landscape, band: BandShape): JudgeLimit[] {
    const { axis, centre, within, fwhm, top, ripple } = this.demand
    const { scale } = this
    const { peak } = band
    const slopes = bandSlopes(landscape, band)
    const [x, slope] = [this.centreOf(peak), this.centreSlope(peak, slopes)]
    const [lowest, highest] = endsOf[axis]
    const limits = [
      this.limit(lowest, x - centre + within, slope),
      this.limit(highest, centre + within - x, scaled(slope, -1)),
    ]
    if (fwhm) {
      const [width, byWidth] = [widthOn(scale, peak), widthSlopeOn(scale, peak, slopes)]
      limits.push(this.limit('least fwhm', width - fwhm[0], byWidth))
      limits.push(this.limit('greatest fwhm', fwhm[1] - width, scaled(byWidth, -1)))
    }
    if (top !== null) limits.push(this.limit('top', band.top - top, slopes.top))
    if (ripple !== null) limits.push(this.limit('ripple', ripple - band.ripple, scaled(slopes.ripple, -1)))
    return limits
  }
}

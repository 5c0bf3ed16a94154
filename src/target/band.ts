import type { BandDemand } from '../job/index.js'
import type { Extremum } from '../wave/index.js'
import { type BandShape, bandShapeOf, bandSlopes } from './bandFigures.js'
import type { JudgeLimit } from './Judge.js'
import type { Landscape } from './Landscape.js'
import { LineJudge, offPlace, offWidth, placeSlope, scaled, widthSlope } from './LineJudge.js'

/** A flat top: its centre, and what is stated of its width, its mean height and its greatest dip. */
export class BandJudge extends LineJudge<BandShape> {
  readonly kind = 'band'
  readonly id: string
  readonly weight: number
  readonly parts: number
  readonly rangeEv: readonly [number, number]

  constructor(private readonly demand: BandDemand) {
    super()
    const { id, weight, energyEv, withinEv, fwhmEv, top, ripple } = demand
    this.id = id
    this.weight = weight
    // As for a peak; the maximum may lie half a width from the centre.
    const reach = withinEv + 3 * (fwhmEv?.[1] ?? withinEv)
    this.rangeEv = fwhmEv ? [energyEv - reach, energyEv + reach] : [0, Number.POSITIVE_INFINITY]
    this.parts = 1 + (fwhmEv ? 1 : 0) + (top === null ? 0 : 1) + (ripple === null ? 0 : 1)
  }

  protected figures(landscape: Landscape, maximum: Extremum): BandShape {
    return bandShapeOf(landscape, maximum)
  }

  protected energyOf({ peak }: BandShape): number {
    return peak.energyEv
  }

  protected verdict({ centreEv, top, ripple, peak }: BandShape) {
    return { reached: centreEv, peak, band: { centreEv, top, ripple, peak } }
  }

  /** What the half-height points tell. */
  protected cheap(landscape: Landscape, maximum: Extremum): number[] {
    const { lowEv, highEv, fwhmEv: width } = landscape.figuresOf(maximum)
    const { fwhmEv } = this.demand
    const position = offPlace(0.5 * (lowEv + highEv), this.demand)
    return fwhmEv ? [position, offWidth(width, fwhmEv)] : [position]
  }

  protected residuals(_: Landscape, { centreEv, top, ripple, peak }: BandShape): number[] {
    const { fwhmEv, top: least, ripple: most } = this.demand
    const parts = [offPlace(centreEv, this.demand)]
    if (fwhmEv) parts.push(offWidth(peak.fwhmEv, fwhmEv))
    if (least !== null) parts.push(Math.max(0, least - top) / Math.max(1 - least, 0.01))
    if (most !== null) parts.push(Math.max(0, ripple - most) / Math.max(most, 0.01))
    return parts
  }

  protected slopes(landscape: Landscape, band: BandShape): Float64Array[] {
    const { fwhmEv, top, ripple } = this.demand
    const slopes = bandSlopes(landscape, band)
    const rows = [scaled(slopes.centre, placeSlope(band.centreEv, this.demand))]
    if (fwhmEv) rows.push(scaled(slopes.fwhm, widthSlope(band.peak.fwhmEv, fwhmEv)))
    if (top !== null) rows.push(scaled(slopes.top, -1 / Math.max(1 - top, 0.01)))
    if (ripple !== null) rows.push(scaled(slopes.ripple, 1 / Math.max(ripple, 0.01)))
    return rows
  }

  protected limitsOf(landscape: Landscape, band: BandShape): JudgeLimit[] {
    const { energyEv, withinEv, fwhmEv, top, ripple } = this.demand
    const slopes = bandSlopes(landscape, band)
    const limits = [
      this.limit('lowest energy', band.centreEv - energyEv + withinEv, slopes.centre),
      this.limit('highest energy', energyEv + withinEv - band.centreEv, scaled(slopes.centre, -1)),
    ]
    if (fwhmEv) {
      limits.push(this.limit('least fwhm', band.peak.fwhmEv - fwhmEv[0], slopes.fwhm))
      limits.push(this.limit('greatest fwhm', fwhmEv[1] - band.peak.fwhmEv, scaled(slopes.fwhm, -1)))
    }
    if (top !== null) limits.push(this.limit('top', band.top - top, slopes.top))
    if (ripple !== null) limits.push(this.limit('ripple', ripple - band.ripple, scaled(slopes.ripple, -1)))
    return limits
  }
}

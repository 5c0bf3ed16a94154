import type { PeakDemand } from '../job/index.js'
import { type Judge, nothing, type Verdict } from './Judge.js'
import type { Landscape } from './Landscape.js'
import { peakSlopes } from './peakSlopes.js'
import type { Limit, PeakFigures } from './types.js'

/** Every part of a peak that has no maximum at all. */
const none = 10

/** The local maximum of T in the window that fits best: least mean square of the parts that are stated; tie: lower energy. */
export class PeakJudge implements Judge {
  readonly kind = 'peak'
  readonly terms = null
  readonly id: string
  readonly weight: number
  readonly parts: number
  readonly rangeEv: readonly [number, number]

  constructor(private readonly demand: PeakDemand) {
    this.id = demand.id
    this.weight = demand.weight
    // A width that is cut at twice its limit beyond the last allowed position is too wide for certain.
    const reach = demand.withinEv + 2 * (demand.fwhmEv?.[1] ?? demand.withinEv)
    this.rangeEv = [demand.energyEv - reach, demand.energyEv + reach]
    this.parts = 1 + (demand.fwhmEv ? 1 : 0) + (demand.height === null ? 0 : 1)
  }

  judge(landscape: Landscape): Verdict {
    const peak = this.best(landscape)
    if (!peak) return { square: none * none, reached: null, met: false, extremeEv: null, peak: null }
    const square = this.square(this.residuals(peak))
    return { square, reached: peak.energyEv, met: this.meets(peak), extremeEv: null, peak }
  }

  met(landscape: Landscape): boolean {
    const peak = this.best(landscape)
    return peak !== null && this.meets(peak)
  }

  /** Without a maximum the residuals stay at their constant: which way one would appear no slope can tell. */
  fitParts(landscape: Landscape, residuals: Float64Array): Float64Array[] {
    const peak = this.best(landscape)
    const empty = () => new Float64Array(landscape.layerParameters)
    if (!peak) {
      residuals.fill(none, 0, this.parts)
      return Array.from(residuals.subarray(0, this.parts), empty)
    }
    const parts = this.residuals(peak)
    residuals.set(parts)
    if (!parts.some((residual) => residual > 0)) return parts.map(empty)
    const slopes = peakSlopes(landscape, peak)
    const { energyEv, withinEv, fwhmEv, height } = this.demand
    const rows = [scaled(slopes.energy, (peak.energyEv > energyEv ? 1 : -1) / withinEv)]
    if (fwhmEv) rows.push(scaled(slopes.fwhm, (peak.fwhmEv > fwhmEv[1] ? 2 : -2) / (fwhmEv[1] - fwhmEv[0])))
    if (height !== null) rows.push(scaled(slopes.height, -1 / Math.max(1 - height, 0.01)))
    return rows.map((row, i) => (parts[i] > 0 ? row : empty()))
  }

  limits(landscape: Landscape): Limit[] {
    const peak = this.best(landscape)
    if (!peak) return []
    const { energyEv, withinEv, fwhmEv, height } = this.demand
    const slopes = peakSlopes(landscape, peak)
    const limit = (part: string, slack: number, gradient: Float64Array) => ({ demand: this.id, part, slack, gradient })
    const limits = [
      limit('lowest energy', peak.energyEv - energyEv + withinEv, slopes.energy),
      limit('highest energy', energyEv + withinEv - peak.energyEv, scaled(slopes.energy, -1)),
    ]
    if (fwhmEv) {
      limits.push(limit('least fwhm', peak.fwhmEv - fwhmEv[0], slopes.fwhm))
      limits.push(limit('greatest fwhm', fwhmEv[1] - peak.fwhmEv, scaled(slopes.fwhm, -1)))
    }
    if (height !== null) limits.push(limit('height', peak.T - height, slopes.height))
    return limits
  }

  /** Half widths cost most: maxima are taken by what position and height alone allow, until none left can be better. */
  private best(landscape: Landscape): PeakFigures | null {
    const { energyEv } = this.demand
    const candidates = landscape.extrema
      .filter(({ kind }) => kind === 'maximum')
      .map((maximum) => ({ maximum, least: this.square(this.cheapResiduals(maximum)) }))
      .sort((a, b) => a.least - b.least || distance(a.maximum) - distance(b.maximum))
    let best: PeakFigures | null = null
    let bestSquare = Infinity
    for (const { maximum, least } of candidates) {
      if (least > bestSquare) break
      const figures = landscape.figuresOf(maximum)
      const square = this.square(this.residuals(figures))
      if (!best || square < bestSquare || (square === bestSquare && figures.energyEv < best.energyEv)) {
        best = figures
        bestSquare = square
      }
    }
    return best

    function distance(maximum: { readonly energyEv: number }): number {
      return Math.abs(maximum.energyEv - energyEv)
    }
  }

  private meets(peak: PeakFigures): boolean {
    return this.residuals(peak).every((residual) => residual <= nothing)
  }

  /** Position, then what is stated of fwhm and height. */
  private residuals(peak: PeakFigures): number[] {
    const { fwhmEv } = this.demand
    const [position, ...rest] = this.cheapResiduals(peak)
    if (!fwhmEv) return [position, ...rest]
    const [a, b] = fwhmEv
    return [position, Math.max(0, a - peak.fwhmEv, peak.fwhmEv - b) / ((b - a) / 2), ...rest]
  }

  /** The same without the fwhm. */
  private cheapResiduals(at: { readonly energyEv: number; readonly T: number }): number[] {
    const { energyEv, withinEv, height } = this.demand
    const position = Math.max(0, Math.abs(at.energyEv - energyEv) - withinEv) / withinEv
    return height === null ? [position] : [position, Math.max(0, height - at.T) / Math.max(1 - height, 0.01)]
  }

  /** Mean over the parts that are stated, parts left out counting as met. */
  private square(residuals: readonly number[]): number {
    let sum = 0
    for (const residual of residuals) sum += residual * residual
    return sum / this.parts
  }
}

function scaled(values: Float64Array, factor: number): Float64Array {
  return values.map((value) => factor * value)
}

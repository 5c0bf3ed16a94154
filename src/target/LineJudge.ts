import type { Quantity } from '../job/index.js'
import type { Extremum } from '../wave/index.js'
import { type Judge, type JudgeLimit, nothing, type Verdict } from './Judge.js'
import type { Landscape } from './Landscape.js'
import { type LineScale, lineScale } from './lineScale.js'
import type { PeakSlopes } from './peakSlopes.js'
import type { PeakFigures } from './types.js'

/** A line narrower than this share of its energy. */
const needle = 1e-9

/** Every part of a line that has no maximum at all. */
const none = 10

/**
 * A demand on one line of T, a peak or a band: of the local maxima in the window the one that fits best counts, the least mean square of
 * the parts that are stated; tie: lower energy. `Figures` is what is found out about a maximum.
 */
export abstract class LineJudge<Figures> implements Judge {
  abstract readonly kind: 'peak' | 'band'
  abstract readonly id: string
  abstract readonly weight: number
  abstract readonly parts: number
  abstract readonly quantity: Quantity
  abstract readonly rangeEv: readonly [number, number]
  readonly terms = null

  /** Residuals of some of the parts, for little cost: the mean square of a maximum is at least theirs. */
  protected abstract cheap(landscape: Landscape, maximum: Extremum): readonly number[]
  protected abstract figures(landscape: Landscape, maximum: Extremum): Figures
  /** One residual a part. */
  protected abstract residuals(landscape: Landscape, figures: Figures): readonly number[]
  /** d(residual)/d(layer parameter) of each part, as if none were met. */
  protected abstract slopes(landscape: Landscape, figures: Figures): readonly Float64Array[]
  protected abstract limitsOf(landscape: Landscape, figures: Figures): JudgeLimit[]
  protected abstract verdict(
    figures: Figures,
  ): { readonly reached: number; readonly peak: PeakFigures } & Partial<Verdict>
  protected abstract energyOf(figures: Figures): number

  judge(landscape: Landscape): Verdict {
    const best = this.best(landscape)
    if (best === null)
      return { square: none * none, reached: null, met: false, extremeEv: null, peak: null, band: null }
    const residuals = this.residuals(landscape, best)
    const met = residuals.every((residual) => residual <= nothing)
    return { square: this.square(residuals), met, extremeEv: null, band: null, ...this.verdict(best) }
  }

  met(landscape: Landscape): boolean {
    const best = this.best(landscape)
    return best !== null && this.residuals(landscape, best).every((residual) => residual <= nothing)
  }

  /** Without a maximum the residuals stay at their constant: which way one would appear no slope can tell. */
  fitParts(landscape: Landscape, residuals: Float64Array): Float64Array[] {
    const best = this.best(landscape)
    const empty = () => new Float64Array(landscape.layerParameters)
    if (best === null) {
      residuals.fill(none, 0, this.parts)
      return Array.from(residuals.subarray(0, this.parts), empty)
    }
    const parts = this.residuals(landscape, best)
    residuals.set(parts)
    if (!parts.some((residual) => residual > 0)) return parts.map(empty)
    return this.slopes(landscape, best).map((row, i) => (parts[i] > 0 ? row : empty()))
  }

  limits(landscape: Landscape): JudgeLimit[] {
    const best = this.best(landscape)
    return best === null ? [] : this.limitsOf(landscape, best)
  }

  protected limit(part: string, slack: number, gradient: Float64Array): JudgeLimit {
    return { demand: this.id, part, slack, gradient }
  }

  /** Whole figures cost most: maxima are taken by what is cheap to know, until none left can be better. */
  private best(landscape: Landscape): Figures | null {
    const candidates = landscape.extrema
      .filter(({ kind }) => kind === 'maximum')
      .map((maximum) => ({ maximum, least: this.square(this.cheap(landscape, maximum)) }))
      .sort((a, b) => a.least - b.least)
    let best: Figures | null = null
    let bestSquare = Infinity
    for (const { maximum, least } of candidates) {
      if (least > bestSquare) break
      const figures = this.figures(landscape, maximum)
      const square = this.square(this.residuals(landscape, figures))
      if (
        best === null ||
        square < bestSquare ||
        (square === bestSquare && this.energyOf(figures) < this.energyOf(best))
      ) {
        best = figures
        bestSquare = square
      }
    }
    return best
  }

  /** Mean over the parts that are stated, parts left out counting as met. */
  private square(residuals: readonly number[]): number {
    let sum = 0
    for (const residual of residuals) sum += residual * residual
    return sum / this.parts
  }
}

/** max(0, abs(x - x0) - within)/within, x the place on the axis of the line. */
export function offPlace(x: number, { centre, within }: Place): number {
  return Math.max(0, Math.abs(x - centre) - within) / within
}

/** max(0, a - f, f - b)/((b - a)/2). */
export function offWidth(fwhm: number, [a, b]: readonly [number, number]): number {
  return Math.max(0, a - fwhm, fwhm - b) / ((b - a) / 2)
}

interface Place {
  readonly centre: number
  readonly within: number
}

/** Slopes of `offPlace` and `offWidth` in what they are unmet by. */
export function placeSlope(x: number, { centre, within }: Place): number {
  return (x > centre ? 1 : -1) / within
}

export function widthSlope(fwhm: number, [a, b]: readonly [number, number]): number {
  return (fwhm > b ? 2 : -2) / (b - a)
}

/** The width of a line on its axis. */
export function widthOn(scale: LineScale, { lowEv, highEv, fwhmEv }: PeakFigures): number {
  // The ends of a needle have no digits of its width.
  if (scale === lineScale('eV')) return fwhmEv
  return fwhmEv < needle * highEv ? Math.abs(scale.slope(highEv)) * fwhmEv : scale.width(lowEv, highEv)
}

/** d(width on the axis)/d(layer parameter) from those of the ends. */
export function widthSlopeOn(
  scale: LineScale,
  { lowEv, highEv }: PeakFigures,
  slopes: Pick<PeakSlopes, 'fwhm' | 'high' | 'low'>,
): Float64Array {
  if (scale === lineScale('eV')) return slopes.fwhm
  const [atLow, atHigh] = [Math.abs(scale.slope(lowEv)), Math.abs(scale.slope(highEv))]
  return slopes.fwhm.map((_, k) => atHigh * slopes.high[k] - atLow * slopes.low[k])
}

export function scaled(values: Float64Array, factor: number): Float64Array {
  return values.map((value) => factor * value)
}

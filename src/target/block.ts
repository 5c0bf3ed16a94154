import type { BlockDemand, Quantity } from '../job/index.js'
import { type Extremum, log10 } from '../wave/index.js'
import { decibelSlope, excess, unitDb } from './decibels.js'
import { extremeError, type Judge, type JudgeLimit, nothing, type PointTerms, type Verdict } from './Judge.js'
import type { Landscape } from './Landscape.js'
import { meanSquare } from './meanSquare.js'
import { peakSlopes } from './peakSlopes.js'

/**
 * T at most t over a closed range: 10 log10(T/t) over 3 dB at its points and at the greatest T. `resolutionEv`: a maximum with a
 * pole of Gamma within its own width counts with T min(1, (pi/2) Gamma/resolution), the mean over a detector that wide.
 */
export class BlockJudge implements Judge {
  readonly kind = 'block'
  readonly parts = 0
  readonly id: string
  readonly weight: number
  readonly quantity: Quantity
  readonly rangeEv: readonly [number, number]
  readonly terms: PointTerms

  constructor(
    private readonly demand: BlockDemand,
    first: number,
    private readonly resolutionEv: number | null,
  ) {
    this.id = demand.id
    this.weight = demand.weight
    this.quantity = demand.quantity
    this.rangeEv = [demand.pointsEv[0], demand.pointsEv[demand.pointsEv.length - 1]]
    const { below, pointsEv } = demand
    this.terms = {
      energiesEv: pointsEv,
      first,
      share: () => 1 / pointsEv.length,
      residual: (_, T) => excess(T, below),
      slope: (_, T) => (T > below ? decibelSlope(T) / unitDb : 0),
      goal: () => [0, below],
      // A maximum that the detector does not resolve may count less than the points on it; the ends count as they are.
      extreme: (i, T) =>
        resolutionEv === null || i === 0 || i === pointsEv.length - 1 ? excess(T * (1 - extremeError), below) : 0,
    }
  }

  judge(landscape: Landscape): Verdict {
    const points = meanSquare(this.terms, landscape.T)
    const { energyEv, T } = this.greatest(landscape)
    const extreme = excess(T, this.demand.below)
    const met = this.pointsMet(landscape) && extreme <= nothing
    return { square: points + extreme * extreme, reached: T, met, extremeEv: energyEv, peak: null, band: null }
  }

  met(landscape: Landscape): boolean {
    return this.pointsMet(landscape) && excess(this.greatest(landscape).T, this.demand.below) <= nothing
  }

  fitParts(): Float64Array[] {
    return []
  }

  limits(landscape: Landscape): JudgeLimit[] {
    const { energyEv, T } = this.greatest(landscape)
    const slack = T > 0 ? 10 * log10(this.demand.below / T) : Infinity
    const { T: bare, gradient } = landscape.gradient([energyEv])
    const row = gradient.map((slope) => (T > 0 ? -decibelSlope(bare[0]) * slope : 0))
    const unresolved = landscape.extrema.find((e) => e.energyEv === energyEv && this.factor(e) < 1)
    if (unresolved) {
      // T Gamma counts, not T: the width has a share in the slope.
      const peak = landscape.figuresOf(unresolved)
      const { fwhm, height } = peakSlopes(landscape, peak)
      for (let k = 0; k < row.length; k++) {
        row[k] = -(10 / Math.LN10) * (height[k] / peak.T + fwhm[k] / peak.fwhmEv)
      }
    }
    return [{ demand: this.id, part: 'greatest T', slack, gradient: row }]
  }

  /** The greatest T that counts, and its energy. */
  private greatest(landscape: Landscape): { energyEv: number; T: number } {
    const counted = landscape.extrema.map((e) => ({ ...e, T: e.T * this.factor(e) }))
    return landscape.extremeOver(this.rangeEv, 'greatest', counted)
  }

  private factor({ kind, poleWidthEv }: Extremum): number {
    if (this.resolutionEv === null || kind === 'minimum' || poleWidthEv === null) return 1
    return Math.min(1, ((Math.PI / 2) * poleWidthEv) / this.resolutionEv)
  }

  private pointsMet({ T }: Landscape): boolean {
    const { below, pointsEv } = this.demand
    return pointsEv.every((_, i) => excess(T[this.terms.first + i], below) <= nothing)
  }
}

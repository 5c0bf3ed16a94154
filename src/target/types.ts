import type { WaveSystem } from '../wave/index.js'

export interface PeakFigures {
  readonly energyEv: number
  readonly T: number
  /** Half-height points of the peak's own height, cut at the window's ends. */
  readonly lowEv: number
  readonly highEv: number
  readonly fwhmEv: number
}

/** A flat top, between the half-height points of its maximum. */
export interface BandFigures {
  /** Half way between them. */
  readonly centreEv: number
  /** Mean of T over the inner 80 %, and the greatest dip there: greatest less least T. */
  readonly top: number
  readonly ripple: number
  readonly peak: PeakFigures
}

export interface DemandResult {
  readonly id: string
  readonly kind: 'peak' | 'band' | 'pass' | 'block' | 'curve'
  /** Peak: its energy (eV), band: its centre, null without a maximum; pass, block: the extreme T; curve: the rms. */
  readonly reached: number | null
  /** Root mean square of the residuals. */
  readonly rms: number
  /** Null for a curve, which is a goal and no limit. */
  readonly met: boolean | null
  /** Energy of the extreme of a pass or block. */
  readonly extremeEv: number | null
  /** Of a peak, or the maximum that a band was measured from. */
  readonly peak: PeakFigures | null
  readonly band: BandFigures | null
  /** Number of the condition that the figures are of: the worst of those at which the demand holds. */
  readonly condition: number
}

export interface Evaluation {
  readonly merit: number
  /** All limits are met at every condition. */
  readonly met: boolean
  readonly demands: readonly DemandResult[]
  /** Of the first peak or band demand, else the highest maximum of the scan (of the window where that has none); null when there is none. */
  readonly peak: PeakFigures | null
  /** Number of the condition at which that peak is. */
  readonly peakCondition: number
}

/** A limit g >= 0 in natural units, with dg/d(layer parameter): [width, then the medium's own] a layer. */
export interface Limit {
  readonly demand: string
  readonly part: string
  /** Number of the condition at which it holds. */
  readonly condition: number
  readonly slack: number
  readonly gradient: Float64Array
}

/** What T at one energy and condition adds to the merit squared. */
export interface PointShare {
  readonly condition: number
  readonly energyEv: number
  /** Its own term; none for T from `goal[0]` to `goal[1]`, growing on either side. */
  square(T: number): number
  /** What the extreme of its demand adds at least, by this point. Only the greatest of a demand at a condition counts. */
  extreme(T: number): number
  readonly goal: readonly [number, number]
}

/** The demands of a job, ready to judge stacks. Systems come one a condition, in the job's order. */
export interface Target {
  /** All demands are on what is transmitted. */
  readonly onlyT: boolean
  /** Residuals of the fit: point terms and the parts of peaks. */
  readonly fitSize: number
  /** All that a bound reads of a stack, over all conditions. */
  readonly pointShares: readonly PointShare[]
  /** A lower bound of the merit from T at the points: their terms, and extremes that are at least as bad as the worst of them. */
  bound(systems: readonly WaveSystem[]): number
  /** The merit of the point terms alone. */
  pointMerit(systems: readonly WaveSystem[]): number
  /** Merit and met of `evaluate` without the figures: all that a search compares. Cheap for curves alone, which need no maxima. */
  verdict(systems: readonly WaveSystem[]): { readonly merit: number; readonly met: boolean }
  /** Which demands are met, in their order, a curve always: all that a yield counts, at less cost than `evaluate`. */
  meets(systems: readonly WaveSystem[]): boolean[]
  evaluate(systems: readonly WaveSystem[]): Evaluation
  /**
   * The residuals that Levenberg-Marquardt minimises, scaled so that their sum of squares is the merit squared without its
   * extremes. `jacobian[i * variables + v]`, from d(layer parameter)/d(variable) in `directions`, one a condition.
   */
  fit(
    systems: readonly WaveSystem[],
    directions: readonly Float64Array[],
    variables: number,
    residuals: Float64Array,
    jacobian: Float64Array,
  ): void
  /** Every limit of a stack that was evaluated; slacks are negative where unmet. */
  limits(systems: readonly WaveSystem[], evaluation: Evaluation): Limit[]
  /** Energy (eV) of the maximum in the window that lies nearest to `energyEv`; null when there is none. */
  maximumNear(system: WaveSystem, energyEv: number): number | null
  /** dE/d(layer parameter) of that maximum. */
  maximumSlope(system: WaveSystem, energyEv: number): Float64Array | null
}

/** What the order of stacks compares (design 3). */
export interface Score {
  readonly met: boolean
  readonly merit: number
  /** Null when unmet, or when the job has no limits. */
  readonly margin: number | null
  readonly totalNm: number
  readonly id: string
}

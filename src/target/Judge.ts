import type { Quantity } from '../job/index.js'
import type { Landscape } from './Landscape.js'
import type { DemandResult, Limit } from './types.js'

/** One demand, ready to judge a stack at one condition. */
export interface Judge {
  readonly id: string
  readonly kind: DemandResult['kind']
  readonly weight: number
  /** The share that it judges. */
  readonly quantity: Quantity
  /** What it reads at fixed energies; null for a peak or band. */
  readonly terms: PointTerms | null
  /** How many parts a peak or band states, which the fit takes one by one; 0 for the others. */
  readonly parts: number
  judge(landscape: Landscape): Verdict
  /** The energies that decide whether it is met; null for a curve. */
  readonly rangeEv: readonly [number, number] | null
  /** Whether the demand is met, from a landscape that spans `rangeEv` at least; null for a curve. */
  met(landscape: Landscape): boolean | null
  /** Writes a residual a part into `residuals` and returns the slopes of each, [width, then the medium's own] a layer. */
  fitParts(landscape: Landscape, residuals: Float64Array): Float64Array[]
  limits(landscape: Landscape): JudgeLimit[]
}

/** A limit at whatever condition the landscape is of. */
export type JudgeLimit = Omit<Limit, 'condition'>

/** What a demand says of a stack at one condition. */
export interface Verdict extends Pick<DemandResult, 'reached' | 'met' | 'extremeEv' | 'peak' | 'band'> {
  /** Mean square of the residuals. */
  readonly square: number
}

/** Residuals that hang on T at fixed energies, each with its share of the mean square; shares add up to 1. */
export interface PointTerms {
  readonly energiesEv: readonly number[]
  /** Of the first energy among all points of the target. */
  readonly first: number
  share(i: number): number
  residual(i: number, T: number): number
  /** d(residual)/dT. */
  slope(i: number, T: number): number
  /** The T without a residual, from and to; the residual grows on either side. */
  goal(i: number): readonly [number, number]
  /** The least residual that the extreme over the range can have, by this point; 0 where there is no extreme or the point says nothing. */
  extreme(i: number, T: number): number
}

/** Relative error up to which an extreme of T is known (design 3): a point may lie so far beyond the one that was found. */
export const extremeError = 1e-9

/** The largest residual that counts as met (design 3). */
export const nothing = 1e-9

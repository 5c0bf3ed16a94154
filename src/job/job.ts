/** A job as read, checked and filled with its defaults: energies in eV, lengths in nm, kelvin, fractions. */

export type Kind = 'electron' | 'light'

export interface Job {
  /** Where it was read from, and the exact text. */
  readonly file: string
  readonly text: string
  /** Contents of every file that the job names, by the name as written. */
  readonly files: Readonly<Record<string, string>>

  readonly format: 1
  readonly name: string
  readonly kind: Kind
  readonly note: string
  readonly conditions: readonly Condition[]
  readonly stack: StackSpec
  readonly scanEv: readonly [number, number]
  /** Energy resolution below which a maximum in a `block` counts less (design 3); null: none. */
  readonly resolutionEv: number | null
  readonly demands: readonly Demand[]
  readonly growth: GrowthSpec
  readonly search: SearchSpec
  readonly deliver: { readonly candidates: number }
  /** Sentences for the engineer that are no errors: roundings, assumed values, limits of validity. */
  readonly notes: readonly string[]
}

/** One operating point. A job without `conditions:` has one, named ''. Positive bias lowers the edge of the exit. */
export interface Condition {
  readonly name: string
  readonly temperatureK: number
  readonly biasV: number
  readonly inPlaneEv: number
  /** Of light, in the entry; below 90. */
  readonly angleDeg: number
  readonly polarisation: 'mean' | 'p' | 's'
}

export interface StackSpec {
  readonly entry: MediumOption
  readonly exit: MediumOption | 'hard wall'
  readonly layers: readonly StackItem[]
  /** Reflect about the last layer. */
  readonly mirror: boolean
  readonly massModel: 'two-band' | 'parabolic'
  /** A material's name, 'none', or null: the lead at the substrate's side. */
  readonly strainedTo: string | null
  /** Ids of the first and last layer that a bias falls over; null: all layers. */
  readonly biasOver: readonly [string, string] | null
  /** Ids of layers whose widths (nm) may not fall in this order; empty: no such rule. */
  readonly rising: readonly string[]
  /** Vacuum wavelength at which quarter waves are counted and indices are told; null for electrons. */
  readonly referenceNm: number | null
  /** The exit is a plate so thick that what runs to and fro in it adds up by intensities, with this behind it. */
  readonly back: { readonly thicknessNm: number; readonly behind: MediumOption } | null
}

export type StackItem = LayerSpec | PeriodSpec

export interface LayerSpec {
  readonly kind: 'layer'
  /** As written, or `L1`, `L2`, ... in the order of the file. */
  readonly id: string
  /** The id of the layer whose material, composition and width this one shares. */
  readonly like: string | null
  /** Absent (null) exactly when `like` is given. */
  readonly media: readonly MediumOption[] | null
  readonly width: WidthSpec | null
  /** The width is so many times that of another layer, counted in monolayers (`width` says what that can be); absent: its own. */
  readonly widthLike?: { readonly like: string; readonly times: number }
  /** The composition is that of another layer; absent: its own. */
  readonly xLike?: string
}

export interface PeriodSpec {
  readonly kind: 'period'
  readonly id: string | null
  /** Least and most; equal: a fixed count, else the search chooses. */
  readonly repeat: readonly [number, number]
  /** The count is that of another period; absent: its own. */
  readonly repeatLike?: string
  readonly period: readonly StackItem[]
  /** Stands between repetitions only. */
  readonly between: readonly StackItem[]
  readonly mirror: boolean
}

/** One medium that a layer may be made of; several options are a `pick` of material. Choices ascend, at least one. */
export type MediumOption =
  | {
      readonly kind: 'material'
      readonly material: string
      /** The allowed compositions; null for a binary. */
      readonly x: readonly number[] | null
      /** What the user's own medium has instead of the listed numbers; absent: nothing. */
      readonly own?: Override
    }
  | {
      readonly kind: 'numbers'
      /** The name under `media:`, if it has one. */
      readonly name: string | null
      readonly potentialEv: readonly number[]
      readonly massRel: readonly number[]
      readonly alphaPerEv: readonly number[]
    }
  | {
      readonly kind: 'index'
      readonly name: string | null
      /** n + i kappa, at every wavelength. */
      readonly index: readonly number[]
      readonly extinction: readonly number[]
    }
  | {
      readonly kind: 'table'
      readonly name: string
      /** Vacuum wavelength (nm, ascending), n, kappa. */
      readonly rows: readonly (readonly [number, number, number])[]
    }

/** Single numbers in place of those of a built-in material: an edge counts from the entry's, an index holds at every wavelength. */
export interface Override {
  /** Under `media:`. */
  readonly name: string
  readonly potentialEv?: number
  readonly massRel?: number
  readonly alphaPerEv?: number
  readonly index?: number
  readonly extinction?: number
}

/**
 * A width as written. ML count monolayers of whatever medium the layer gets, qw its quarter waves at `stack.reference` and normal
 * incidence; equal ends mean a fixed width.
 */
export interface WidthSpec {
  readonly unit: 'ML' | 'nm' | 'qw'
  readonly from: number
  readonly to: number
  /** In the same unit; null: one ML, or the growth step. */
  readonly step: number | null
}

interface DemandBase {
  readonly id: string
  readonly weight: number
  /** Looser limits, for the yield only; absent ones are those of the demand. Null: the demand itself. */
  readonly accept: Accepted | null
  /** The condition at which it holds; null: at all of them. */
  readonly at: string | null
  /** What is limited: the transmitted, reflected or absorbed share. */
  readonly quantity: Quantity
}

export type Quantity = 'A' | 'R' | 'T'

/** The axis that a line is stated on: energies, or vacuum wavelengths of light. */
export type Axis = 'eV' | 'nm'

/** What `accept` states, in the demand's own terms. */
export interface Accepted {
  readonly within?: number
  readonly fwhm?: readonly [number, number]
  readonly height?: number
  readonly alone?: number
  readonly top?: number
  readonly ripple?: number
  readonly above?: number
  readonly below?: number
  /** Of a curve, which without it has no part in the yield. */
  readonly rms?: number
}

interface LineDemand extends DemandBase {
  /** What `centre`, `within` and `fwhm` are stated in. */
  readonly axis: Axis
  readonly centre: number
  readonly within: number
  readonly fwhm: readonly [number, number] | null
}

export interface PeakDemand extends LineDemand {
  readonly kind: 'peak'
  readonly height: number | null
  /** No other maximum in the scan above this; null: not stated. */
  readonly alone: number | null
}

/** A flat top. */
export interface BandDemand extends LineDemand {
  readonly kind: 'band'
  /** Least mean of T over the inner 80 % between the half-height points. */
  readonly top: number | null
  /** Greatest dip of T there. */
  readonly ripple: number | null
}

export interface PassDemand extends DemandBase {
  readonly kind: 'pass'
  /** Evenly spaced over the closed range in the unit it is written in, both ends included; eV, ascending. */
  readonly pointsEv: readonly number[]
  readonly above: number
}

export interface BlockDemand extends DemandBase {
  readonly kind: 'block'
  readonly pointsEv: readonly number[]
  readonly below: number
}

export interface CurveDemand extends DemandBase {
  readonly kind: 'curve'
  /** The file's name as written. */
  readonly file: string
  readonly rows: readonly CurveRow[]
  /** Greatest rms that passes; null: a goal that nothing can miss, as in a job. */
  readonly mostRms: number | null
}

export interface CurveRow {
  readonly energyEv: number
  readonly T: number
  readonly sense: 'equal' | 'least' | 'most'
  readonly scale: 'linear' | 'decades'
  readonly tolerance: number
  readonly weight: number
}

export type Demand = PeakDemand | BandDemand | PassDemand | BlockDemand | CurveDemand

export interface GrowthSpec {
  /** The side of the substrate. */
  readonly startsAt: 'entry' | 'exit'
  /** As written: `Ga`, `Al-1`; empty when the job gives none. */
  readonly sources: readonly Source[]
  /** At most so many different alloys in one stack; null: no limit. */
  readonly compositions: number | null
  /** Lattice step of nm ranges; null: one ML for materials, 0.1 nm for media by numbers and for light. */
  readonly stepNm: number | null
  /** The thinnest layer that can be made, and the limits of the whole stack (nm); null: none. */
  readonly thinnestNm: number | null
  readonly totalNm: readonly [number, number] | null
  /** Greatest mean strain of a stack, a fraction without sign; null: no limit. */
  readonly strain: number | null
  /** No strained layer may be thicker than its critical thickness. */
  readonly critical: boolean
  /** Thickness on the part over that on the monitor, by medium. */
  readonly tooling: Readonly<Record<string, number>>
  readonly spread: Spread
  /** True where the job has no `spread`: everything that uses it says "assumed". */
  readonly assumed: boolean
  readonly trials: number
}

export interface Source {
  readonly name: string
  /** What it feeds: an element, or for light the name of a medium. */
  readonly element: string
  /** ML/s; for light nm/s. */
  readonly rate: number
}

/** One standard deviation each. */
export interface Spread {
  /** Fraction of a source's rate. */
  readonly rate: number
  /** Per grown layer, in monolayers of its own or in nm. */
  readonly layer: { readonly value: number; readonly unit: 'ML' | 'nm' }
  readonly x: number
  /** Of the refractive index of each medium. */
  readonly index: number
}

export interface SearchSpec {
  readonly method: 'auto' | 'complete' | 'sampled'
  readonly effort: 'brief' | 'standard' | 'overnight'
  readonly seed: number
}

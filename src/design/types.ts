import type { MediumChoice, ResolvedMedium, Situation } from '../model/index.js'
import type { WaveSystem } from '../wave/index.js'

/** One decision of a stack: a numbered choice among `choices`. */
export interface Place {
  readonly name: string
  readonly choices: number
  /** Neighbouring numbers are neighbouring values (widths, compositions, numbers), not a list of materials. */
  readonly ordered: boolean
  /** Equal for places that decide the same of layers described alike: barriers of one kind, wells of one kind. */
  readonly family: number
}

/** One layer as it is grown: equal neighbours merged, zero widths dropped, from entry to exit. */
export interface GrownLayer {
  readonly id: string
  readonly choice: MediumChoice
  readonly resolved: ResolvedMedium
  /** widthNm = count stepNm; the step is the layer's own monolayer, or the lattice step of nm ranges. */
  readonly count: number
  readonly stepNm: number
  readonly widthNm: number
  /** Under a bias: into how many slices it is cut, and whether the bias falls over it. */
  readonly slices: number
  readonly biased: boolean
}

/** The makeable stacks of a job: an assignment gives each place one of its choices. */
export interface Design {
  readonly places: readonly Place[]
  /** One a condition of the job, in its order. */
  readonly situations: readonly Situation[]
  readonly notes: readonly string[]
  /** How many different stacks the lattice holds. */
  stackCount(): number
  /** Every feasible assignment, in the order of the places; the array is reused. */
  assignments(): Iterable<Int32Array>
  feasible(assignment: Int32Array): boolean
  /** The assignment itself when it is feasible, else a feasible one near it. */
  repair(assignment: Int32Array): Int32Array
  /** The one of a stack and its mirror image that is listed (design 5); may be the argument itself. */
  canonical(assignment: Int32Array): Int32Array
  layers(assignment: Int32Array): GrownLayer[]
  /** Row i of each is layer i of `layers`. */
  systems(assignment: Int32Array): WaveSystem[]
  totalNm(assignment: Int32Array): number
  /** First 12 hex digits of SHA-256 over the canonical JSON of the stack. */
  id(assignment: Int32Array): string
  /** The readable text of a stack: `AlGaAs(0.35) 12 / GaAs 18 / AlGaAs(0.35) 12 ML`. */
  text(assignment: Int32Array): string
  /** The stacks as products of their layers; null where a layer depends on more than its own places. */
  chain(): Chain | null
  /** Stacks of another number of layers beside a stack; null where the structure is fixed. */
  needles(assignment: Int32Array): Needles | null
  /** The continuous neighbourhood of an assignment: its lists of materials held, everything ordered set free. */
  relax(assignment: Int32Array): Relaxed
}

/** A lattice as a chain of layers, each decided by its own places, none merged or dropped. */
export interface Chain {
  /** From entry to exit. */
  readonly links: readonly ChainLink[]
  /** One a condition; row i is cell i: a medium and a width that some layer may have. Lossless. */
  readonly systems: readonly WaveSystem[]
  /** For each cell the number of the alloy that counts against the limit, -1 for none. */
  readonly labels: Int32Array
  /** At most so many different alloys in a stack. */
  readonly mostLabels: number
}

export interface ChainLink {
  readonly places: Int32Array
  /** The cell of every combination of the places' choices, the last place fastest; -1 where there is none. */
  readonly cells: Int32Array
}

/** What thin layers more or less would do to a stack. */
export interface Needles {
  /** The stack with needles of no width, one system a condition. */
  readonly systems: readonly WaveSystem[]
  /** For each condition a row a needle: d(layer parameter)/d(its width), as in `Relaxed.directions`. */
  readonly directions: readonly Float64Array[]
  /** The stack with each needle as thin as it can be made. */
  readonly inserted: readonly Int32Array[]
  /** The stack without one of its thinnest layers, the thinnest first. */
  readonly removed: readonly Int32Array[]
}

/** Free widths, compositions and numbers as one vector of variables of order one. */
export interface Relaxed {
  readonly start: Float64Array
  readonly lower: Float64Array
  readonly upper: Float64Array
  /** The place of each variable. */
  readonly place: Int32Array
  /** A variable's value at a choice of its place; NaN where the medium of the stack does not have it. */
  valueOf(variable: number, choice: number): number
  /** Rows are the layers as written, none merged or dropped. */
  systems(variables: Float64Array): WaveSystem[]
  /** For each condition d(layer parameter)/d(variable): row v holds layers * (1 + parameters) entries, [width, then the medium's own] a layer. */
  directions(variables: Float64Array): Float64Array[]
  /** The assignment nearest to the variables on the lattice; feasible. */
  snap(variables: Float64Array): Int32Array
}

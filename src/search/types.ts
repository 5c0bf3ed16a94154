import type { Score } from '../target/index.js'

export interface SearchPlace {
  readonly choices: number
  /** Neighbouring numbers are neighbouring values. */
  readonly ordered: boolean
  /** Places of one family have the same choices, and a start in which they agree is a good one to try. */
  readonly family: number
}

/** Places with numbered choices, and an evaluator: all that a search may know. An assignment has one choice a place. */
export interface SearchProblem {
  readonly places: readonly SearchPlace[]
  /** How many different stacks there are. */
  stackCount(): number
  /** Numbers that a bound reads of a stack. */
  readonly points: number
  /** The stacks as products of matrices, one a link; null where they are none. */
  chain(): SearchChain | null
  feasible(assignment: Int32Array): boolean
  /** The assignment itself when it is feasible, else a feasible one near it. */
  repair(assignment: Int32Array): Int32Array
  /** The assignment under which a stack is listed, for stacks that are one physical object. */
  canonical(assignment: Int32Array): Int32Array
  /** A lower bound of the merit that costs little. */
  bound(assignment: Int32Array): number
  /** Whether the bound tells good starts from bad ones; where it leaves out what matters most, the merit must. */
  readonly boundGuides: boolean
  /** The largest bound that a stack which comes before one of this score, or level with it, may have; Infinity: any. */
  reach(score: Score): number
  score(assignment: Int32Array): Score
  /** Negative when a comes first. */
  compare(a: Score, b: Score): number
  /** Assignments of another structure beside one, those first that promise most; absent where the structure is fixed. */
  restructured?(assignment: Int32Array): Int32Array[]
  /** The continuous problem around an assignment, for Levenberg-Marquardt. */
  relax(assignment: Int32Array): RelaxedProblem
}

/**
 * A stack as a product M of real matrices of determinant 1 from a near end to a far end, each decided by a few places:
 * T = 4 far / |(1, -i) M (1, i far)|². A matrix may have either sign.
 */
export interface SearchChain {
  readonly links: readonly {
    readonly places: Int32Array
    /** The number of the matrix for every combination of the places' choices, the last place fastest; -1 where there is none. */
    readonly cells: Int32Array
  }[]
  /** For each matrix a label that counts against the limit, -1 for none. */
  readonly labels: Int32Array
  /** At most so many different labels in a stack. Chain and limit say all about which assignments are feasible. */
  readonly mostLabels: number
  /** All that the bound reads of a stack: bound² = at least the sum of `square` and the greatest `extreme`. */
  readonly points: readonly ChainPoint[]
  matrices(at: readonly ChainAbscissa[]): ChainMatrices
}

/** Where a number T is read of a stack. */
export interface ChainAbscissa {
  readonly condition: number
  readonly at: number
}

export interface ChainPoint extends ChainAbscissa {
  /** 0 for T from `goal[0]` to `goal[1]`, growing on either side. */
  square(T: number): number
  extreme(T: number): number
  readonly goal: readonly [number, number]
}

/** Entry p * cells + c belongs to matrix c at the p-th abscissa: [[same, down], [up, same]]. */
export interface ChainMatrices {
  readonly same: Float64Array
  readonly down: Float64Array
  readonly up: Float64Array
  /** At each abscissa; 0: no transmission. */
  readonly far: Float64Array
  /** The greatest angle or exponent in any matrix: rounding grows with it. */
  readonly angle: Float64Array
}

export interface RelaxedProblem {
  readonly residuals: number
  readonly start: Float64Array
  readonly lower: Float64Array
  readonly upper: Float64Array
  /** The place of each variable. */
  readonly place: Int32Array
  /** A variable's value at a choice of its place; NaN where it has none. */
  valueOf(variable: number, choice: number): number
  /** Writes residuals and `jacobian[i * variables + v]`. */
  evaluate(variables: Float64Array, residuals: Float64Array, jacobian: Float64Array): void
  snap(variables: Float64Array): Int32Array
}

/** A stack as the journal keeps it. */
export interface Found {
  readonly assignment: readonly number[]
  readonly score: Score
}

/** What one unit of work leaves: plain data, at most 64 stacks, the best first. */
export interface UnitResult {
  readonly unit: number
  readonly found: readonly Found[]
  /** Stacks looked at with the whole merit, and those cut by the bound. */
  readonly examined: number
  readonly cut: number
  /** Why the unit stopped: `no move helps`, `budget of evaluations`. */
  readonly stop: string
}

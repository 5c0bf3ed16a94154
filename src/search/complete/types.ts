import type { Found } from '../types.js'

/** How every stack of a lattice will be accounted for. The same for the same problem, on any machine. */
export interface CompletePlan {
  /** `halves`: stacks as pairs of tabulated halves. `every stack`: each is built, and its bound computed. */
  readonly method: 'halves' | 'every stack'
  /** Different stacks on the lattice. */
  readonly stacks: number
  /** Assignments of the places, feasible or not. */
  readonly assignments: number
  /** Independent units of work, numbered from 0. */
  readonly slices: number
  /** Stacks times points. */
  readonly cost: number
  /** What may be claimed when all slices are done. */
  readonly statement: string
}

/** Why a lattice is not searched completely, in words for the user. */
export interface Refusal {
  readonly refused: string
}

/** What one slice leaves: plain data, at most 256 stacks, the best first, none behind the start bound. */
export interface SliceResult {
  readonly slice: number
  readonly found: readonly Found[]
  /** Assignments that were looked at with the whole merit. */
  readonly examined: number
  /** Assignments accounted for without it, by what did so. */
  readonly cut: Readonly<Record<string, number>>
}

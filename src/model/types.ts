import type { Override } from '../job/index.js'

/** The stacks of the public library, in its own units: eV, nm, free-electron masses, degrees. */

/** A homogeneous region for electrons: m(E) = massRel (1 + alphaPerEv (E - potentialEv)). */
export interface Region {
  readonly potentialEv: number
  readonly massRel: number
  readonly alphaPerEv?: number
}

export interface ElectronStack {
  readonly kind: 'electron'
  readonly entry: Region
  readonly layers: readonly (Region & { readonly widthNm: number })[]
  readonly exit: Region | 'hard wall'
  readonly inPlaneKPerNm?: number
}

export type OfWavelength = number | ((nm: number) => number)

/** n + i kappa, kappa > 0 absorbs; the entry is lossless. */
export interface Medium {
  readonly index: OfWavelength
  readonly extinction?: OfWavelength
}

export interface LightStack {
  readonly kind: 'light'
  readonly entry: Medium
  readonly layers: readonly (Medium & { readonly widthNm: number })[]
  readonly exit: Medium
  readonly angleDeg?: number
  readonly polarisation?: 's' | 'p'
  readonly back?: { readonly exit: Medium }
}

/** One medium out of what a job allows, with its composition or numbers fixed. */
export type MediumChoice =
  | { readonly kind: 'material'; readonly material: string; readonly x: number | null; readonly own?: Override }
  | {
      readonly kind: 'numbers'
      readonly name: string | null
      readonly potentialEv: number
      readonly massRel: number
      readonly alphaPerEv: number
    }
  | { readonly kind: 'index'; readonly name: string | null; readonly index: number; readonly extinction: number }
  | {
      readonly kind: 'table'
      readonly name: string
      /** Vacuum wavelength (nm, ascending), n, kappa. */
      readonly rows: readonly (readonly [number, number, number])[]
    }

/** What turns a medium of the job into numbers: an operating point and what else the job says of all media. */
export type Situation = ElectronSituation | LightSituation

export interface ElectronSituation {
  readonly kind: 'electron'
  readonly temperatureK: number
  /** Lattice constant (nm, 300 K) that the layers are strained to; null: no strain. */
  readonly substrateNm: number | null
  readonly massModel: 'two-band' | 'parabolic'
  readonly entry: MediumChoice
  readonly exit: MediumChoice | 'hard wall'
  /** In-plane wave number, 1/nm. */
  readonly inPlaneKPerNm: number
  /** Positive lowers the edge of the exit. */
  readonly biasV: number
}

export interface LightSituation {
  readonly kind: 'light'
  readonly entry: MediumChoice
  readonly exit: MediumChoice
  /** Behind the exit, where that is a thick plate. */
  readonly back: MediumChoice | null
  readonly angleDeg: number
  readonly polarisation: 'mean' | 'p' | 's'
  /** Vacuum wavelength at which quarter waves are counted. */
  readonly referenceNm: number
  /** All that is asked lies in these vacuum wavelengths: what absorbs in none of them counts as lossless. Null: anything may be asked. */
  readonly rangeNm: readonly [number, number] | null
}

/** A layer of a job; slices and the share of a bias count only where there is one. */
export interface ModelLayer {
  readonly choice: MediumChoice
  readonly widthNm: number
  readonly slices: number
  readonly biased: boolean
  /** Of light: by so much the index differs from the listed one; absent: not at all. */
  readonly indexShift?: number
}

/** A medium at the job's situation. */
export type ResolvedMedium = ResolvedRegion | ResolvedOptics

export interface ResolvedOptics {
  readonly kind: 'light'
  readonly medium: Required<Medium>
  /** At the reference. */
  readonly index: number
  readonly extinction: number
  /** Width of a quarter wave at the reference, normal incidence. */
  readonly quarterNm: number
  readonly monolayerNm: null
  readonly strain: null
}

export interface ResolvedRegion {
  readonly kind: 'electron'
  readonly region: Required<Region>
  /** Half of the strained lattice constant along (001) at 300 K; null for media by numbers. */
  readonly monolayerNm: number | null
  /** In-plane strain; null for media by numbers or without strain. */
  readonly strain: number | null
}

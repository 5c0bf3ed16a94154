/**
 * The wave core's own words. It knows q (1/nm²), mu (dimensionless) and widths (nm) at energies (eV), nothing of
 * semiconductors or glass. A wave u obeys d/dz((1/mu) du/dz) + (q/mu) u = 0, with u and v = (1/mu) du/dz continuous.
 */

/** Rows of q and mu: entry m * points + e belongs to medium m at energy number e. */
export interface MediaTable {
  readonly count: number
  readonly points: number
  readonly q: Float64Array
  readonly mu: Float64Array
  /** Imaginary parts; absent when every medium is lossless (n + i kappa: positive absorbs). */
  readonly qIm?: Float64Array
  readonly muIm?: Float64Array
}

/** One complex energy: q, mu and their derivatives in energy (1/eV), one entry a medium. */
export interface MediaAtEnergy {
  readonly qRe: Float64Array
  readonly qIm: Float64Array
  readonly muRe: Float64Array
  readonly muIm: Float64Array
  readonly dqRe: Float64Array
  readonly dqIm: Float64Array
  readonly dmuRe: Float64Array
  readonly dmuIm: Float64Array
}

/** What a model gives the core: numbered media as functions of the energy. Both leads are among them. */
export interface WaveMedia {
  readonly count: number
  readonly lossless: boolean
  /** Writes q and mu of every medium at `energies` (eV) into a table of that many points. */
  fill(energies: Float64Array, table: MediaTable): void
  /** The same for dq/dE and dmu/dE (per eV), real energies. */
  fillSlope(energies: Float64Array, slope: MediaTable): void
  /** Analytic continuation to the complex energy `re + i im` (eV). */
  at(re: number, im: number, out: MediaAtEnergy): void
  /** How many numbers describe a medium to whoever designs it (electrons: potential, mass, alpha). */
  readonly parameters: number
  /**
   * dq/dp and dmu/dp of medium `m` at a real energy: out[2 p], out[2 p + 1] for each parameter p; where media absorb their imaginary
   * parts behind those, out[2 P + 2 p], out[2 P + 2 p + 1].
   */
  partials(energy: number, m: number, out: Float64Array): void
}

export const hardWall = -1

/** Layers from entry to exit: the medium's number and the width in nm of each. */
export interface WaveStack {
  readonly entry: number
  /** A medium's number, or `hardWall`. */
  readonly exit: number
  readonly medium: Int32Array
  readonly width: Float64Array
}

/** Rows of a stack that hang on fewer layers: what is known by rows, told by layers. */
export interface RowMap {
  readonly layers: number
  /**
   * Adds the slopes of all rows of one energy up to those of the layers: `stride` numbers a row from entry `from` of `rows` on,
   * [width, then the medium's own], as many a layer from entry `to` of `out` on.
   */
  toLayers(rows: Float64Array, from: number, stride: number, out: Float64Array, to: number): void
}

/** A stack with the media that its numbers mean. */
export interface WaveSystem {
  readonly media: WaveMedia
  readonly stack: WaveStack
  /** Absent: every row is a layer. */
  readonly rowMap?: RowMap
  /** Another wave on the same stack: what is asked of the system is the mean of both. */
  readonly beside?: WaveSystem
  /** Number of the medium behind the exit, where that is so thick that what runs to and fro in it adds up by intensities. */
  readonly behind?: number
}

export type Side = 'entry' | 'exit'

/** A pole E0 - i Gamma/2 of the transmission amplitude, with its partial widths and the Breit-Wigner height. */
export interface Pole {
  readonly energyEv: number
  readonly widthEv: number
  readonly entryWidthEv: number
  readonly exitWidthEv: number
  readonly peakT: number
}

/** The poles of a box, ascending, and whether an independent count agrees with the list. */
export interface PoleList {
  readonly poles: readonly Pole[]
  /** From the winding of A(E) around the box; null when it was not asked for. */
  readonly counted: number | null
  readonly complete: boolean
}

/** A local maximum or minimum of T(E) at real energy. */
export interface Extremum {
  readonly energyEv: number
  readonly T: number
  readonly kind: 'maximum' | 'minimum'
  /** Gamma of the nearest pole within its own width of this maximum, else null. */
  readonly poleWidthEv: number | null
}

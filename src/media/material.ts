/** A published number with its unit and where it comes from. */
export interface Sourced {
  readonly value: number
  readonly unit: string
  readonly source: string
}

/** Varshni: Eg(T) = gap0 - alpha T² / (T + beta). */
export interface Gap {
  readonly zero: Sourced
  readonly alpha: Sourced
  readonly beta: Sourced
}

interface Listed {
  readonly name: string
  readonly title: string
  /** Where the fits are meant to hold; our choice, the sources give no limits. */
  readonly temperatureK: readonly [number, number]
}

export interface Binary extends Listed {
  readonly kind: 'binary'
  /** Lattice constant at 300 K. */
  readonly lattice: Sourced
  /** Direct gap. */
  readonly gap: Gap
  /** Gap to the X valley, where known. */
  readonly gapX: Gap | null
  /** Band-edge mass of the electron. */
  readonly mass: Sourced
  /** Valence band offset, on the common scale of the source. */
  readonly vbo: Sourced
  /** Hydrostatic deformation potentials: the conduction edge moves by ac Tr(strain), the gap by (ac + av) Tr(strain). */
  readonly ac: Sourced
  readonly av: Sourced
  readonly c11: Sourced
  readonly c12: Sourced
}

/** P(x) = (1 - x) atZero + x atOne - x (1 - x) (bowing + slope x). */
export interface Bowing {
  readonly constant: Sourced
  readonly slope: Sourced | null
}

export interface Alloy extends Listed {
  readonly kind: 'alloy'
  /** What x counts, as a sentence. */
  readonly x: string
  readonly xRange: readonly [number, number]
  readonly atZero: Binary
  readonly atOne: Binary
  /** Everything that is not listed here is linear in x. */
  readonly bowings: Readonly<Partial<Record<'gap' | 'gapX' | 'mass' | 'vbo' | 'ac', Bowing>>>
}

export type Material = Binary | Alloy

import type { Sourced } from '../material.js'

/**
 * How n + i kappa depends on the wavelength: lambda in micrometres, E in eV.
 *
 *     sellmeier       n² = constant + sum strength lambda²/(lambda² - pole)
 *     poles           n² = constant + sum strength/(lambda² - pole)
 *     herzberger      n = A + B L + C L² + D lambda² + F lambda⁴,  L = 1/(lambda² - 0.028)
 *     cauchy          n = A + B/lambda² + C/lambda⁴
 *     lorentz-drude   (n + i kappa)² = 1 - sum strength/(E² - centre² + i E width)
 *     table           rows of [where, n, kappa], interpolated by monotone cubics in the variable of the source
 *     constant        n
 */
export type Dispersion =
  | {
      readonly kind: 'sellmeier' | 'poles'
      readonly constant: Sourced
      readonly terms: readonly Term[]
    }
  | { readonly kind: 'herzberger' | 'cauchy'; readonly coefficients: readonly Sourced[] }
  | {
      readonly kind: 'lorentz-drude'
      readonly terms: readonly { readonly strength: Sourced; readonly centre: Sourced; readonly width: Sourced }[]
    }
  | {
      readonly kind: 'table'
      readonly variable: 'eV' | 'nm'
      readonly rows: readonly OpticalRow[]
      readonly source: string
    }
  | { readonly kind: 'constant'; readonly index: Sourced }

/** One resonance of a formula for n²; the pole in um². */
export interface Term {
  readonly strength: Sourced
  readonly pole: Sourced
}

/** A row of a table: where (eV or nm, ascending), index and extinction. `source` where it is not that of the table. */
export type OpticalRow = readonly [where: number, index: number, extinction: number, source?: string]

/** A medium for light. Its numbers are those of one state of it: a film has others than the bulk. */
export interface OpticalMaterial {
  readonly kind: 'optical'
  readonly name: string
  readonly title: string
  readonly form: 'bulk' | 'film' | 'gas'
  /** Wavelengths in nm at which the numbers hold; outside is an error. */
  readonly rangeNm: readonly [number, number]
  readonly dispersion: Dispersion
  /** Extinction beside a formula for n: rows of nm and kappa, 0 beyond the last row; null: taken as 0. */
  readonly extinction: {
    readonly rows: readonly (readonly [nm: number, extinction: number])[]
    readonly source: string
  } | null
  /** What an engineer must know before trusting it. */
  readonly remarks: readonly string[]
}

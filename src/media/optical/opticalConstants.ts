import { hcEvNm } from '../constants.js'
import { MaterialError } from '../MaterialError.js'
import { monotoneCubic } from './monotoneCubic.js'
import type { Dispersion, OpticalMaterial, OpticalRow } from './OpticalMaterial.js'

/** Index and extinction by the vacuum wavelength in nm; a number where they don't depend on it. */
export interface OpticalConstants {
  readonly index: number | ((nm: number) => number)
  readonly extinction: number | ((nm: number) => number)
}

/** Slopes of an index are differences over a little more than the wavelength itself: so far (relative) the range is stretched. */
const stretch = 1e-4

/**
 * n + i kappa of a listed material. The functions throw MaterialError for a wavelength outside its range. `withinNm`: wavelengths
 * that will be asked for; where the material absorbs nowhere in them, its extinction is the number 0.
 */
export function opticalConstants(material: OpticalMaterial, withinNm?: readonly [number, number]): OpticalConstants {
  const { name, rangeNm, dispersion, extinction } = material
  const [from, to] = rangeNm
  const both = constantsOf(dispersion)
  const checked =
    (of: (nm: number) => number) =>
    (nm: number): number => {
      if (nm >= from * (1 - stretch) && nm <= to * (1 + stretch)) return of(nm)
      throw new MaterialError(
        `${name} is listed from ${from} to ${to} nm, not at ${nm} nm. Stay within it, or give the medium by a table of your own.`,
      )
    }
  const index = typeof both.index === 'number' ? both.index : checked(both.index)
  if (extinction === null) {
    return { index, extinction: typeof both.extinction === 'number' ? both.extinction : checked(both.extinction) }
  }
  const { rows } = extinction
  const last = rows[rows.length - 1][0]
  if (withinNm && withinNm[0] >= last) return { index, extinction: 0 }
  const kappa = monotoneCubic(
    rows.map(([nm]) => nm),
    rows.map(([, value]) => value),
  )
  return { index, extinction: checked((nm) => (nm >= last ? 0 : kappa(nm))) }
}

/** The same of rows of [nm, n, kappa] that a user gives; throws outside them. */
export function tableConstants(name: string, rows: readonly OpticalRow[]): OpticalConstants {
  const rangeNm = [rows[0][0], rows[rows.length - 1][0]] as const
  return opticalConstants({
    kind: 'optical',
    name,
    title: name,
    form: 'film',
    rangeNm,
    dispersion: { kind: 'table', variable: 'nm', rows, source: 'the job' },
    extinction: null,
    remarks: [],
  })
}

function constantsOf(dispersion: Dispersion): OpticalConstants {
  switch (dispersion.kind) {
    case 'constant':
      return { index: dispersion.index.value, extinction: 0 }
    case 'table':
      return tabulated(dispersion.rows, dispersion.variable)
    case 'lorentz-drude': {
      const at = lorentzDrude(dispersion.terms)
      return { index: (nm) => at(nm)[0], extinction: (nm) => at(nm)[1] }
    }
    case 'sellmeier':
    case 'poles': {
      const { constant, kind } = dispersion
      const terms = dispersion.terms.map(({ strength, pole }) => [strength.value, pole.value] as const)
      return { index: (nm) => Math.sqrt(squareOf(constant.value, terms, kind === 'sellmeier', nm)), extinction: 0 }
    }
    case 'herzberger': {
      const [a, b, c, d, f] = dispersion.coefficients.map(({ value }) => value)
      return {
        index: (nm) => {
          const square = (nm / 1000) * (nm / 1000)
          const L = 1 / (square - 0.028)
          return a + L * (b + L * c) + square * (d + square * f)
        },
        extinction: 0,
      }
    }
    case 'cauchy': {
      const [a, b, c] = dispersion.coefficients.map(({ value }) => value)
      return {
        index: (nm) => {
          const inverse = 1e6 / (nm * nm)
          return a + inverse * (b + inverse * c)
        },
        extinction: 0,
      }
    }
  }
}

function squareOf(
  constant: number,
  terms: readonly (readonly [number, number])[],
  numerator: boolean,
  nm: number,
): number {
  const square = (nm / 1000) * (nm / 1000)
  let sum = constant
  for (const [strength, pole] of terms) sum += (numerator ? strength * square : strength) / (square - pole)
  return sum
}

function tabulated(rows: readonly OpticalRow[], variable: 'eV' | 'nm'): OpticalConstants {
  const column = (i: 0 | 1 | 2) => rows.map((row) => row[i])
  const [x, n, k] = [column(0), column(1), column(2)]
  const place = variable === 'eV' ? (nm: number) => hcEvNm / nm : (nm: number) => nm
  const index = monotoneCubic(x, n)
  const absorbs = k.some((value) => value !== 0)
  const extinction = monotoneCubic(x, k)
  return { index: (nm) => index(place(nm)), extinction: absorbs ? (nm) => Math.max(0, extinction(place(nm))) : 0 }
}

/** The root of epsilon with n > 0, kappa >= 0, without cancellation. */
function lorentzDrude(
  terms: Extract<Dispersion, { kind: 'lorentz-drude' }>['terms'],
): (nm: number) => readonly [number, number] {
  const numbers = terms.map(({ strength, centre, width }) => [strength.value, centre.value, width.value] as const)
  return (nm) => {
    const E = hcEvNm / nm
    let re = 1
    let im = 0
    for (const [strength, centre, width] of numbers) {
      const a = E * E - centre * centre
      const b = E * width
      re -= (strength * a) / (a * a + b * b)
      im += (strength * b) / (a * a + b * b)
    }
    const size = Math.sqrt(re * re + im * im)
    if (re > 0) {
      const n = Math.sqrt(0.5 * (size + re))
      return [n, (0.5 * im) / n]
    }
    const k = Math.sqrt(0.5 * (size - re))
    return [(0.5 * im) / k, k]
  }
}

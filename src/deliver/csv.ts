import { stringify } from 'csv-stringify/sync'

/** A cell in milli-units (meV) of a number held in the unit itself (eV). */
export interface Milli {
  readonly milli: number | null
}

/** Text, a number, a number in milli-units, or nothing: null and every non-finite number are "not computed". */
export type Cell = string | number | Milli | null

/**
 * One table as RFC 4180 text: CRLF, one header line, a dot as decimal sign, UTF-8 once written.
 *
 * Numbers have the digits that rebuild the double. Null, NaN and the infinities give an empty cell. A text that a
 * spreadsheet could take for a formula (it starts with = + - @, a tab or a return) gets an apostrophe in front, the one mark
 * that every spreadsheet reads as "this is text"; names in a job start with a letter or a digit, so it is all but never seen.
 */
export function csv(header: readonly string[], rows: Iterable<readonly Cell[]>): string {
  return stringify([[...header], ...rows], {
    record_delimiter: '\r\n',
    quoted_match: /[\r\n]/,
    escape_formulas: true,
    cast: { number: numberText, object: milliCell },
  })
}

/** Energies in eV to a cell in meV. */
export function meV(ev: number | null): Milli {
  return { milli: ev }
}

/** The shortest decimal text that rebuilds the double; '' for what is not a finite number. */
function numberText(value: number): string {
  return Number.isFinite(value) ? String(value) : ''
}

/**
 * The shortest text of `value` with its decimal point moved by three places: 0.08 gives 80, where the product 0.08 * 1000 would
 * carry its rounding into the file. `Number(cell + 'e-3')` gives back the very double. (Number(cell)/1000 may miss it by one
 * last place: division by 1000 does not reach every double, whatever the digits of the cell.)
 */
export function milliText(value: number | null): string {
  if (value === null || !Number.isFinite(value)) return ''
  if (value === 0) return '0'
  const [mantissa, exponent] = Math.abs(value).toExponential().split('e')
  const digits = mantissa.replace('.', '')
  const sign = value < 0 ? '-' : ''
  return sign + placePoint(digits, Number(exponent) + 3)
}

/** digits[0].digits[1..] times ten to the exponent, in the notation that String(number) would choose. */
function placePoint(digits: string, exponent: number): string {
  if (exponent >= 21 || exponent < -6) {
    const fraction = digits.length > 1 ? `.${digits.slice(1)}` : ''
    return `${digits[0]}${fraction}e${exponent < 0 ? '-' : '+'}${Math.abs(exponent)}`
  }
  if (exponent < 0) return `0.${'0'.repeat(-exponent - 1)}${digits}`
  const whole = digits.slice(0, exponent + 1).padEnd(exponent + 1, '0')
  const fraction = digits.slice(exponent + 1)
  return fraction === '' ? whole : `${whole}.${fraction}`
}

/** A negative number would be taken for a formula by the guard, which looks at numbers only when they are numbers. */
function milliCell(cell: object): string | { value: string; escape_formulas: boolean } {
  const value = milliText((cell as Milli).milli)
  return value.startsWith('-') ? { value, escape_formulas: false } : value
}

import { parse } from 'csv-parse/sync'
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { csv, meV, milliText } from '../../src/deliver/csv.js'

const anyDouble = fc.double({ noNaN: true, noDefaultInfinity: true })

/** Same bits, but that a zero may lose its sign. */
function same(a: number, b: number): boolean {
  return Object.is(a, b) || (a === 0 && b === 0)
}

describe('csv', () => {
  it('gives back every double of a number cell, bit for bit', () => {
    fc.assert(
      fc.property(fc.array(anyDouble, { minLength: 1, maxLength: 20 }), (values) => {
        const rows = parse(
          csv(
            ['v'],
            values.map((v) => [v]),
          ),
        ).slice(1)
        return rows.length === values.length && values.every((v, i) => same(Number(rows[i][0]), v))
      }),
    )
  })

  it('gives back every double of a meV cell, bit for bit, when the point is moved back', () => {
    fc.assert(fc.property(anyDouble, (ev) => same(Number(`${milliText(ev)}`.replace(/e.*|$/, shiftBack)), ev)))
    expect(parse(csv(['v'], [[meV(0.1234567890123)]]))[1][0]).toBe('123.4567890123')
  })

  it('writes 0.08 eV as 80 meV, and 0.0558 as 55.8, where the product would have a tail of noise', () => {
    expect(milliText(0.08)).toBe('80')
    expect(0.0558 * 1000).not.toBe(55.8)
    expect(milliText(0.0558)).toBe('55.8')
    expect(milliText(-0.35)).toBe('-350')
    expect(milliText(1.5e-9)).toBe('0.0000015')
    expect(milliText(2.5e-12)).toBe('2.5e-9')
    expect(milliText(3e20)).toBe('3e+23')
    expect(milliText(5e-324)).toBe('5e-321')
  })

  it('leaves a cell empty for null, NaN and the infinities', () => {
    const cells = [null, Number.NaN, Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY, meV(null), meV(Number.NaN)]
    expect(csv(['a', 'b', 'c', 'd', 'e', 'f'], [cells])).toBe('a,b,c,d,e,f\r\n,,,,,\r\n')
  })

  it('never lets a text start like a formula, in a cell or in the header', () => {
    for (const start of ['=', '+', '-', '@', '\t', '\r']) {
      const [header, row] = parse(csv([`${start}h`], [[`${start}1+1`]]), { relax_quotes: true })
      expect(header[0]).toBe(`'${start}h`)
      expect(row[0]).toBe(`'${start}1+1`)
    }
    fc.assert(
      fc.property(fc.string({ minLength: 1, unit: 'binary' }), (text) => {
        const cell = parse(csv(['t'], [[text]]), { skip_empty_lines: false })[1]?.[0] ?? ''
        return !/^[=+\-@\t\r]/.test(cell) && cell.replace(/^'/, '') === text.replace(/^'/, '')
      }),
    )
  })

  it('keeps the minus of negative numbers, in any unit, free of the mark for text', () => {
    expect(csv(['a', 'b'], [[-1.5, meV(-0.0032)]])).toBe('a,b\r\n-1.5,-3.2\r\n')
  })

  it('quotes what RFC 4180 says must be quoted, and ends every line with CRLF', () => {
    const cells = ['a,b', 'say "x"', 'two\nlines', 'plain']
    expect(csv(['p', 'q', 'r', 's'], [cells])).toBe('p,q,r,s\r\n"a,b","say ""x""","two\nlines",plain\r\n')
  })
})

/** Exponent less three: '1.5e-9' is read as 1.5e-12. */
function shiftBack(exponent: string): string {
  return `e${Number(exponent.slice(1) || '0') - 3}`
}

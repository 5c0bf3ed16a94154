import { describe, expect, test } from 'vitest'
import { stepped, tenTo } from '../../src/job/decimal.js'
import { type DimensionName, parseLevel, parseQuantity, pointsOf, type Quantity } from '../../src/job/quantities.js'

describe('quantities', () => {
  test('a unit of a thousandth gives the number that the decimal literal is', () => {
    for (const [text, value] of [
      ['80 meV', 0.08],
      ['0.08 eV', 0.08],
      ['230.1 meV', 0.2301],
      ['0.1 meV', 0.0001],
      ['7e-1 meV', 0.0007],
      ['225.814286 meV', 0.225814286],
    ] as const) {
      expect(read(text, 'energy').to).toBe(value)
    }
  })

  test('each dimension reads its own units', () => {
    expect(read('0.5 nm', 'length').to).toBe(0.5)
    expect(read('25 Å', 'width').to).toBe(2.5)
    expect(read('25 \u212b', 'width').to).toBe(2.5)
    expect(read('0.002 um', 'width').to).toBe(2)
    expect(read('0.002 \u00b5m', 'width').to).toBe(2)
    expect(read('1.2 /eV', 'nonparabolicity').to).toBe(1.2)
    expect(read('1.2 1/eV', 'nonparabolicity').to).toBe(1.2)
    expect(read('77K', 'temperature').to).toBe(77)
    expect(read('1 %', 'percent').to).toBe(0.01)
    expect(read('0.70 ML/s', 'rate').to).toBe(0.7)
    expect(read(0.067, 'plain').to).toBe(0.067)
  })

  test('ranges keep their ends, their step and their unit', () => {
    expect(read('6..20 ML', 'width')).toMatchObject({ from: 6, to: 20, step: null, range: true, unit: 'ML' })
    expect(read('0.2..0.4 eV step 5 meV', 'energy')).toMatchObject({ from: 0.2, to: 0.4, step: 0.005 })
    expect(read('0.1..0.3 step 0.01', 'plain')).toMatchObject({ from: 0.1, to: 0.3, step: 0.01 })
    expect(read('..4 meV', 'energy')).toMatchObject({ from: 0, to: 0.004, range: true })
    expect(read('-5 .. 5 meV', 'energy')).toMatchObject({ from: -0.005, to: 0.005 })
  })

  test('what is no quantity says what to write', () => {
    for (const [text, dimension, rule, remedy] of [
      ['6..20', 'width', 'has no unit', 'Write "6..20 ML" or "1.7..5.7 nm".'],
      ['80', 'energy', 'has no unit', 'Write "80 meV" or "80 eV".'],
      ['0.2..0.4 step 0.1', 'energy', 'has no unit', '"0.2..0.4 meV step 0.1 meV"'],
      ['80 kelvin', 'energy', 'has the unit "kelvin"', 'Accepted: meV, eV.'],
      ['80 MEV', 'energy', 'has the unit "MEV"', 'Write "80 meV"'],
      ['20..6 ML', 'width', 'runs downwards', 'Write "6..20 ML".'],
      ['6..20 ML step 1 nm', 'width', 'mixes ML and nm', 'same unit'],
      ['1..2 nm step 0 nm', 'width', 'not above 0', 'Write'],
      ['25 A', 'width', 'ampere', 'Å'],
      ['0.3 nm', 'plain', 'has a unit', '"0.3"'],
      ['30 %', 'plain', 'plain number', 'Write 0.3.'],
      ['1e400 meV', 'energy', 'not a finite number', 'Write'],
      ['NaN', 'plain', 'not a finite number', 'Write'],
      ['-Infinity meV', 'energy', 'not a finite number', 'Write'],
      ['.5 nm', 'length', 'dot without a digit', 'Write'],
      ['5.. meV', 'energy', 'without an end', 'Write'],
      ['', 'energy', 'is no quantity', 'Write'],
      ['80 meV or so', 'energy', 'is no quantity', 'Write'],
    ] as const) {
      const complaint = parseQuantity('it', text, dimension)
      expect(complaint, text).toHaveProperty('rule')
      expect((complaint as { rule: string }).rule, text).toContain(rule)
      expect((complaint as { remedy: string }).remedy, text).toContain(remedy)
    }
  })

  test('a level is a number, decibels or an optical density', () => {
    expect(parseLevel('below', 2e-2)).toBe(0.02)
    expect(parseLevel('below', '1e-4')).toBe(1e-4)
    expect(parseLevel('below', '-40 dB')).toBe(1e-4)
    expect(parseLevel('below', 'OD 4')).toBe(1e-4)
    expect(parseLevel('below', '-3 dB')).toBeCloseTo(0.501187233627, 12)
    for (const wrong of [0, -1, 2, '40 dB', 'OD -1', '-1e400 dB', 'OD', 'low']) {
      expect(parseLevel('below', wrong), String(wrong)).toHaveProperty('remedy')
    }
  })

  test('points are evenly spaced in the unit written, and the ends are the ends', () => {
    const points = pointsOf(read('5..60 meV', 'energy'), 64)
    expect(points).toHaveLength(64)
    expect(points[0]).toBe(0.005)
    expect(points[63]).toBe(0.06)
    expect(points[1]).toBe((5 + 55 / 63) / 1000)
    const inEv = pointsOf(read('0.1..0.3 eV', 'energy'), 3)
    expect(inEv).toEqual([0.1, 0.2, 0.3])
  })
})

describe('decimals', () => {
  test('the values of a stepped range are the ones that would be written', () => {
    expect(stepped(0.1, 0.3, 0.05)).toEqual([0.1, 0.15, 0.2, 0.25, 0.3])
    expect(stepped(0.1, 0.17, 0.02)).toEqual([0.1, 0.12, 0.14, 0.16])
    expect(stepped(0.2, 0.4, 0.005)[13]).toBe(0.265)
    expect(stepped(1, 1, 0.1)).toEqual([1])
  })

  test('tenTo agrees with the logarithm and is exact on whole numbers', () => {
    expect(tenTo(-4)).toBe(1e-4)
    for (let exponent = -12.345; exponent < 0; exponent += 0.618) {
      expect(Math.log10(tenTo(exponent))).toBeCloseTo(exponent, 13)
    }
  })
})

function read(text: string | number, dimension: DimensionName): Quantity {
  const quantity = parseQuantity('it', text, dimension)
  if ('rule' in quantity) throw new Error(quantity.rule)
  return quantity
}

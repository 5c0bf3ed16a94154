import { describe, expect, it } from 'vitest'
import { gradientInto, type MediaTable, slopeInto, spectrumInto, type WaveStack } from '../../src/wave/index.js'
import { lightTable, losslessTable } from './lightSystem.js'
import { poisoned } from './regionSystem.js'
import { seeded } from './seeded.js'

const air = { n: 1, k: 0 }
const glass = { n: 1.52, k: 0 }
const films = [
  { n: 2.35, k: 0.01, d: 67 },
  { n: 0.06, k: 3.6, d: 22 },
  { n: 1.46, k: 0, d: 94 },
  { n: 2.35, k: 0.002, d: 5 },
]

function T(table: MediaTable, stack: WaveStack): number {
  const out = { T: poisoned(1), R: poisoned(1) }
  spectrumInto(table, stack, out)
  return out.T[0]
}

/** Fourth-order difference of f around 0. */
function difference(f: (h: number) => number, h: number): number {
  return (8 * (f(h) - f(-h)) - (f(2 * h) - f(-2 * h))) / (12 * h)
}

function gradient(table: MediaTable, stack: WaveStack) {
  const layers = stack.medium.length
  const out = { T: poisoned(1), dTdWidth: poisoned(layers), dTdQ: poisoned(layers), dTdMu: poisoned(layers) }
  gradientInto(table, stack, out)
  return out
}

describe('derivatives of T where media absorb', () => {
  it.each([
    ['s', glass],
    ['p', glass],
    ['s', { n: 0.2, k: 3 }],
    ['p', { n: 0.2, k: 3 }],
  ] as const)('by width, Re q and Re mu agree with differences, %s light into %o', (pol, exit) => {
    const { table, stack } = lightTable(air, films, exit, 'entry', { wavelength: 550, angle: 40, pol })
    const out = gradient(table, stack)
    // Two paths: the spectrum goes by blocks and other polynomials.
    expect(Math.abs(out.T[0] / T(table, stack) - 1)).toBeLessThan(1e-14)
    for (let j = 0; j < films.length; j++) {
      const byWidth = difference((h) => {
        const width = stack.width.slice()
        width[j] += h
        return T(table, { ...stack, width })
      }, 0.01)
      const changed = (row: 'q' | 'mu', h: number) => {
        const numbers = table[row].slice()
        numbers[j + 1] += h
        return T({ ...table, [row]: numbers }, stack)
      }
      expect(out.dTdWidth[j]).toBeCloseTo(byWidth, 10)
      expect(Math.abs(out.dTdQ[j] / difference((h) => changed('q', h), 1e-7) - 1)).toBeLessThan(1e-6)
      expect(Math.abs(out.dTdMu[j] / difference((h) => changed('mu', h), 1e-3) - 1)).toBeLessThan(1e-6)
    }
  })

  it('by energy agree with differences', () => {
    for (const pol of ['s', 'p'] as const) {
      const { table, slope, stack } = lightTable(air, films, glass, 'entry', { wavelength: 550, angle: 40, pol })
      const out = { T: poisoned(1), dTdE: poisoned(1) }
      slopeInto(table, slope, stack, out)
      const moved = (h: number) => ({
        ...table,
        q: table.q.map((q, m) => q + h * slope.q[m]),
        qIm: table.qIm!.map((q, m) => q + h * slope.qIm![m]),
      })
      expect(Math.abs(out.dTdE[0] / difference((h) => T(moved(h), stack), 1e-4) - 1)).toBeLessThan(1e-8)
    }
  })

  it('agree with those of the lossless kernel where nothing absorbs, opaque stacks too', () => {
    const random = seeded(6)
    for (let trial = 0; trial < 20; trial++) {
      const clear = Array.from({ length: 12 }, () => ({ n: 1 + random(), k: 0, d: 400 * random() }))
      const light = { wavelength: 633, angle: 65, pol: trial % 2 === 0 ? ('s' as const) : ('p' as const) }
      const { table, slope, stack } = lightTable({ n: 2, k: 0 }, clear, { n: 2.1, k: 0 }, 'entry', light)
      const one = gradient(table, stack)
      const other = gradient(losslessTable(table), stack)
      for (const row of ['dTdWidth', 'dTdQ', 'dTdMu'] as const) {
        const scale = Math.max(...other[row].map(Math.abs))
        for (let j = 0; j < 12; j++) expect(Math.abs(one[row][j] - other[row][j])).toBeLessThan(1e-11 * scale)
      }
      const here = { T: poisoned(1), dTdE: poisoned(1) }
      const there = { T: poisoned(1), dTdE: poisoned(1) }
      slopeInto(table, slope, stack, here)
      slopeInto(losslessTable(table), losslessTable(slope), stack, there)
      expect(Math.abs(here.dTdE[0] - there.dTdE[0])).toBeLessThan(1e-10 * Math.abs(there.dTdE[0]) + 1e-12 * here.T[0])
    }
  })
})

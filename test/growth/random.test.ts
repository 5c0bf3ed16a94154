import { describe, expect, test } from 'vitest'
import { randomStream } from '../../src/growth/index.js'
import { philox } from '../../src/growth/philox.js'

function hex(counter: readonly number[], key: readonly number[]): string {
  const out = new Uint32Array(4)
  philox(Uint32Array.from(counter), key[0], key[1], out)
  return [...out].map((word) => word.toString(16).padStart(8, '0')).join(' ')
}

describe('philox', () => {
  // The known answers of its authors' reference code (Random123, kat_vectors: philox4x32 10), from memory.
  test('gives the known answers of its authors', () => {
    const ones = 0xffffffff
    expect(hex([0, 0, 0, 0], [0, 0])).toBe('6627e8d5 e169c58d bc57ac4c 9b00dbd8')
    expect(hex([ones, ones, ones, ones], [ones, ones])).toBe('408f276d 41c83b0e a20bc7c6 6d5451fd')
    expect(hex([0x243f6a88, 0x85a308d3, 0x13198a2e, 0x03707344], [0xa4093822, 0x299f31d0])).toBe(
      'd16cfe09 94fdcceb 5001e420 24126ea1',
    )
  })
})

describe('randomStream', () => {
  const draws = (n: number, ...args: Parameters<typeof randomStream>) => {
    const stream = randomStream(...args)
    return Array.from({ length: n }, () => stream.uniform())
  }

  test('depends on its seed and place alone', () => {
    const before = draws(20, 'seed', 'rate', 'Ga')
    draws(5, 'seed', 'rate', 'Al')
    expect(draws(20, 'seed', 'rate', 'Ga')).toEqual(before)
  })

  test('differs for every seed and place, words run together included', () => {
    const places: Parameters<typeof randomStream>[] = [
      ['seed'],
      ['seed', 0],
      ['seed', 1],
      ['seed', 0, 0],
      ['seed', 4294967296],
      ['seed', '1'],
      ['seed1'],
      ['see', 'd'],
      [Uint32Array.of(0)],
      [Uint32Array.of(0, 0)],
      [Uint32Array.of(1, 2, 3, 4, 5, 6, 7, 8)],
      [Uint32Array.of(1, 2, 3, 4, 5, 6, 7, 9)],
    ]
    expect(new Set(places.map((place) => draws(1, ...place)[0])).size).toBe(places.length)
  })

  test('is uniform: 100 000 numbers fill 100 bins as chance would', () => {
    const stream = randomStream('bins')
    const bins = new Float64Array(100)
    for (let i = 0; i < 100_000; i++) bins[Math.floor(100 * stream.uniform())]++
    const chi2 = bins.reduce((sum, n) => sum + (n - 1000) ** 2 / 1000, 0)
    // 99 degrees of freedom: mean 99, standard deviation 14.
    expect(chi2).toBeGreaterThan(99 - 3 * 14)
    expect(chi2).toBeLessThan(99 + 3 * 14)
  })

  test('draws whole numbers below the count, each as often', () => {
    const stream = randomStream('dice')
    const counts = [0, 0, 0]
    for (let i = 0; i < 30_000; i++) counts[stream.integer(3)]++
    for (const count of counts) expect(Math.abs(count - 10_000)).toBeLessThan(3 * Math.sqrt(30_000 * (2 / 9)))
  })

  test('draws normal deviates with the moments 0, 1, 0 and 3, no two in a row related', () => {
    const stream = randomStream('normal')
    const n = 100_000
    const x = Float64Array.from({ length: n }, () => stream.normal())
    const mean = (f: (v: number, i: number) => number) => x.reduce((sum, v, i) => sum + f(v, i), 0) / n
    const within = (value: number, expected: number, variance: number) =>
      expect(Math.abs(value - expected)).toBeLessThan(3.5 * Math.sqrt(variance / n))
    within(
      mean((v) => v),
      0,
      1,
    )
    within(
      mean((v) => v * v),
      1,
      2,
    )
    within(
      mean((v) => v ** 3),
      0,
      15,
    )
    within(
      mean((v) => v ** 4),
      3,
      96,
    )
    within(
      mean((v, i) => v * x[(i + 1) % n]),
      0,
      1,
    )
  })
})

import { describe, expect, it } from 'vitest'
import { LowDiscrepancy } from '../../src/search/lowDiscrepancy.js'

describe('LowDiscrepancy', () => {
  const bases = [2, 3, 5, 7, 11, 13]
  const sequence = new LowDiscrepancy(bases.length, 'a seed')

  it('visits each stratum of each coordinate once in a run of its base', () => {
    bases.forEach((base, d) => {
      for (const run of [0, 1, 40]) {
        const strata = Array.from({ length: base }, (_, i) => Math.floor(sequence.point(run * base + i)[d] * base))
        expect(new Set(strata).size).toBe(base)
      }
    })
  })

  it('stays in [0, 1) to the last index, and gives no point twice', () => {
    const seen = new Set<string>()
    for (const index of [0, 1, 2, 3, 1000, 1_000_000, 4294967294, 4294967295]) {
      const point = sequence.point(index)
      for (const value of point) expect(value >= 0 && value < 1).toBe(true)
      seen.add(point.join())
    }
    expect(seen.size).toBe(8)
  })

  it('depends on the seed and the index alone', () => {
    expect(new LowDiscrepancy(6, 'a seed').point(77)).toEqual(sequence.point(77))
    expect(new LowDiscrepancy(6, 'another').point(77)).not.toEqual(sequence.point(77))
  })

  it('fills a square more evenly than chance: 1024 points leave no box of 16 x 16 nearly empty', () => {
    const counts = new Int32Array(256)
    for (let i = 0; i < 1024; i++) {
      const [x, y] = sequence.point(i)
      counts[Math.floor(x * 16) * 16 + Math.floor(y * 16)]++
    }
    // Four points a box; of independent ones about five boxes of 256 would stay empty.
    expect(Math.min(...counts)).toBeGreaterThan(0)
    expect(Math.max(...counts)).toBeLessThan(9)
  })
})

import { describe, expect, it } from 'vitest'
import { corners } from '../../src/search/corners.js'
import { leastSquares } from '../../src/search/leastSquares.js'
import { neighbours } from '../../src/search/neighbours.js'
import { promisingMoves } from '../../src/search/promisingMoves.js'
import { type Known, planted, relaxedOf } from './functions.js'

describe('neighbours', () => {
  const problem = planted([3, 4, 5, 6], 12, 1, 3)
  const stack = Int32Array.of(5, 0, 11, 6, 1)
  const all = [...neighbours(problem, stack, 200)]

  it('are feasible, each once, and never the stack itself', () => {
    expect(all.every((moved) => problem.feasible(moved))).toBe(true)
    expect(new Set(all.map(String)).size).toBe(all.length)
    expect(all.map(String)).not.toContain(String(stack))
  })

  it('hold every single step and every pair of single steps, and every choice of an unordered list', () => {
    const keys = new Set(all.map(String))
    expect(keys).toContain('6,0,11,6,1')
    expect(keys).toContain('6,0,10,6,1')
    expect(keys).toContain('5,1,11,6,0')
    expect(keys).toContain('5,0,11,6,2')
  })

  it('reach further where places are few', () => {
    const few = planted([3], 40, 0, 1)
    const reached = [...neighbours(few, Int32Array.of(20, 0), 200)].map(([choice]) => choice)
    expect(Math.min(...reached)).toBe(0)
    expect(Math.max(...reached)).toBe(39)
  })
})

/** A narrow, tilted bowl whose best lattice point is none of the roundings of its continuous best. */
const tilted: Known = {
  name: 'tilted bowl',
  residuals: ({ 0: x, 1: y, 2: z }) => ({
    residuals: [20 * (x + y - 2 * z + 0.37), 3 * (x - y - 0.6), 0.3 * (x + y + z - 14.2), 0.1 * (z - 5)],
    slopes: [
      [20, 20, -40],
      [3, -3, 0],
      [0.3, 0.3, 0.3],
      [0, 0, 0.1],
    ],
  }),
  start: [2, 9, 4],
  lower: [0, 0, 0],
  upper: [11, 11, 11],
  best: [],
  least: 0,
}

const sumAt = (at: ArrayLike<number>) => tilted.residuals(at).residuals.reduce((sum, r) => sum + r * r, 0)

function bruteForce(): string {
  let best: number[] = []
  for (let n = 0; n < 1728; n++) {
    const at = [n % 12, Math.floor(n / 12) % 12, Math.floor(n / 144)]
    if (best.length === 0 || sumAt(at) < sumAt(best)) best = at
  }
  return String(best)
}

describe('corners', () => {
  it('hold the best lattice point of a tilted bowl, which rounding misses', () => {
    const relaxed = relaxedOf(tilted)
    const fitted = leastSquares(relaxed, relaxed.start, 100)
    const places = tilted.start.map(() => ({ choices: 12, ordered: true, family: 0 }))
    const found = corners(places, relaxed, fitted, Int32Array.of(0, 0, 0), 8).map(String)
    const best = bruteForce()
    expect(found[0]).toBe(best)
    expect(String(relaxed.snap(fitted.variables))).not.toBe(best)
  })
})

describe('promisingMoves', () => {
  it('name the move of three places that is best', () => {
    const relaxed = relaxedOf(tilted)
    const stack = Int32Array.of(3, 5, 4)
    const places = tilted.start.map(() => ({ choices: 12, ordered: true, family: 0 }))
    const moves = promisingMoves(places, { ...relaxed, start: Float64Array.from(stack) }, stack, 20)
    // The residuals are linear, so that the quadratic tells the truth: sums ascend, all below the stack's own.
    const sums = [...moves.map(sumAt), sumAt(stack)]
    expect(moves.length).toBeGreaterThan(2)
    for (let i = 1; i < sums.length; i++) expect(sums[i]).toBeGreaterThan(sums[i - 1] - 1e-9)
  })
})

import { describe, expect, it } from 'vitest'
import { leastSquares } from '../../src/search/leastSquares.js'
import { type Known, known, relaxedOf } from './functions.js'

describe('leastSquares', () => {
  it.each(known)('finds the least of $name', (one) => {
    const { variables, sum } = leastSquares(relaxedOf(one), Float64Array.from(one.start), 100)
    expect(Math.abs(sum - one.least)).toBeLessThan(1e-9)
    // Powell's function is flat to the fourth order: its argument is worth a quarter of the digits.
    one.best.forEach((value, v) => void expect(Math.abs(variables[v] - value)).toBeLessThan(2e-2))
  })

  it.each(known)('never leaves the bounds, never grows worse and keeps its count on $name', (one) => {
    const problem = relaxedOf(one)
    let calls = 0
    const watched = {
      ...problem,
      evaluate: (at: Float64Array, residuals: Float64Array, jacobian: Float64Array) => {
        calls++
        at.forEach((value, v) => void expect(value >= one.lower[v] && value <= one.upper[v]).toBe(true))
        problem.evaluate(at, residuals, jacobian)
      },
    }
    let last = Number.POSITIVE_INFINITY
    for (const most of [1, 2, 3, 5, 8, 13, 21]) {
      calls = 0
      const { sum, evaluations } = leastSquares(watched, Float64Array.from(one.start), most)
      expect(evaluations).toBe(calls)
      expect(calls).toBeLessThanOrEqual(most)
      expect(sum).toBeLessThanOrEqual(last)
      last = sum
    }
  })

  it('does not care in which units the variables are', () => {
    const [valley] = known
    const factors = [1e6, 1e-6]
    const scaled: Known = {
      ...valley,
      residuals: (at) => {
        const { residuals, slopes } = valley.residuals(factors.map((factor, v) => at[v] / factor))
        return { residuals, slopes: slopes.map((row) => row.map((slope, v) => slope / factors[v])) }
      },
      start: valley.start.map((value, v) => value * factors[v]),
      lower: valley.lower.map((value, v) => value * factors[v]),
      upper: valley.upper.map((value, v) => value * factors[v]),
    }
    const plain = leastSquares(relaxedOf(valley), Float64Array.from(valley.start), 100)
    const other = leastSquares(relaxedOf(scaled), Float64Array.from(scaled.start), 100)
    // Rounding steers the last steps apart; a damping that minded the units would not arrive at all.
    expect(Math.abs(other.evaluations - plain.evaluations)).toBeLessThan(10)
    expect(other.sum).toBeLessThan(1e-9)
  })

  it('walks around points without finite residuals, and stays at a start without them', () => {
    const [valley] = known
    const wall = (from: number): Known => ({
      ...valley,
      residuals: (at) => {
        const { residuals, slopes } = valley.residuals(at)
        return { residuals: at[1] > from ? residuals.map(() => Number.NaN) : residuals, slopes }
      },
    })
    const around = leastSquares(relaxedOf(wall(1.5)), Float64Array.from(valley.start), 200)
    expect(around.sum).toBeLessThan(1e-9)
    const stuck = leastSquares(relaxedOf(wall(0)), Float64Array.from(valley.start), 200)
    expect([...stuck.variables]).toEqual(valley.start)
    expect(stuck.sum).toBe(Number.POSITIVE_INFINITY)
    expect(stuck.evaluations).toBe(1)
  })

  it('is repeatable to the bit', () => {
    const [valley] = known
    const run = () => leastSquares(relaxedOf(valley), Float64Array.from(valley.start), 30)
    expect(run()).toEqual(run())
  })
})

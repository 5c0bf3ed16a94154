import { describe, expect, it } from 'vitest'
import { jacobianDigits } from '../../src/search/index.js'
import { known, relaxedOf } from './functions.js'

describe('jacobianDigits', () => {
  it.each(known)('finds eight digits and more in the known slopes of $name', (one) => {
    const at = Float64Array.from(one.start, (value, v) => value + 0.1 + 0.01 * v)
    for (const digits of jacobianDigits(relaxedOf(one), at)) expect(digits).toBeGreaterThan(8)
  })

  it('finds the digits that a wrong slope leaves, and in no other variable', () => {
    const [valley] = known
    const right = relaxedOf(valley)
    const wrong = {
      ...right,
      evaluate: (at: Float64Array, residuals: Float64Array, jacobian: Float64Array) => {
        right.evaluate(at, residuals, jacobian)
        for (let i = 0; i < right.residuals; i++) jacobian[i * 2] *= 1 + 1e-5
      },
    }
    const [first, second] = jacobianDigits(wrong, Float64Array.of(0.3, 0.7))
    expect(first).toBeCloseTo(5, 1)
    expect(second).toBeGreaterThan(8)
  })
})

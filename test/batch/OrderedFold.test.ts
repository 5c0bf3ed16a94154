import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { OrderedFold } from '../../src/batch/OrderedFold.js'

const result = (unit: number) => ({ unit, found: [], examined: 0, cut: 0, stop: '' })

describe('the fold over units', () => {
  it('gets each once and in the order of their numbers, however they come', () => {
    const anyOrder = fc.shuffledSubarray([...Array(12).keys()], { minLength: 12 })
    fc.assert(
      fc.property(anyOrder, fc.array(fc.nat(11)), (order, again) => {
        const added: number[] = []
        const fold = new OrderedFold(({ unit }) => added.push(unit))
        for (const unit of [...order, ...again]) fold.offer(result(unit))
        expect(added).toEqual([...Array(12).keys()])
        expect(fold.count).toBe(12)
        expect([...fold.missing(14)]).toEqual([12, 13])
      }),
    )
  })

  it('stops at the first gap, and names it', () => {
    const added: number[] = []
    const fold = new OrderedFold(({ unit }) => added.push(unit))
    for (const unit of [0, 1, 3, 5]) fold.offer(result(unit))
    expect(added).toEqual([0, 1])
    expect([...fold.missing(6)]).toEqual([2, 4])
  })
})

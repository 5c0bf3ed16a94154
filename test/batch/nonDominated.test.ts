import { describe, expect, it } from 'vitest'
import { nonDominated } from '../../src/batch/nonDominated.js'

const stack = (id: string, passed: number | null, totalNm: number, compositions: number, trials = 100) => ({
  ...{ id, totalNm, compositions },
  yield: passed === null ? null : { trials, passed, pct: 0, lowPct: 0, highPct: 0, failures: [] },
})

describe('the stacks that no other one betters', () => {
  it('lose to one that is as good in all and better in one', () => {
    const best = stack('best', 90, 20, 1)
    expect(nonDominated([best, stack('less yield', 89, 20, 1)])).toEqual(['best'])
    expect(nonDominated([best, stack('wider', 90, 20.1, 1)])).toEqual(['best'])
    expect(nonDominated([stack('more alloys', 90, 20, 2), best])).toEqual(['best'])
  })

  it('stay where they are better in anything, and where they are level in all', () => {
    const three = [stack('a', 90, 20, 2), stack('b', 80, 19, 2), stack('c', 70, 21, 1)]
    expect(nonDominated(three)).toEqual(['a', 'b', 'c'])
    expect(nonDominated([stack('a', 90, 20, 1), stack('b', 90, 20 + 1e-9, 1)])).toEqual(['a', 'b'])
  })

  it('compare yields as shares, and none below any', () => {
    expect(nonDominated([stack('a', 30, 20, 1, 100), stack('b', 61, 20, 1, 200)])).toEqual(['b'])
    expect(nonDominated([stack('a', null, 20, 1), stack('b', 0, 20, 1), stack('c', null, 10, 1)])).toEqual(['b', 'c'])
  })
})

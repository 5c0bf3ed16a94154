import { describe, expect, it } from 'vitest'
import { listOf, type Ranked, trialsOf } from '../../src/batch/ranking.js'
import type { Design } from '../../src/design/index.js'

/** A stack is its layer count here: that alone is its family. */
const design = {
  layers: (assignment: Int32Array) => Array.from(assignment, () => ({ choice: 'GaAs' })),
} as unknown as Design
const stack = (id: string, layers: number, met: boolean, passed: number | null, trials = 100): Ranked => ({
  found: { assignment: Array(layers).fill(0), score: { met, merit: met ? 0 : 1, margin: null, totalNm: 1, id } },
  yield: passed === null ? null : { trials, passed, pct: 0, lowPct: 0, highPct: 0, failures: [] },
})
const ids = (list: readonly { found: Ranked['found']; listedAs: string; rank: number }[]) =>
  list.map(({ found, listedAs, rank }) => `${rank} ${found.score.id} ${listedAs}`)

describe('the list', () => {
  it('has met before unmet, then the greater yield, then the order', () => {
    const ranked = [stack('a', 3, false, 90), stack('b', 3, true, 10), stack('c', 3, true, 20), stack('d', 3, true, 20)]
    expect(ids(listOf(ranked, design, 4, true))).toEqual(['1 c best', '2 d best', '3 b best', '4 a best'])
    expect(ids(listOf(ranked, design, 4, false))).toEqual(['1 b best', '2 c best', '3 d best', '4 a best'])
  })

  it('compares yields of different numbers of trials as shares', () => {
    const ranked = [stack('a', 3, true, 30, 100), stack('b', 3, true, 31, 100), stack('c', 3, true, 61, 200)]
    expect(ids(listOf(ranked, design, 3, true))).toEqual(['1 b best', '2 c best', '3 a best'])
  })

  it('has up to half as many more, each the best of a family that is not there yet', () => {
    const ranked = [1, 3, 3, 3, 5, 5, 7, 9].map((layers, i) => stack(`s${i}`, layers, true, 90 - i))
    expect(ids(listOf(ranked, design, 4, true))).toEqual([
      ...['1 s0 best', '2 s1 best', '3 s2 best', '4 s3 best'],
      ...['5 s4 family', '6 s6 family'],
    ])
  })
})

describe('the trials of a stack', () => {
  const met = { met: true, merit: 0, margin: 1, totalNm: 1, id: 'a' }
  it('are those of the job for one that meets its limits, else at most 256', () => {
    expect(trialsOf(met, 2048, 'standard')).toBe(2048)
    expect(trialsOf({ ...met, met: false }, 2048, 'standard')).toBe(256)
    expect(trialsOf(met, 2048, 'brief')).toBe(256)
    expect(trialsOf(met, 100, 'brief')).toBe(100)
  })
})

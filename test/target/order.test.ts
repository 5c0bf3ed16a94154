import { describe, expect, test } from 'vitest'
import type { Demand } from '../../src/job/index.js'
import { compareScores, type Score } from '../../src/target/index.js'
import { d1, d2 } from './coldCollector.js'

const curve: Demand = {
  kind: 'curve',
  accept: null,
  at: null,
  quantity: 'T',
  mostRms: null,
  id: 'c',
  weight: 1,
  file: 'goal.csv',
  rows: [],
}
const score = (given: Partial<Score>): Score => ({
  met: true,
  merit: 0,
  margin: 1,
  totalNm: 10,
  id: '000000000000',
  ...given,
})
const unmet = (merit: number, rest: Partial<Score> = {}) => score({ met: false, margin: null, merit, ...rest })

/** The ids of the scores in their order, whatever order they come in. */
function ordered(demands: readonly Demand[], scores: readonly Score[]): string[] {
  const sorted = [...scores].sort(compareScores({ demands }))
  const back = [...scores].reverse().sort(compareScores({ demands }))
  expect(back).toEqual(sorted)
  return sorted.map(({ id }) => id)
}

describe('compareScores', () => {
  test('puts met before unmet', () => {
    expect(ordered([d1, d2], [unmet(1e-12, { id: 'b' }), score({ margin: 0, id: 'a' })])).toEqual(['a', 'b'])
  })

  test('orders met stacks by margin, then total width, then id', () => {
    const scores = [
      score({ margin: 1, totalNm: 9, id: 'b' }),
      score({ margin: 1, totalNm: 9, id: 'c' }),
      score({ margin: 1, totalNm: 8, id: 'd' }),
      score({ margin: 2, totalNm: 99, id: 'a' }),
    ]
    expect(ordered([d1, d2], scores)).toEqual(['a', 'd', 'b', 'c'])
  })

  test('orders met stacks of a job with a curve by merit, whatever their margin', () => {
    const scores = [score({ merit: 0.2, margin: 9, id: 'b' }), score({ merit: 0.1, margin: 1, id: 'a' })]
    expect(ordered([d1, curve], scores)).toEqual(['a', 'b'])
  })

  test('orders unmet stacks by merit, total width and id', () => {
    const scores = [
      unmet(0.2, { id: 'd', totalNm: 1 }),
      unmet(0.1, { id: 'a', totalNm: 10 }),
      unmet(0.1, { id: 'c', totalNm: 11 }),
      unmet(0.1, { id: 'b', totalNm: 10 }),
    ]
    expect(ordered([d1, d2], scores)).toEqual(['a', 'b', 'c', 'd'])
  })

  test('orders a job with curves only by merit, met or not', () => {
    const scores = [score({ merit: 0.2, margin: null, id: 'b' }), unmet(0.1, { id: 'a' })]
    expect(ordered([curve, curve], scores)).toEqual(['a', 'b'])
  })

  test('takes merits that differ beyond 9 significant digits for equal', () => {
    const near = [unmet(0.123456789012, { totalNm: 11, id: 'b' }), unmet(0.123456789049, { totalNm: 10, id: 'a' })]
    expect(ordered([d1], near)).toEqual(['a', 'b'])
    const far = [unmet(0.12345678901, { totalNm: 11, id: 'a' }), unmet(0.12345679, { totalNm: 10, id: 'b' })]
    expect(ordered([d1], far)).toEqual(['a', 'b'])
  })

  test('takes total widths within 1e-6 nm for equal', () => {
    const scores = [score({ totalNm: 10 + 3e-7, id: 'a' }), score({ totalNm: 10 - 3e-7, id: 'b' })]
    expect(ordered([d1], scores)).toEqual(['a', 'b'])
  })
})

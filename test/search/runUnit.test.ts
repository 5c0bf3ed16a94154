import { describe, expect, it } from 'vitest'
import { runUnit, type SearchProblem } from '../../src/search/index.js'
import { planted } from './functions.js'

describe('runUnit', () => {
  const best = [7, 21, 3, 30, 16, 11]
  const problem = planted(best, 36, 2, 4)

  it('finds a planted stack among 8.7 thousand million, past ripples and wrong lists', () => {
    for (const unit of [0, 1, 2, 3]) {
      const { found } = runUnit(problem, unit, 'seed')
      expect(found[0].assignment).toEqual([...best, 2])
      expect(found[0].score.merit).toBe(0)
    }
  })

  it('does the same again for the same seed and unit, number of looks included, whatever ran between', () => {
    const counted = counting(problem)
    const first = runUnit(counted.problem, 5, 'seed')
    const looks = counted.looks()
    runUnit(problem, 6, 'seed')
    const again = counting(problem)
    expect(runUnit(again.problem, 5, 'seed')).toEqual(first)
    expect(again.looks()).toBe(looks)
    expect(runUnit(problem, 5, 'other seed').examined).not.toBe(first.examined)
  })

  it('leaves plain data: at most 64 stacks, each once, the best first', () => {
    const result = runUnit(problem, 1, 'seed')
    const { found, examined, cut } = result
    expect(JSON.parse(JSON.stringify(result))).toEqual(result)
    expect(found.length).toBe(64)
    expect(new Set(found.map(({ score }) => score.id)).size).toBe(found.length)
    for (let i = 1; i < found.length; i++) {
      expect(problem.compare(found[i - 1].score, found[i].score)).toBeLessThan(0)
    }
    expect(examined).toBeGreaterThanOrEqual(64)
    expect(cut).toBeGreaterThan(0)
  })

  it('stops at its budget where there is always something better', () => {
    // Without a bound to cut by, every look costs a whole score.
    const blind = { ...problem, bound: () => 0, boundGuides: false, reach: () => Number.POSITIVE_INFINITY }
    const { stop, examined } = runUnit(blind, 0, 'seed')
    expect(stop).toBe('budget of evaluations')
    expect(examined).toBeLessThan(2000)
  })

  it('lists a stack under its canonical assignment', () => {
    const mirrored: SearchProblem = {
      ...problem,
      canonical: (stack) => Int32Array.from(stack, (choice, i) => (i === 0 ? choice - (choice % 2) : choice)),
    }
    for (const { assignment } of runUnit(mirrored, 0, 'seed').found) expect(assignment[0] % 2).toBe(0)
  })

  it('has an answer where nothing is free', () => {
    const { found, stop } = runUnit(planted([], 1, 0, 1), 0, 'seed')
    expect(found.map(({ assignment }) => assignment)).toEqual([[0]])
    expect(stop).toBe('no move helps')
  })
})

function counting(problem: SearchProblem): { problem: SearchProblem; looks(): number } {
  let looks = 0
  const watched: SearchProblem = {
    ...problem,
    bound: (stack) => {
      looks++
      return problem.bound(stack)
    },
    score: (stack) => {
      looks++
      return problem.score(stack)
    },
  }
  return { problem: watched, looks: () => looks }
}

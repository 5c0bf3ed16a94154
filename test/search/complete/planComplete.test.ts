import { describe, expect, it } from 'vitest'
import { type CompletePlan, planComplete, runSlice, type SearchProblem } from '../../../src/search/index.js'
import { planted, scoreOf } from '../functions.js'

const problem = planted([3, 5, 1], 40, 1, 2)

/** All stacks meet all limits, with margins that no bound knows. */
const met: SearchProblem = {
  ...problem,
  bound: () => 0,
  score: (stack) => ({ ...scoreOf(0, stack.join()), met: true, margin: stack[0] }),
}

describe('planComplete', () => {
  it('counts stacks, slices and cost, and claims no proof', () => {
    const plan = planComplete(problem) as CompletePlan
    expect(plan).toEqual({
      method: 'every stack',
      stacks: 128_000,
      assignments: 128_000,
      slices: 4,
      cost: 128_000 * problem.points,
      statement: 'exhaustive, rounding margin 1e-9',
    })
  })

  it('refuses, with the number, where more than a million stacks meet all limits', () => {
    expect(planComplete({ ...met, stackCount: () => 999_999 })).not.toHaveProperty('refused')
    const { refused } = planComplete({ ...met, stackCount: () => 5e6 }) as { refused: string }
    expect(refused).toMatch(/^About 5000000 stacks meet all limits/)
  })

  it('refuses lattices that are too large to look at one by one', () => {
    const large = planted([3, 5, 1, 7, 2, 9, 4], 40, 1, 2)
    expect((planComplete(large) as { refused: string }).refused).toMatch(/^The lattice holds 327680000000 assignments/)
  })
})

describe('runSlice', () => {
  const plan = planComplete(problem) as CompletePlan
  const results = [0, 1, 2, 3].map((slice) => runSlice(problem, plan, slice, null))

  it('accounts for every assignment of the lattice', () => {
    const accounted = results.map(({ examined, cut }) => examined + cut['point terms'])
    expect(accounted.reduce((sum, n) => sum + n, 0)).toBe(128_000)
    expect(results.some(({ examined }) => examined < 32_000)).toBe(true)
  })

  it('leaves plain data, the same again, at most 256 stacks, the best first, none behind the start bound', () => {
    for (const [slice, result] of results.entries()) {
      expect(JSON.parse(JSON.stringify(result))).toEqual(result)
      expect(runSlice(problem, plan, slice, null)).toEqual(result)
      expect(result.found.length).toBe(256)
    }
    const bound = results[1].found[9].score
    const { found } = runSlice(problem, plan, 1, bound)
    expect(found).toEqual(results[1].found.slice(0, 10))
  })

  it('looks at stacks that are level with the 256th: equal merits are told apart by what comes after', () => {
    const level: SearchProblem = { ...problem, bound: () => 1, score: (stack) => scoreOf(1, stack.join()) }
    const { examined, found } = runSlice(level, plan, 0, null)
    expect(examined).toBe(32_000)
    // Slice 0 holds the first 32 000 assignments, the last place (of 2) fastest.
    const ids = Array.from({ length: 32_000 }, (_, n) =>
      [n / 3200, (n % 3200) / 80, (n % 80) / 2, n % 2].map(Math.floor).join(),
    )
    expect(found.map(({ score }) => score.id)).toEqual(ids.sort().slice(0, 256))
  })
})

import { readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { problemOf } from '../../src/batch/problem.js'
import { readJob } from '../../src/job/index.js'
import { runUnit, type SearchProblem } from '../../src/search/index.js'
import { PricedMoves } from '../../src/search/PricedMoves.js'
import { boundJob, seeded, structures } from './complete/jobs.js'

const demands = {
  'pass and blocks': `    - { pass: 70..90 meV, above: 0.8 }
    - { block: 10..55 meV, below: 1e-2, weight: 2 }`,
  'a block alone': '    - { block: 10..60 meV, below: 1e-3 }',
}

/** All feasible assignments that differ from one in so many places. */
function* apart(
  { places, feasible }: SearchProblem,
  stack: Int32Array,
  together: number,
  from = 0,
): Iterable<Int32Array> {
  if (together === 0 && feasible(stack)) yield Int32Array.from(stack)
  for (let place = from; together > 0 && place < places.length; place++) {
    const moved = Int32Array.from(stack)
    for (let choice = 0; choice < places[place].choices; choice++) {
      moved[place] = choice
      if (choice !== stack[place]) yield* apart({ places, feasible } as SearchProblem, moved, together - 1, place + 1)
    }
  }
}

describe('priced moves', () => {
  const chained = Object.entries(structures).flatMap(([name, stack]) =>
    Object.entries(demands).flatMap(([kind, text]) => {
      const { problem } = boundJob({ stack: stack(seeded(5)), demands: text })
      const chain = problem.chain()
      return chain ? [{ name: `${name}, ${kind}`, problem, chain, onePerDemand: kind === 'a block alone' }] : []
    }),
  )

  it('have structures of every kind to show it by', () => {
    expect(chained.length).toBeGreaterThanOrEqual(8)
  })

  it.each(chained)(
    'are the neighbours within the limit, each at its bound: $name',
    ({ problem, chain, onePerDemand }) => {
      const random = seeded(9)
      for (let round = 0; round < 3; round++) {
        const stack = problem.repair(Int32Array.from(problem.places, ({ choices }) => Math.floor(random() * choices)))
        const moves = new PricedMoves(chain, problem.places, stack)
        for (const together of [1, 2]) {
          const all = [...apart(problem, stack, together)].map((near) => ({ near, square: problem.bound(near) ** 2 }))
          const squares = all.map(({ square }) => square).sort((a, b) => a - b)
          const limit = squares[Math.floor(squares.length / 4)] * (1 + 1e-9)
          const priced = moves.below(stack, together, limit, Number.POSITIVE_INFINITY)
          const known = new Map(priced.map((move) => [move.stack.join(), move.square]))
          for (let i = 1; i < priced.length; i++) expect(priced[i].square).toBeGreaterThanOrEqual(priced[i - 1].square)
          for (const { near, square } of all) {
            const price = known.get(near.join())
            if (square <= limit) expect(price, near.join()).toBeDefined()
            if (price === undefined) continue
            // Of several demands with extremes only the greatest counts.
            expect(price).toBeLessThanOrEqual(square * (1 + 1e-9) + 1e-15)
            if (onePerDemand) expect(Math.abs(price - square)).toBeLessThanOrEqual(1e-9 * square + 1e-15)
          }
        }
      }
    },
  )

  it('come back to the stack that they are asked of, and tighten to as many as wanted', () => {
    const [{ problem, chain }] = chained
    const stack = problem.repair(new Int32Array(problem.places.length))
    const moves = new PricedMoves(chain, problem.places, stack)
    const first = moves.below(stack, 2, Number.POSITIVE_INFINITY, 5)
    expect(first.length).toBe(5)
    moves.below(first[0].stack, 3, Number.POSITIVE_INFINITY, 5)
    expect(moves.below(stack, 2, Number.POSITIVE_INFINITY, 5)).toEqual(first)
    expect(moves.below(stack, 2, Number.POSITIVE_INFINITY, 9).slice(0, 5)).toEqual(first)
  })
})

describe('a unit with priced moves', () => {
  const bests = { a: 0.007783, b: 0.006412, d: 0.000342 }

  // a, b and d are known to have no better stack by complete search.
  it.each(Object.entries(bests))('finds the best stack of bench task %s in a few starts', async (task, square) => {
    const path = new URL(`../bench/tasks/${task}.yaml`, import.meta.url).pathname
    expect(readFileSync(path, 'utf8')).toContain(`bench-${task}`)
    const { problem } = problemOf(await readJob(path))
    let least = Number.POSITIVE_INFINITY
    for (let unit = 0; unit < 6 && least > square + 1e-6; unit++) {
      least = Math.min(least, runUnit(problem, unit, 'seed 0').found[0].score.merit ** 2)
    }
    expect(Math.abs(least - square)).toBeLessThan(1e-6)
  })
})

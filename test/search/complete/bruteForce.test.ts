import { describe, expect, it } from 'vitest'
import { firstRound, planComplete, startBoundOf } from '../../../src/search/index.js'
import { boundJob, bruteForce, bySlices, seeded, structures, targets } from './jobs.js'

const limit = { 'picks and a composition limit': 'growth: { compositions: 1 }' } as Readonly<Record<string, string>>

let seed = 0
for (const [structure, stack] of Object.entries(structures)) {
  describe(`a complete search of ${structure}`, () => {
    for (const [target, demands] of Object.entries(targets)) {
      const r = seeded(++seed)
      const job = boundJob({ stack: stack(r), demands: demands(r), rest: limit[structure] })
      it(`finds what brute force finds of ${target}, from any bound`, () => {
        const { problem } = job
        const all = bruteForce(job)
        const first = all.slice(0, 256)
        const plan = planComplete(problem)
        if ('refused' in plan) throw new Error(plan.refused)
        expect(plan.stacks).toBe(all.length)
        const round = startBoundOf(firstRound(problem, plan, 'seed'))
        const tightest = first.length === 256 ? first[255].score : null
        for (const start of [null, round, tightest]) {
          const { found, accounts } = bySlices(job, start)
          expect(found).toEqual(first)
          expect(accounts.some(({ examined }) => examined > 0)).toBe(true)
        }
        // A check in which nothing lies below the bound proves nothing.
        expect(first.length).toBe(Math.min(256, all.length))
        expect(first.length).toBeGreaterThan(100)
      })
    }
  })
}

import { describe, expect, it } from 'vitest'
import { electronSystem } from '../../src/model/electronSystem.js'
import { resonances } from '../../src/wave/index.js'
import { seeded } from '../wave/seeded.js'

/** Two to nine barriers of electrons; leads that differ, an evanescent exit and a hard wall among them. */
function randomStack(random: () => number) {
  const region = (potentialEv: number) => ({
    potentialEv,
    massRel: 0.04 + 0.08 * random(),
    alphaPerEv: random() < 0.5 ? 0 : 0.9 * random(),
  })
  const barriers = 2 + Math.floor(8 * random())
  const layers = Array.from({ length: 2 * barriers - 1 }, (_, j) =>
    j % 2 === 0
      ? { ...region(0.15 + 0.4 * random()), widthNm: 0.6 + 4.5 * random() }
      : { ...region(-0.05 + 0.1 * random()), widthNm: 2 + 8 * random() },
  )
  const kind = random()
  const exit = kind < 0.1 ? ('hard wall' as const) : region(kind < 0.25 ? 0.05 + 0.3 * random() : -0.1 * random())
  return { entry: { ...region(0), potentialEv: 0 }, layers, exit }
}

describe('the resonances of random stacks', () => {
  it('are as many as the argument principle counts, for a thousand of them, wide ones above the barriers too', () => {
    const random = seeded(2026)
    const wrong: unknown[] = []
    let found = 0
    for (let n = 0; n < 1000; n++) {
      const stack = randomStack(random)
      const { poles, counted, complete } = resonances(electronSystem(stack), [0.002, 0.6], { count: true })
      found += poles.length
      if (!complete) wrong.push({ n, listed: poles.length, counted })
    }
    expect(wrong).toEqual([])
    expect(found).toBeGreaterThan(5000)
  })
})

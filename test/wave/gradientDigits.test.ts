import { Decimal } from 'decimal.js'
import { describe, expect, it } from 'vitest'
import { complexStepSlopes } from '../../src/wave/complexStep.js'
import { gradientDigits } from '../../src/wave/index.js'
import { decimalT } from './decimalWave.js'
import { exact } from './exact.js'
import { regionSystem, tableOf } from './regionSystem.js'
import { seeded } from './seeded.js'

const D = Decimal.clone({ precision: 80 })
const lead = { V: 0, m: 0.067, alpha: 0 }

function randomSystem(random: () => number, layers: number) {
  return regionSystem(
    lead,
    Array.from({ length: layers }, (_, j) => ({
      d: 0.5 + 4 * random(),
      V: j % 2 === 0 ? 0.15 + 0.3 * random() : 0.05 * random(),
      m: 0.04 + 0.08 * random(),
      alpha: 0.7 * random(),
    })),
    { ...lead, V: -0.05 },
  )
}

describe('complex steps', () => {
  it('are differences of ln T in 80 digits, for every layer', () => {
    const random = seeded(11)
    for (const layers of [1, 3, 8]) {
      const system = randomSystem(random, layers)
      const energy = 0.02 + 0.4 * random()
      const { media, stack } = system
      const table = tableOf(media, [energy])
      const at = (m: number) => ({ q: exact(table.q[m], D), mu: exact(table.mu[m], D) })
      const lnT = (j: number, which: 'q' | 'mu' | 'w', h: string) => {
        const rows = [...stack.medium].map((m, i) => ({ ...at(m), w: exact(stack.width[i], D) }))
        rows[j][which] = rows[j][which].plus(h)
        return decimalT(at(stack.entry), rows, at(stack.exit), D).ln()
      }
      const slopes = complexStepSlopes(system, energy)!
      for (const [which, found] of [
        ['w', slopes.width],
        ['q', slopes.q],
        ['mu', slopes.mu],
      ] as const) {
        const truth = found.map((_, j) =>
          lnT(j, which, '1e-25')
            .minus(lnT(j, which, '-1e-25'))
            .div('2e-25')
            .toNumber(),
        )
        const scale = Math.max(...truth.map(Math.abs))
        found.forEach((one, j) => void expect(Math.abs(one - truth[j]) / scale).toBeLessThan(1e-12))
      }
    }
  })
})

describe('gradientDigits', () => {
  it('finds eleven digits and more in the derivatives of random stacks', () => {
    const random = seeded(12)
    for (let i = 0; i < 60; i++) {
      const found = gradientDigits(randomSystem(random, 1 + (i % 20)), 0.01 + 0.5 * random())!
      for (const [what, digits] of Object.entries(found)) expect(digits, what).toBeGreaterThan(11)
    }
  })

  it('says nothing where no wave leaves', () => {
    const closed = regionSystem(lead, [{ d: 2, V: 0.3, m: 0.09, alpha: 0 }], { ...lead, V: 0.2 })
    expect(gradientDigits(closed, 0.1)).toBeNull()
    expect(gradientDigits(closed, 0.25)).not.toBeNull()
  })
})

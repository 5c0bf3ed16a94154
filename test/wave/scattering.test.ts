import { describe, expect, it } from 'vitest'
import { scatteringT, spectrumInto } from '../../src/wave/index.js'
import { electronCases, tolerance } from '../physics/reference.js'
import { poisoned, type Region, regionSystem, tableOf } from './regionSystem.js'
import { seeded } from './seeded.js'

describe('scatteringT, the audit path', () => {
  it('holds the electron reference too', () => {
    for (const test of electronCases) {
      if (test.incidence !== 'left') continue
      const exit = test.right.hard_wall ? 'hard wall' : test.right
      for (const point of test.points) {
        const T = scatteringT(regionSystem(test.left, test.layers, exit, point.k_par), point.E)
        const truth = Number(point.T)
        const where = `${test.id} E = ${point.E}`
        if (truth === 0 || truth < 1e-300) expect(T, where).toBeLessThan(1e-299)
        // Joining reflections near a resonance loses a few digits more than the vectors do: ten times the tolerance.
        else expect(Math.abs(T / truth - 1), where).toBeLessThan(10 * tolerance(point.rel_sens_T))
      }
    }
  })

  it('agrees with the spectrum for random stacks, opaque or open', () => {
    const random = seeded(4)
    for (let trial = 0; trial < 60; trial++) {
      const layers: (Region & { d: number })[] = Array.from({ length: 1 + Math.floor(20 * random()) }, () => ({
        d: 8 * random(),
        V: 0.5 * random(),
        m: 0.03 + 0.1 * random(),
        alpha: random(),
      }))
      const system = regionSystem({ V: 0, m: 0.067 }, layers, { V: 0.02, m: 0.05 })
      const energy = 0.05 + 0.5 * random()
      const out = { T: poisoned(1), R: poisoned(1) }
      spectrumInto(tableOf(system.media, [energy]), system.stack, out)
      expect(Math.abs(scatteringT(system, energy) / out.T[0] - 1)).toBeLessThan(1e-10)
    }
  })

  it('is exact at a band edge of a layer, and 0 behind a closed exit or a hard wall', () => {
    const entry = { V: 0, m: 0.067 }
    const edge = regionSystem(entry, [{ d: 5, V: 0.3, m: 0.067 }], entry)
    expect(scatteringT(edge, 0.3)).toBeCloseTo(0.23270644518928, 13)
    expect(scatteringT(regionSystem(entry, [], { V: 0.4, m: 0.067 }), 0.3)).toBe(0)
    expect(scatteringT(regionSystem(entry, [], 'hard wall'), 0.3)).toBe(0)
    expect(() => scatteringT(edge, -0.1)).toThrow(/q is -0\.17.* at -0\.1 eV/)
  })
})

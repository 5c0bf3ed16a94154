import { describe, expect, it } from 'vitest'
import { type Side, spectrumInto } from '../../src/wave/index.js'
import { poisoned, regionSystem, tableOf } from '../wave/regionSystem.js'
import { type ElectronCase, electronCases, type ReferencePoint, referenceIsHere, tolerance } from './reference.js'

function at(test: ElectronCase, point: ReferencePoint) {
  const exit = test.right.hard_wall ? 'hard wall' : test.right
  return regionSystem(test.left, test.layers, exit, point.k_par)
}

describe.skipIf(!referenceIsHere)('electron reference spectra in 60 digits (../shared/reference, skipped when absent)', () => {
  it.each(electronCases)('$id $title: T, R and log10 T', (test) => {
    const from: Side = test.incidence === 'left' ? 'entry' : 'exit'
    for (const point of test.points) {
      const { media, stack } = at(test, point)
      const out = { T: poisoned(1), R: poisoned(1), log10T: poisoned(1) }
      const fluxError = spectrumInto(tableOf(media, [point.E]), stack, out, from)
      const where = `E = ${point.E}, k_par = ${point.k_par}`
      const T = Number(point.T)
      const R = Number(point.R)
      expect(fluxError, where).toBeLessThan(1e-12)
      if (T === 0 && point.log10_T === null) expect(out.T[0], where).toBe(0)
      else if (T > 1e-300) expect(Math.abs(out.T[0] / T - 1), where).toBeLessThan(tolerance(point.rel_sens_T))
      expect(Math.abs(out.R[0] / R - 1), where).toBeLessThan(tolerance(point.rel_sens_R))
      if (point.log10_T === null) expect(out.log10T[0], where).toBe(Number.NEGATIVE_INFINITY)
      // d log10 T = dT/T/ln 10; the number itself is also rounded.
      else {
        const off = Math.abs(out.log10T[0] - Number(point.log10_T))
        expect(off, where).toBeLessThan(tolerance(point.rel_sens_T) * 0.4343 + 1e-15 * Math.abs(out.log10T[0]))
      }
    }
  })
})

import { describe, expect, it } from 'vitest'
import { amplitudesInto, type Side, spectrumInto } from '../../src/wave/index.js'
import { lightTable, losslessTable } from '../wave/lightSystem.js'
import { poisoned } from '../wave/regionSystem.js'
import { opticalCases, tolerance } from './reference.js'

const hbarEvFs = 0.6582119569509066

describe('optical reference spectra in 60 digits', () => {
  it.each(opticalCases)('$id $title: T, R, A and log10 T', (test) => {
    const from: Side = test.incidence === 'left' ? 'entry' : 'exit'
    for (const point of test.points) {
      const { table, stack } = lightTable(test.left, test.layers, test.right, from, point)
      const layers = test.layers.length
      const where = `${point.wavelength} nm, ${point.angle} degrees, ${point.pol}`
      const T = Number(point.T)
      const tables = table.qIm?.every((x) => x === 0) ? [table, losslessTable(table)] : [table]
      for (const media of tables) {
        const out = {
          T: poisoned(1),
          R: poisoned(1),
          log10T: poisoned(1),
          A: poisoned(1),
          absorbed: poisoned(layers),
        }
        const fluxError = spectrumInto(media, stack, out, from)
        const exitAbsorbs = table.qIm![from === 'entry' ? stack.exit : stack.entry] !== 0
        expect(fluxError, where).toBeLessThan(1e-12)
        if (T > 1e-300) expect(Math.abs(out.T[0] / T - 1), where).toBeLessThan(tolerance(point.rel_sens_T))
        else if (point.log10_T === null) expect(out.T[0], where).toBe(0)
        expect(Math.abs(out.R[0] - Number(point.R)), where).toBeLessThanOrEqual(
          tolerance(point.rel_sens_R) * Number(point.R),
        )
        // A is 1 - R - T of the reference, and that of the layers here: nothing is absorbed in a lead.
        if (!exitAbsorbs) expect(Math.abs(out.A[0] - Number(point.A)), where).toBeLessThan(1e-12)
        if (layers > 0) expect(Math.abs(out.absorbed.reduce((a, b) => a + b, 0) - out.A[0]), where).toBeLessThan(1e-14)
        if (point.log10_T === null) expect(out.log10T[0], where).toBe(Number.NEGATIVE_INFINITY)
        else {
          const off = Math.abs(out.log10T[0] - Number(point.log10_T))
          expect(off, where).toBeLessThan(tolerance(point.rel_sens_T) / Math.LN10 + 1e-15 * Math.abs(out.log10T[0]))
        }
      }
    }
  })

  it.each(opticalCases)('$id $title: phases and group delay', (test) => {
    const from: Side = test.incidence === 'left' ? 'entry' : 'exit'
    for (const point of test.points) {
      const { table, slope, stack } = lightTable(test.left, test.layers, test.right, from, point)
      const out = { phaseT: poisoned(1), phaseR: poisoned(1), slopeT: poisoned(1), slopeR: poisoned(1) }
      amplitudesInto(table, slope, stack, out, { from, ofV: point.pol === 'p' })
      const close = tolerance(Math.max(point.rel_sens_T, point.rel_sens_R))
      const where = `${point.wavelength} nm, ${point.angle} degrees, ${point.pol}`
      for (const [found, wanted] of [
        [out.phaseT[0], point.phase_t_rad],
        [out.phaseR[0], point.phase_r_rad],
      ] as const) {
        if (wanted === null) expect(found, where).toBeNaN()
        else {
          const off = Math.abs(found - Number(wanted))
          expect(Math.min(off, Math.abs(off - 2 * Math.PI)), where).toBeLessThan(close)
        }
      }
      if (point.group_delay_t_fs !== null) {
        const delay = Number(point.group_delay_t_fs)
        expect(Math.abs(out.slopeT[0] * hbarEvFs - delay), where).toBeLessThanOrEqual(
          close * Math.max(1, Math.abs(delay)),
        )
      }
    }
  })
})

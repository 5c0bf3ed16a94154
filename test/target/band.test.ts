import { describe, expect, test } from 'vitest'
import type { BandDemand, PeakDemand } from '../../src/job/index.js'
import { readJobText, resumeContent } from '../../src/job/index.js'
import { systemOf } from '../../src/model/index.js'
import { acceptedDemands, compileTarget } from '../../src/target/index.js'
import { gaussLegendre } from '../../src/target/quadrature.js'
import { extrema, spectrumInto, type WaveSystem } from '../../src/wave/index.js'
import { d1, layersOf, spec, systemsOf } from './coldCollector.js'

const band: BandDemand = {
  ...{ kind: 'band', id: 'b', weight: 1, accept: null, at: null, quantity: 'T' },
  ...{ axis: 'eV', centre: 0.08, within: 0.002, fwhm: [0.006, 0.02], top: 0.9, ripple: 0.1 },
}

function resultOf(demand: BandDemand | PeakDemand, system: WaveSystem) {
  return compileTarget({ ...spec, demands: [demand] }).evaluate([system]).demands[0]
}

function grid({ media, stack }: WaveSystem, from: number, to: number, points: number): Float64Array {
  const table = {
    count: media.count,
    points,
    q: new Float64Array(media.count * points),
    mu: new Float64Array(media.count * points),
  }
  media.fill(
    Float64Array.from({ length: points }, (_, i) => from + ((to - from) * i) / (points - 1)),
    table,
  )
  const T = new Float64Array(points)
  spectrumInto(table, stack, { T, R: new Float64Array(points) })
  return T
}

/** Three barriers and two wells: a top of two humps. */
const [flat] = systemsOf(layersOf(0.35, [6, 18, 11, 18, 6]))

describe('a band', () => {
  test('has the mean and the dip of a fine grid over the inner 80 % between its half-height points', () => {
    const { band: found, reached } = resultOf(band, flat)
    const { lowEv, highEv, fwhmEv, T: height } = found!.peak
    const [half] = grid(flat, lowEv, highEv, 2)
    expect(half).toBeCloseTo(height / 2, 9)
    const points = 40_001
    const inner = grid(flat, lowEv + 0.1 * fwhmEv, highEv - 0.1 * fwhmEv, points)
    // Simpson's rule.
    const sum = inner.reduce((total, T, i) => total + T * (i === 0 || i === points - 1 ? 1 : i % 2 === 1 ? 4 : 2), 0)
    expect(found!.top).toBeCloseTo(sum / (3 * (points - 1)), 11)
    expect(found!.ripple).toBeCloseTo(Math.max(...inner) - Math.min(...inner), 8)
    expect(reached).toBe(found!.centreEv)
    expect(reached).toBeCloseTo((lowEv + highEv) / 2, 15)
  })

  test('of a narrow line is a Lorentzian: arctan(0.8)/0.8 on the mean, a dip of 1 - 1/1.64', () => {
    const lead = { potentialEv: 0, massRel: 0.067 }
    const barrier = { potentialEv: 0.3, massRel: 0.067 }
    for (const barrierNm of [7, 9, 16, 24]) {
      const layers = [barrierNm, 5, barrierNm].map((widthNm, i) => ({ ...(i === 1 ? lead : barrier), widthNm }))
      const { band: found } = resultOf(band, systemOf({ kind: 'electron', entry: lead, layers, exit: lead }))
      const { T, fwhmEv, energyEv } = found!.peak
      // The background tilts a line by about its width over its energy.
      const tilt = fwhmEv / energyEv
      expect(Math.abs(found!.top / T - Math.atan(0.8) / 0.8)).toBeLessThan(Math.max(tilt, 1e-6))
      expect(Math.abs(found!.ripple / T - (1 - 1 / 1.64))).toBeLessThan(Math.max(tilt, 1e-6))
    }
  })

  test('has the mean square of the parts that are stated', () => {
    const { centreEv, top, ripple, peak } = resultOf(band, flat).band!
    const unmet = { ...band, centre: 0.09, fwhm: [0.001, 0.002] as const, top: 0.99, ripple: 0.01 }
    const parts = [
      (Math.abs(centreEv - 0.09) - 0.002) / 0.002,
      (peak.fwhmEv - 0.002) / 0.0005,
      Math.max(0, 0.99 - top) / 0.01,
      Math.max(0, ripple - 0.01) / 0.01,
    ]
    const square = (values: number[]) => values.reduce((sum, one) => sum + one * one, 0) / values.length
    expect(resultOf(unmet, flat).rms).toBeCloseTo(Math.sqrt(square(parts)), 9)
    expect(resultOf({ ...unmet, top: null, ripple: null }, flat).rms).toBeCloseTo(
      Math.sqrt(square(parts.slice(0, 2))),
      9,
    )
    expect(resultOf({ ...band, energyEv: centreEv, top: top - 1e-3, ripple: ripple + 1e-3 }, flat).met).toBe(true)
    expect(resultOf({ ...band, energyEv: centreEv, top: top + 1e-3 }, flat).met).toBe(false)
  })
})

describe('a peak that must stand alone', () => {
  test('has the highest other maximum of the scan above it in decibels', () => {
    const alone = { ...d1, fwhm: null, height: null, axis: 'eV', centre: 0.075, within: 0.03, alone: 0.01 }
    const maxima = extrema(flat, [1e-6, 0.2]).filter(({ kind, energyEv }) => kind === 'maximum' && energyEv > 0.005)
    expect(maxima.length).toBeGreaterThan(1)
    const reached = resultOf(alone, flat)
    const others = maxima.filter(({ energyEv }) => energyEv !== reached.reached)
    const T2 = Math.max(...others.map(({ T }) => T))
    expect(reached.rms).toBeCloseTo(Math.sqrt(((10 * Math.log10(T2 / 0.01)) / 3) ** 2 / 2), 9)
    expect(reached.met).toBe(false)
    const [single] = systemsOf(layersOf(0.35, [12, 18, 12]))
    expect(resultOf({ ...alone, centre: 0.08 }, single).met).toBe(true)
  })
})

describe('what a demand accepts', () => {
  const text = (accept: string) => `format: 1
name: any
kind: electron
stack: { entry: GaAs, layers: [{ material: AlAs, width: 3 ML }], exit: GaAs }
target: { scan: 5..200 meV, demands: [{ peak: 80 meV, within: 5 meV, fwhm: 1..4 meV, height: 0.8${accept} }] }
`
  test('loosens it where the yield judges, and is no business of the search', () => {
    const strict = readJobText(text(''), 'any.yaml')
    const loose = readJobText(text(', accept: { within: 8 meV, fwhm: ..5 meV, height: 0.6 }'), 'any.yaml')
    expect(acceptedDemands(loose.demands)[0]).toMatchObject({
      axis: 'eV',
      centre: 0.08,
      within: 0.008,
      fwhm: [0, 0.005],
      height: 0.6,
    })
    expect(loose.demands[0]).toMatchObject({ within: 0.005, fwhm: [0.001, 0.004], height: 0.8 })
    expect(resumeContent(loose)).toBe(resumeContent(strict))
  })

  test('may not be tighter than the demand, nor loosen what is not stated', () => {
    expect(() => readJobText(text(', accept: { within: 3 meV }'), 'any.yaml')).toThrow('is tighter than the demand')
    expect(() => readJobText(text(', accept: { fwhm: 2..5 meV }'), 'any.yaml')).toThrow('is tighter than the demand')
    expect(() => readJobText(text(', accept: { below: 0.1 }'), 'any.yaml')).toThrow('states no "below"')
    expect(() => readJobText(text(', accept: { rms: 1 }'), 'any.yaml')).toThrow('belongs to a curve')
  })
})

describe('the rule of quadrature', () => {
  test('integrates every power up to 2 n - 1 over -1..1, and no further', () => {
    const { x, w } = gaussLegendre(16)
    const integral = (power: number) => x.reduce((sum, at, i) => sum + w[i] * at ** power, 0)
    for (let power = 0; power < 32; power++)
      expect(integral(power)).toBeCloseTo(power % 2 === 0 ? 2 / (power + 1) : 0, 14)
    expect(Math.abs(integral(32) - 2 / 33)).toBeGreaterThan(1e-11)
  })
})

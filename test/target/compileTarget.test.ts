import { describe, expect, test } from 'vitest'
import type { CurveDemand, CurveRow, Demand } from '../../src/job/index.js'
import { systemOf } from '../../src/model/index.js'
import { compileTarget } from '../../src/target/index.js'
import { extrema, resonances, type WaveSystem } from '../../src/wave/index.js'
import { block, condition, d1, evenly, layersOf, spec, systemsOf } from './coldCollector.js'

const lead = { potentialEv: 0, massRel: 0.067 }
const wall = { potentialEv: 0.3, massRel: 0.067 }

/** A double barrier of parabolic electrons, widths in nm. */
function doubleBarrier(barrierNm: number, wellNm: number): WaveSystem {
  const layers = [barrierNm, wellNm, barrierNm].map((widthNm, i) => ({ ...(i === 1 ? lead : wall), widthNm }))
  return systemOf({ kind: 'electron', entry: lead, layers, exit: lead })
}

/** Nothing at all: T = 1 everywhere. */
const plain = systemOf({ kind: 'electron', entry: lead, layers: [{ ...lead, widthNm: 5 }], exit: lead })

/** One barrier so thin that T only rises: half a wave fits into it at 5.6 eV above its top. */
const rising = systemOf({ kind: 'electron', entry: lead, layers: [{ ...wall, widthNm: 1 }], exit: lead })

function targetOf(demands: readonly Demand[], rest: Partial<typeof spec> = {}) {
  return compileTarget({ ...spec, demands, ...rest })
}

const only = (demand: Demand, system: WaveSystem, rest: Partial<typeof spec> = {}) =>
  targetOf([demand], rest).evaluate([system]).demands[0]

describe('the merit', () => {
  const systems = systemsOf(layersOf(0.25, [10, 20, 10]))

  test('is the root of the weighted mean of the squares of the rms', () => {
    const { merit, demands } = compileTarget(spec).evaluate(systems)
    const [a, b, c] = demands.map(({ rms }) => rms * rms)
    expect(merit).toBeCloseTo(Math.sqrt((a + b + 0.5 * c) / 2.5), 12)
  })

  test('has the point terms as a lower bound, to the last bit', () => {
    const target = compileTarget(spec)
    for (let ml = 6; ml < 30; ml++) {
      const at = systemsOf(layersOf(0.25, [10, ml, 10]))
      expect(target.pointMerit(at)).toBeLessThanOrEqual(target.evaluate(at).merit)
    }
    const curveOnly = targetOf([curve([{ energyEv: 0.1, T: 0.3 }])])
    expect(curveOnly.pointMerit(systems)).toBe(curveOnly.evaluate(systems).merit)
  })

  test('of two conditions is that of the mean of squares; figures are those of the worst', () => {
    const two = compileTarget({ ...spec, conditions: [condition, { ...condition, name: 'other' }] })
    const [good] = systemsOf(layersOf(0.35, [12, 18, 12]))
    const both = two.evaluate([good, systems[0]])
    const bad = compileTarget(spec).evaluate(systems)
    expect(both.merit).toBeCloseTo(bad.merit / Math.SQRT2, 12)
    expect(both.met).toBe(false)
    expect(both.demands[0].reached).toBe(bad.demands[0].reached)
    expect(both.demands[0].rms).toBeCloseTo(bad.demands[0].rms / Math.SQRT2, 12)
  })
})

describe('a demand at one of the conditions', () => {
  const conditions = [condition, { ...condition, name: 'on' }]
  const [good] = systemsOf(layersOf(0.35, [12, 18, 12]))
  const [bad] = systemsOf(layersOf(0.25, [10, 20, 10]))
  const at = (name: string | null) => compileTarget({ ...spec, conditions, demands: [{ ...d1, at: name }] })

  test('is judged there and nowhere else', () => {
    for (const [name, systems] of [
      ['on', [bad, good]],
      ['', [good, bad]],
    ] as const) {
      const { met, merit, peakCondition } = at(name).evaluate(systems)
      expect([met, merit, peakCondition]).toEqual([true, 0, systems.indexOf(good)])
      expect(at(name).meets(systems)).toEqual([true])
      expect(at(null).evaluate(systems).met).toBe(false)
      expect(at(null).meets(systems)).toEqual([false])
    }
  })

  test('weighs as much as one at all of them, and has its limits there only', () => {
    const one = at('on').evaluate([good, bad]).merit
    expect(at(null).evaluate([good, bad]).merit).toBeCloseTo(one / Math.SQRT2, 12)
    const target = at('on')
    const limits = target.limits([good, bad], target.evaluate([good, bad]))
    expect(limits).toHaveLength(5)
    expect(limits.every((limit) => limit.condition === 1)).toBe(true)
    expect(at(null).limits([good, bad], target.evaluate([good, bad]))).toHaveLength(10)
    expect(at('on').fitSize).toBe(3)
    expect(at(null).fitSize).toBe(6)
  })
})

describe('a peak', () => {
  test('without any maximum has 10 in every part that it states', () => {
    const { rms, reached, met, peak } = only(d1, rising)
    expect([rms, reached, met, peak]).toEqual([10, null, false, null])
    expect(only({ ...d1, height: null, fwhm: null }, rising).rms).toBe(10)
  })

  test('takes the mean over the parts that are stated', () => {
    const system = doubleBarrier(3, 8)
    const far = { ...d1, axis: 'eV', centre: 0.1, within: 0.01, fwhm: null, height: null }
    const alone = only(far, system)
    const peak = alone.peak!
    expect(alone.rms).toBeCloseTo((Math.abs(peak.energyEv - 0.1) - 0.01) / 0.01, 12)
    expect(only({ ...far, height: 0.5 }, system).rms).toBeCloseTo(alone.rms / Math.SQRT2, 12)
    const narrow = only({ ...far, fwhm: [0, 1e-4] }, system)
    const width = (peak.fwhmEv - 1e-4) / 0.5e-4
    expect(narrow.rms).toBeCloseTo(Math.sqrt((alone.rms ** 2 + width ** 2) / 2), 9)
  })

  test('is the maximum that fits best, not the nearest one', () => {
    const system = doubleBarrier(2, 12)
    const maxima = extrema(system, [0, 0.395]).filter(({ kind, T }) => kind === 'maximum' && T > 0.5)
    const [first, second] = maxima
    const between = 0.6 * first.energyEv + 0.4 * second.energyEv
    const at = { ...d1, centre: between, within: 0.5 * (second.energyEv - first.energyEv), height: null }
    const widths = targetOf([{ ...at, fwhm: null }]).evaluate([system]).demands[0]
    expect(widths.reached).toBe(first.energyEv)
    // The second is several times as wide.
    const wide = only({ ...at, fwhm: [0.01, 0.03] }, system)
    expect(wide.reached).toBe(second.energyEv)
  })

  test('of two that fit alike is the lower one', () => {
    const system = doubleBarrier(2, 12)
    expect(only({ ...d1, axis: 'eV', centre: 0.15, within: 0.149, fwhm: null, height: 0.5 }, system).reached).toBe(
      extrema(system, [0, 0.395]).find(({ kind, T }) => kind === 'maximum' && T > 0.5)!.energyEv,
    )
  })

  test('may lie beyond the scan, up to its length', () => {
    const system = doubleBarrier(3, 8)
    const [, second] = extrema(system, [0, 0.4]).filter(({ kind, T }) => kind === 'maximum' && T > 0.5)
    const demand = { ...d1, centre: second.energyEv, within: 0.001, fwhm: null, height: null }
    const end = 0.6 * second.energyEv
    expect(only(demand, system, { scanEv: [0.005, end] }).reached).toBe(second.energyEv)
    expect(only(demand, system, { scanEv: [0.005, 0.49 * second.energyEv] }).reached).toBeLessThan(second.energyEv)
  })
})

describe('a block', () => {
  test('counts the greatest T over its closed range, between its points too', () => {
    const system = doubleBarrier(7, 8)
    const needle = extrema(system, [0.04, 0.06]).find(({ kind }) => kind === 'maximum')!
    expect(needle.poleWidthEv).toBeLessThan(1e-5)
    const over = block('b', 1, 0.04, 0.06, 1e-3)
    const found = only(over, system, { resolutionEv: null })
    expect(found.reached).toBeCloseTo(1, 9)
    expect(found.extremeEv).toBeCloseTo(needle.energyEv, 14)
    const points = targetOf([over], { resolutionEv: null }).pointMerit([system])
    expect(points).toBeLessThan(1)
    expect(found.rms).toBeCloseTo(Math.sqrt(points ** 2 + 100), 9)
    // An end that is the greatest counts as it is.
    const below = only(block('b', 1, 0.04, needle.energyEv - 1e-3, 1e-3), system)
    expect(below.extremeEv).toBe(needle.energyEv - 1e-3)
  })

  test('takes a maximum narrower than the resolution for T (pi/2) Gamma/resolution', () => {
    const system = doubleBarrier(7, 8)
    const [{ widthEv }] = resonances(system, [0.04, 0.06]).poles
    for (const resolutionEv of [1e-5, 1e-4]) {
      const { reached } = only(block('b', 1, 0.04, 0.06, 1e-6), system, { resolutionEv })
      expect(reached).toBeCloseTo(((Math.PI / 2) * widthEv) / resolutionEv, 9)
    }
    expect(only(block('b', 1, 0.04, 0.06, 1e-6), system, { resolutionEv: 1e-12 }).reached).toBeCloseTo(1, 9)
  })

  test('is 1 for each 3 dB above', () => {
    expect(only(block('b', 1, 0.02, 0.1, 1e-3), plain).rms).toBeCloseTo(10 * Math.SQRT2, 9)
  })
})

describe('a pass', () => {
  const pass = (from: number, to: number, above: number): Demand => ({
    kind: 'pass',
    accept: null,
    at: null,
    quantity: 'T',
    id: 'p',
    weight: 1,
    pointsEv: evenly(from, to, 64),
    above,
  })

  test('counts the least T over its closed range', () => {
    const system = doubleBarrier(2, 12)
    const [peak, minimum, next] = extrema(system, [0.05, 0.3])
    expect([peak.kind, minimum.kind, next.kind]).toEqual(['maximum', 'minimum', 'maximum'])
    const over = (above: number) => only(pass(peak.energyEv, next.energyEv, above), system)
    const { reached, extremeEv, met } = over(0.9)
    expect(reached).toBeCloseTo(minimum.T, 12)
    expect(extremeEv).toBeCloseTo(minimum.energyEv, 12)
    expect(met).toBe(false)
    expect(over(minimum.T * 0.999).met).toBe(true)
    expect(over(minimum.T * 1.001).met).toBe(false)
  })

  test('divides what lacks by what t leaves, at least 0.01', () => {
    const closed = doubleBarrier(20, 8)
    expect(only(pass(0.1, 0.11, 0.9), closed).rms).toBeCloseTo(9 * Math.SQRT2, 4)
    expect(only(pass(0.1, 0.11, 1), closed).rms).toBeCloseTo(100 * Math.SQRT2, 3)
    expect(only(pass(0.1, 0.11, 1), plain).met).toBe(true)
  })
})

function curve(rows: readonly Partial<CurveRow>[]): CurveDemand {
  const row = { energyEv: 0.1, T: 1, sense: 'equal', scale: 'linear', tolerance: 1, weight: 1 } as const
  return {
    kind: 'curve',
    accept: null,
    at: null,
    quantity: 'T',
    mostRms: null,
    id: 'c',
    weight: 1,
    file: 'goal.csv',
    rows: rows.map((given) => ({ ...row, ...given })),
  }
}

describe('a curve', () => {
  test('is the weighted rms of the violations over their tolerances', () => {
    const { rms, reached, met } = only(
      curve([
        { T: 0.5, tolerance: 0.25 },
        { T: 0.9, weight: 3 },
      ]),
      plain,
    )
    expect(rms).toBeCloseTo(Math.sqrt((4 + 3 * 0.01) / 4), 12)
    expect(reached).toBe(rms)
    expect(met).toBeNull()
  })

  test('counts decades, and T below 1e-30 as 1e-30', () => {
    expect(only(curve([{ T: 1e-3, scale: 'decades' }]), plain).rms).toBeCloseTo(3, 12)
    expect(only(curve([{ T: 1e-40, scale: 'decades' }]), plain).rms).toBeCloseTo(30, 12)
    expect(only(curve([{ T: 1e-30, scale: 'decades' }]), doubleBarrier(60, 8)).rms).toBe(0)
  })

  test('has a free side where it says least or most', () => {
    expect(only(curve([{ T: 0.5, sense: 'least' }]), plain).rms).toBe(0)
    expect(only(curve([{ T: 0.5, sense: 'most' }]), plain).rms).toBeCloseTo(0.5, 12)
  })

  test('alone leaves every stack met, for there is no limit', () => {
    const { met, peak } = targetOf([curve([{ T: 0.5 }])]).evaluate([doubleBarrier(3, 8)])
    expect(met).toBe(true)
    // The highest maximum stands in for a peak demand.
    expect(peak!.T).toBeCloseTo(1, 9)
    expect(targetOf([curve([{ T: 0.5 }])]).meets([plain])).toEqual([true])
  })
})

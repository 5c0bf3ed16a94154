import { describe, expect, test } from 'vitest'
import { bandParameters } from '../../src/media/index.js'
import {
  type MediumChoice,
  regionDerivative,
  resolveMedium,
  type Situation,
  StackError,
} from '../../src/model/index.js'

const gaAs: MediumChoice = { kind: 'material', material: 'GaAs', x: null }
const barrier: MediumChoice = { kind: 'material', material: 'AlGaAs', x: 0.35 }
const numbers: MediumChoice = { kind: 'numbers', name: 'low', potentialEv: 0.115, massRel: 0.0795, alphaPerEv: 1.2 }
const onGaAs: Situation = {
  kind: 'electron',
  temperatureK: 77,
  substrateNm: bandParameters('GaAs', null, 300).latticeNm,
  massModel: 'two-band',
  entry: gaAs,
  exit: gaAs,
  inPlaneKPerNm: 0,
}

describe('resolveMedium', () => {
  test('the lead that the layers are strained to is itself unstrained and the zero of energy', () => {
    const { region, strain, monolayerNm } = resolveMedium(gaAs, onGaAs)
    expect(region.potentialEv).toBe(0)
    expect(strain).toBe(0)
    expect(monolayerNm).toBe(0.565325 / 2)
    expect(region.alphaPerEv).toBe(1 / bandParameters('GaAs', null, 77).gapEv)
  })

  test('strain of AlGaAs x = 0.35 on GaAs at 77 K, computed by hand from the table', () => {
    const a = 0.65 * 0.565325 + 0.35 * 0.56611
    const parallel = (0.565325 - a) / a
    const perpendicular = (-2 * (0.65 * 56.6 + 0.35 * 53.4) * parallel) / (0.65 * 122.1 + 0.35 * 125)
    const trace = 2 * parallel + perpendicular
    const varshni = (eg: number, alpha: number, beta: number) => eg - (alpha * 77 * 77) / (77 + beta)
    const [ga, al] = [varshni(1.519, 0.5405e-3, 204), varshni(3.099, 0.885e-3, 530)]
    const gap = 0.65 * ga + 0.35 * al - 0.35 * 0.65 * (-0.127 + 1.31 * 0.35)
    const edge = 0.65 * -0.8 + 0.35 * -1.33 + gap
    const ac = 0.65 * -7.17 + 0.35 * -5.64
    const av = 0.65 * -1.16 + 0.35 * -2.47
    const { region, strain, monolayerNm } = resolveMedium(barrier, onGaAs)
    expect(strain).toBeCloseTo(parallel, 15)
    expect(monolayerNm).toBeCloseTo((a * (1 + perpendicular)) / 2, 15)
    expect(region.potentialEv).toBeCloseTo(edge + ac * trace - (-0.8 + ga), 14)
    expect(region.massRel).toBeCloseTo(0.067 + 0.083 * 0.35, 15)
    expect(region.alphaPerEv).toBeCloseTo(1 / (gap + (ac + av) * trace), 13)
  })

  test('AlAs on InP: +3.685 % in plane, a shift of -0.238 eV, a barrier of about 1.29 eV over In0.53Ga0.47As', () => {
    const well: MediumChoice = { kind: 'material', material: 'InGaAs', x: 0.53 }
    const alAs: MediumChoice = { kind: 'material', material: 'AlAs', x: null }
    const free: Situation = { ...onGaAs, temperatureK: 300, substrateNm: null, entry: well, exit: well }
    const onInP: Situation = { ...free, substrateNm: bandParameters('InP', null, 300).latticeNm }
    const strained = resolveMedium(alAs, onInP)
    expect(strained.strain! * 100).toBeCloseTo(3.685, 3)
    expect((strained.monolayerNm! / 0.283055 - 1) * 100).toBeCloseTo(-3.148, 3)
    const unstrained = resolveMedium(alAs, free)
    expect(unstrained.strain).toBeNull()
    expect(unstrained.monolayerNm).toBe(0.283055)
    expect(unstrained.region.potentialEv).toBeCloseTo(1.53, 2)
    expect(strained.region.potentialEv).toBeCloseTo(1.29, 2)
  })

  test('a layer under compression has a higher edge: InGaAs on GaAs', () => {
    const layer: MediumChoice = { kind: 'material', material: 'InGaAs', x: 0.2 }
    const strained = resolveMedium(layer, onGaAs)
    expect(strained.strain!).toBeLessThan(0)
    const unstrained = resolveMedium(layer, { ...onGaAs, substrateNm: null })
    expect(strained.region.potentialEv).toBeGreaterThan(unstrained.region.potentialEv)
    expect(strained.monolayerNm!).toBeGreaterThan(unstrained.monolayerNm!)
  })

  test('the parabolic model takes alpha from materials and leaves it to numbers', () => {
    const parabolic: Situation = { ...onGaAs, massModel: 'parabolic' }
    expect(resolveMedium(barrier, parabolic).region.alphaPerEv).toBe(0)
    expect(resolveMedium(numbers, parabolic).region.alphaPerEv).toBe(1.2)
  })

  test('numbers stay as written and have no monolayer', () => {
    expect(resolveMedium(numbers, onGaAs)).toEqual({
      kind: 'electron',
      region: { potentialEv: 0.115, massRel: 0.0795, alphaPerEv: 1.2 },
      monolayerNm: null,
      strain: null,
    })
  })

  test('a material has no zero where the entry is given by numbers', () => {
    expect(() => resolveMedium(barrier, { ...onGaAs, entry: numbers })).toThrow(StackError)
    expect(() => resolveMedium(barrier, { ...onGaAs, entry: numbers })).toThrow('AlGaAs has no potential here')
  })
})

describe('regionDerivative', () => {
  test('is the closed form of AlGaAs without strain, to 1e-9', () => {
    const free: Situation = { ...onGaAs, substrateNm: null }
    const x = 0.35
    const [ga, al] = ['GaAs', 'AlAs'].map((name) => bandParameters(name, null, 77).gapEv)
    const gapSlope = al - ga - (1 - 2 * x) * (-0.127 + 1.31 * x) - x * (1 - x) * 1.31
    const { gapEv } = bandParameters('AlGaAs', x, 77)
    const slope = regionDerivative(barrier, free)
    expect(Math.abs(slope.potentialEv / (gapSlope - 0.53) - 1)).toBeLessThan(1e-9)
    expect(Math.abs(slope.massRel / 0.083 - 1)).toBeLessThan(1e-9)
    expect(Math.abs(slope.alphaPerEv / (-gapSlope / (gapEv * gapEv)) - 1)).toBeLessThan(1e-9)
  })

  test.each([0, 0.5, 1])('under strain it is the limit of ever finer differences at x = %f, to 1e-9', (x) => {
    const choice = { kind: 'material', material: 'InGaAs', x } as const
    const slope = regionDerivative(choice, onGaAs)
    const region = (at: number) => resolveMedium({ ...choice, x: at }, onGaAs).region
    for (const key of ['potentialEv', 'massRel', 'alphaPerEv'] as const) {
      const wide = (h: number) => (region(x + h)[key] - region(x - h)[key]) / (2 * h)
      // Romberg on steps that share no point with the function's own.
      const [a, b, c] = [wide(0.02), wide(0.01), wide(0.005)]
      const limit = (64 * c - 20 * b + a) / 45
      expect(Math.abs(slope[key] / limit - 1), key).toBeLessThan(1e-9)
    }
  })

  test('is nothing for binaries and numbers', () => {
    expect(regionDerivative(gaAs, onGaAs)).toEqual({ potentialEv: 0, massRel: 0, alphaPerEv: 0 })
    expect(regionDerivative(numbers, onGaAs)).toEqual({ potentialEv: 0, massRel: 0, alphaPerEv: 0 })
  })
})

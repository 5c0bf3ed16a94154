import { describe, expect, test } from 'vitest'
import type { CurveDemand, Demand } from '../../src/job/index.js'
import { buildSystem, regionDerivative } from '../../src/model/index.js'
import { compileTarget } from '../../src/target/index.js'
import { block, condition, d1, evenly, layersOf, situation, spec } from './coldCollector.js'

const pass: Demand = {
  kind: 'pass',
  accept: null,
  at: null,
  quantity: 'T',
  id: 'p',
  weight: 2,
  pointsEv: evenly(0.06, 0.08, 16),
  above: 0.7,
}
const band: Demand = {
  ...{
    kind: 'band',
    accept: null,
    at: null,
    quantity: 'T',
    id: 'flat',
    weight: 1,
    axis: 'eV',
    centre: 0.08,
    within: 0.001,
  },
  ...{ fwhm: [0.01, 0.02], top: 0.95, ripple: 0.05 },
}
const rows = evenly(0.01, 0.19, 12).map((energyEv, i) => ({
  energyEv,
  T: i % 2 === 0 ? 1e-4 : 0.5,
  sense: (['equal', 'least', 'most'] as const)[i % 3],
  scale: (['linear', 'decades'] as const)[i % 2],
  tolerance: 0.5,
  weight: 1 + (i % 4),
}))
const curve: CurveDemand = {
  kind: 'curve',
  accept: null,
  at: null,
  quantity: 'T',
  mostRms: null,
  id: 'c',
  weight: 0.3,
  file: 'goal.csv',
  rows,
}

/** Variables: the three widths (nm), and x of both barriers. */
function stackAt([a, b, c, x]: readonly number[]) {
  const layers = layersOf(x, [1, 1, 1]).map((layer, i) => ({ ...layer, widthNm: [a, b, c][i] }))
  return { layers, system: buildSystem(situation, layers) }
}

function directionsAt(variables: readonly number[]): Float64Array {
  const { layers } = stackAt(variables)
  const directions = new Float64Array(4 * 12)
  for (let j = 0; j < 3; j++) {
    directions[12 * j + 4 * j] = 1
    const { potentialEv, massRel, alphaPerEv } = regionDerivative(layers[j].choice, situation)
    directions.set([potentialEv, massRel, alphaPerEv], 12 * 3 + 4 * j + 1)
  }
  return directions
}

function fitAt(demands: readonly Demand[], variables: readonly number[], conditions = [condition]) {
  const target = compileTarget({ ...spec, demands, conditions })
  const residuals = new Float64Array(target.fitSize).fill(Number.NaN)
  const jacobian = new Float64Array(4 * target.fitSize).fill(Number.NaN)
  const systems = conditions.map(() => stackAt(variables).system)
  target.fit(
    systems,
    conditions.map(() => directionsAt(variables)),
    4,
    residuals,
    jacobian,
  )
  return { target, residuals, jacobian, systems }
}

const starts = [
  [2.8, 5.6, 2.8, 0.25],
  [2.4, 6.3, 3.7, 0.31],
  [5.1, 4.2, 4.4, 0.35],
]

describe('the fit', () => {
  const everything = [d1, band, block('b', 0.5, 0.005, 0.06, 2e-2), block('b2', 1, 0.11, 0.2, 2e-3), pass, curve]

  test.each(starts)('has the slopes of its residuals at %d, %d, %d nm and x = %d', (...start) => {
    const { residuals, jacobian } = fitAt(everything, start)
    expect(residuals.every(Number.isFinite)).toBe(true)
    expect(jacobian.every(Number.isFinite)).toBe(true)
    for (let v = 0; v < 4; v++) {
      const h = v === 3 ? 1e-6 : 1e-5
      const [up, down, up2, down2] = [h, -h, 2 * h, -2 * h].map(
        (step) =>
          fitAt(
            everything,
            start.map((value, i) => (i === v ? value + step : value)),
          ).residuals,
      )
      for (let i = 0; i < residuals.length; i++) {
        const expected = (8 * (up[i] - down[i]) - (up2[i] - down2[i])) / (12 * h)
        // Differences of residuals of order 10 at 1e-16/h: 1e-9 absolute.
        const scale = Math.max(Math.abs(expected), 0.01)
        expect(Math.abs(jacobian[4 * i + v] - expected) / scale, `residual ${i}, variable ${v}`).toBeLessThan(2e-6)
      }
    }
  })

  test('has the merit without its extremes as the root of its sum of squares', () => {
    for (const start of starts) {
      const { target, residuals, systems } = fitAt([d1, curve], start)
      const sum = residuals.reduce((total, residual) => total + residual * residual, 0)
      expect(Math.sqrt(sum)).toBeCloseTo(target.evaluate(systems).merit, 12)
      const points = fitAt([pass, everything[2], curve], start)
      const squares = points.residuals.reduce((total, residual) => total + residual * residual, 0)
      expect(Math.sqrt(squares)).toBeCloseTo(points.target.pointMerit(points.systems), 12)
    }
  })

  test('of two equal conditions has the same sum of squares', () => {
    const sum = (values: Float64Array) => values.reduce((total, value) => total + value * value, 0)
    const one = fitAt(everything, starts[0])
    const two = fitAt(everything, starts[0], [condition, condition])
    expect(two.residuals).toHaveLength(2 * one.residuals.length)
    expect(sum(two.residuals)).toBeCloseTo(sum(one.residuals), 12)
  })

  test('leaves a stack without any maximum at 10 in each part, without a slope', () => {
    const { residuals, jacobian } = fitAt([d1], [0.3, 0.3, 0.3, 0.25])
    for (const residual of residuals) expect(residual).toBeCloseTo(10 / Math.sqrt(3), 12)
    expect(jacobian.every((slope) => slope === 0)).toBe(true)
  })
})

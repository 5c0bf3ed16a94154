import { describe, expect, test } from 'vitest'
import type { Demand } from '../../src/job/index.js'
import { buildSystem, type MediumChoice } from '../../src/model/index.js'
import { compileTarget, type Limit } from '../../src/target/index.js'
import { block, d1, d2, d3, evenly, situation, spec } from './coldCollector.js'

/** Layers by [width, potential, mass, alpha], so that every number of them can be moved alone. */
function systemOf(parameters: readonly number[]) {
  const layers = Array.from({ length: parameters.length / 4 }, (_, j) => {
    const [widthNm, potentialEv, massRel, alphaPerEv] = parameters.slice(4 * j, 4 * j + 4)
    const choice: MediumChoice = { kind: 'numbers', name: null, potentialEv, massRel, alphaPerEv }
    return { choice, widthNm }
  })
  return buildSystem(situation, layers)
}

const asymmetric = [3.2, 0.29, 0.094, 0.54, 5.1, 0.002, 0.067, 0.66, 3.6, 0.27, 0.092, 0.55]

function limitsOf(
  demands: readonly Demand[],
  parameters: readonly number[],
  resolutionEv = spec.resolutionEv,
): Limit[] {
  const target = compileTarget({ ...spec, demands, resolutionEv })
  const systems = [systemOf(parameters)]
  return target.limits(systems, target.evaluate(systems))
}

/** Largest difference of the gradients from fourth-order differences of the slacks, over the largest slope of its limit. */
function worst(demands: readonly Demand[], parameters: readonly number[], step: number, resolutionEv?: number | null) {
  const at = (p: readonly number[]) => limitsOf(demands, p, resolutionEv)
  const limits = at(parameters)
  let largest = 0
  for (const [k, value] of parameters.entries()) {
    const h = step * Math.max(Math.abs(value), 0.01)
    const [up, down, up2, down2] = [h, -h, 2 * h, -2 * h].map((d) =>
      at(parameters.map((p, i) => (i === k ? p + d : p))),
    )
    for (const [i, { gradient }] of limits.entries()) {
      const expected = (8 * (up[i].slack - down[i].slack) - (up2[i].slack - down2[i].slack)) / (12 * h)
      const scale = Math.max(...gradient.map(Math.abs))
      largest = Math.max(largest, Math.abs(gradient[k] - expected) / scale)
    }
  }
  return largest
}

describe('the gradients of limits', () => {
  const pass: Demand = {
    kind: 'pass',
    accept: null,
    at: null,
    quantity: 'T',
    id: 'p',
    weight: 1,
    pointsEv: evenly(0.06, 0.12, 64),
    above: 1e-3,
  }

  test('are those of the slacks of peaks, passes and blocks', () => {
    const demands = [d1, { ...d1, id: 'wide', fwhm: null }, pass, d2, d3]
    expect(limitsOf(demands, asymmetric)).toHaveLength(5 + 3 + 1 + 1 + 1)
    expect(worst(demands, asymmetric, 1e-5)).toBeLessThan(1e-6)
  })

  test('hold for a band whose top has its greatest T inside and its least at an end, and for a peak that must stand alone', () => {
    const band: Demand = {
      ...{
        kind: 'band',
        id: 'band',
        weight: 1,
        accept: null,
        at: null,
        quantity: 'T',
        axis: 'eV',
        centre: 0.09,
        within: 0.03,
      },
      ...{ fwhm: [0.001, 0.02], top: 0.5, ripple: 0.3 },
    }
    const alone: Demand = { ...d1, fwhm: null, height: null, axis: 'eV', centre: 0.09, within: 0.08, alone: 0.1 }
    const twoWells = [
      ...asymmetric,
      ...asymmetric.slice(4, 8).map((value, k) => (k === 0 ? 0.8 * value : value)),
      ...asymmetric.slice(8),
    ]
    expect(limitsOf([band, alone], twoWells)).toHaveLength(6 + 3)
    expect(worst([band], asymmetric, 1e-5)).toBeLessThan(1e-6)
    expect(worst([band, alone], twoWells, 1e-5)).toBeLessThan(1e-6)
  })

  test('hold for a greatest T inside the range of a block', () => {
    const inside = block('b', 1, 0.05, 0.12, 2)
    expect(limitsOf([inside], asymmetric)[0].slack).toBeGreaterThan(3)
    expect(worst([inside], asymmetric, 1e-5)).toBeLessThan(1e-6)
  })

  test('hold for a maximum that the resolution makes count less', () => {
    const narrow = asymmetric.map((value, k) => (k % 8 === 0 ? 2 * value : value))
    const inside = block('b', 1, 0.05, 0.12, 0.9)
    expect(limitsOf([inside], narrow, 1e-3)[0].slack).toBeGreaterThan(5)
    // The width of the pole differs from that of the peak by the share of the line's asymmetry.
    expect(worst([inside], narrow, 1e-5, 1e-3)).toBeLessThan(1e-4)
  })

  test('hold for the position of peaks too narrow for their half points', () => {
    const position = { ...d1, fwhm: null, height: null, axis: 'eV', centre: 0.09, within: 0.08 }
    for (const times of [2, 4, 8]) {
      const thick = asymmetric.map((value, k) => (k % 8 === 0 ? times * value : value))
      expect(worst([position], thick, 1e-5), `${times} times as thick`).toBeLessThan(1e-6)
    }
  })
})

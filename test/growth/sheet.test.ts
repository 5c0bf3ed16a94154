import { describe, expect, test } from 'vitest'
import { sheetOf } from '../../src/growth/index.js'
import { buildSystem } from '../../src/model/index.js'
import { compileTarget } from '../../src/target/index.js'
import { growth, layersOf, situation, spec, systemsOf } from '../target/coldCollector.js'

const target = compileTarget(spec)

function sheetFor(x: number, ml: readonly number[], rest: Partial<typeof growth> = {}) {
  const layers = layersOf(x, ml)
  const systems = systemsOf(layers)
  const evaluation = target.evaluate(systems)
  const limits = target.limits(systems, evaluation)
  const sheet = sheetOf({ layers, situation, growth: { ...growth, ...rest }, target, evaluation, limits })
  return { layers, evaluation, limits, ...sheet }
}

describe('sheetOf', () => {
  test('counts from the substrate and opens shutters at the summed rate of the cells', () => {
    const { rows } = sheetFor(0.35, [12, 18, 14])
    expect(rows.map(({ fromSubstrate }) => fromSubstrate)).toEqual([3, 2, 1])
    const [a, b, c] = rows.map(({ seconds }) => seconds!)
    expect(a).toBeCloseTo(12 / (0.7 + 0.377), 9)
    expect(b).toBeCloseTo(18 / 0.7, 9)
    expect(c).toBeCloseTo(14 / (0.7 + 0.377), 9)
    expect(sheetFor(0.35, [12, 18, 14], { startsAt: 'entry' }).rows.map((row) => row.fromSubstrate)).toEqual([1, 2, 3])
  })

  test('has no seconds without rates', () => {
    expect(sheetFor(0.35, [12, 18, 12], { sources: [] }).rows.map(({ seconds }) => seconds)).toEqual([null, null, null])
  })

  test('shifts the peak as the stack that is one monolayer thicker does', () => {
    const { rows, evaluation } = sheetFor(0.35, [12, 18, 12])
    for (const [j, ml] of [
      [13, 18, 12],
      [12, 19, 12],
      [12, 18, 13],
    ].entries()) {
      const thicker = target.evaluate(systemsOf(layersOf(0.35, ml))).peak!
      expect(rows[j].shiftEv).toBeCloseTo(thicker.energyEv - evaluation.peak!.energyEv, 12)
    }
    // A wider well lowers its state, a thicker barrier hardly moves it.
    expect(rows[1].shiftEv).toBeLessThan(-0.003)
    expect(Math.abs(rows[0].shiftEv!)).toBeLessThan(0.001)
  })

  test('names the layer whose own error moves the peak most', () => {
    const { worstLayer, worstShiftEv, layers, evaluation } = sheetFor(0.35, [12, 18, 12])
    expect(worstLayer).toBe('L2')
    const half = 0.5 * layers[1].resolved.monolayerNm!
    const at = (change: number) => {
      const moved = layers.map((layer, j) => (j === 1 ? { ...layer, widthNm: layer.widthNm + change } : layer))
      return target.evaluate([buildSystem(situation, moved)]).peak!.energyEv - evaluation.peak!.energyEv
    }
    expect(worstShiftEv).toBeCloseTo((at(-0.01 * half) - at(0.01 * half)) / 0.02, 7)
  })

  test('gives as tolerance the change that uses up the least slack, to first order', () => {
    const { rows, limits, layers } = sheetFor(0.35, [12, 18, 12])
    const tolerance = rows[1].toleranceNm!
    const used = limits.map(({ slack, gradient }) => slack - Math.abs(gradient[4]) * tolerance)
    expect(Math.min(...used)).toBeCloseTo(0, 12)
    // The stack itself is at its limit about there: the well decides the position, whose slack bends little.
    for (const times of [0.9, 1.1]) {
      const moved = [tolerance * times, -tolerance * times].map((change) =>
        layers.map((layer, j) => (j === 1 ? { ...layer, widthNm: layer.widthNm + change } : layer)),
      )
      const met = moved.map((changed) => target.verdict([buildSystem(situation, changed)]).met)
      expect(met.every((one) => one)).toBe(times < 1)
    }
  })

  test('has no tolerance for a stack that does not meet its limits, and still its shifts', () => {
    const { rows, worstLayer } = sheetFor(0.35, [10, 17, 10])
    expect(rows.map(({ toleranceNm }) => toleranceNm)).toEqual([null, null, null])
    expect(rows.every(({ shiftEv }) => shiftEv !== null)).toBe(true)
    expect(worstLayer).toBe('L2')
  })
})

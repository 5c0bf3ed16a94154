import { describe, expect, test } from 'vitest'
import type { GrownLayer } from '../../src/design/index.js'
import { wilson, yieldOf } from '../../src/growth/index.js'
import { Trials } from '../../src/growth/Trials.js'
import { compileTarget } from '../../src/target/index.js'
import type { WaveSystem } from '../../src/wave/index.js'
import { growth, layersOf, situation, spec } from '../target/coldCollector.js'

describe('wilson', () => {
  // R. G. Newcombe, Stat. Med. 17, 857 (1998), table I, method 3 (score without continuity correction), from memory.
  test.each([
    [81, 263, 0.2553, 0.3662],
    [15, 148, 0.0624, 0.1605],
    [0, 20, 0, 0.1611],
    [1, 29, 0.0061, 0.1718],
  ])('gives the published interval of %i in %i', (passed, trials, low, high) => {
    const interval = wilson(passed, trials)
    expect(interval[0]).toBeCloseTo(low, 4)
    expect(interval[1]).toBeCloseTo(high, 4)
  })

  test('ends where the score test just rejects: (p - share)² = z² p (1 - p)/n', () => {
    for (const [passed, n] of [
      [3, 17],
      [511, 2048],
      [2040, 2048],
    ]) {
      for (const p of wilson(passed, n)) {
        const z2 = (p - passed / n) ** 2 / ((p * (1 - p)) / n)
        expect(z2).toBeCloseTo(3.841458820694124, 9)
      }
    }
  })

  test('has the closed form z²/(n + z²) of no failure, and mirrors', () => {
    const z2 = 3.841458820694124
    expect(wilson(0, 50)).toEqual([0, expect.closeTo(z2 / (50 + z2), 12)])
    expect(wilson(50, 50)).toEqual([expect.closeTo(50 / (50 + z2), 12), 1])
  })
})

describe('yieldOf', () => {
  const film: GrownLayer = {
    id: 'film',
    choice: { kind: 'numbers', name: null, potentialEv: 0.3, massRel: 0.09, alphaPerEv: 0 },
    resolved: {
      kind: 'electron',
      region: { potentialEv: 0.3, massRel: 0.09, alphaPerEv: 0 },
      monolayerNm: null,
      strain: null,
    },
    count: 50,
    stepNm: 0.2,
    widthNm: 10,
  }
  const judge = (pass: (widths: Float64Array) => boolean) => ({
    meets: ([system]: readonly WaveSystem[]) => [pass(system.stack.width)],
  })
  const task = {
    layers: [film],
    situations: [situation],
    growth: { ...growth, spread: { rate: 0.03, layer: { value: 0.4, unit: 'nm' as const }, x: 0 } },
    trials: 20_000,
    seed: 'linear',
  }

  // Width errors 0.3 nm (rate) and 0.4 nm (layer) make 0.5 nm: P(abs(error) < c 0.5 nm) = erf(c/sqrt 2), tabulated.
  test.each([
    [0.5, 0.3829249],
    [1, 0.6826895],
    [2, 0.9544997],
  ])('of a limit at %d standard deviations on either side is that of the normal law', (c, expected) => {
    const { pct, lowPct, highPct, failures, passed, trials } = yieldOf({
      ...task,
      target: judge(([width]) => Math.abs(width - 10) < c * 0.5),
    })
    expect(Math.abs(pct / 100 - expected)).toBeLessThan(3 * Math.sqrt((expected * (1 - expected)) / 20_000))
    expect(lowPct).toBeLessThan(pct)
    expect(highPct).toBeGreaterThan(pct)
    expect(failures).toEqual([trials - passed])
  })

  test('counts in nm and in lattice steps alike: 2 steps of 0.2 nm are 0.4 nm', () => {
    const target = judge(([width]) => width > 10.1)
    const steps = { ...task.growth, spread: { ...task.growth.spread, layer: { value: 2, unit: 'ML' as const } } }
    expect(yieldOf({ ...task, growth: steps, target })).toEqual(yieldOf({ ...task, target }))
  })

  test('takes a width below 0 as 0', () => {
    const wide = { ...task.growth, spread: { rate: 0, layer: { value: 20, unit: 'nm' as const }, x: 0 } }
    let least = Infinity
    yieldOf({
      ...task,
      growth: wide,
      trials: 200,
      target: judge(([width]) => {
        least = Math.min(least, width)
        return true
      }),
    })
    expect(least).toBe(0)
  })

  test('lies where the margins of a real stack put it, and is the same when asked again', () => {
    const target = compileTarget(spec)
    const ask = (x: number, ml: number[]) =>
      yieldOf({ layers: layersOf(x, ml), situations: [situation], growth, target, trials: 400, seed: 'real' })
    const good = ask(0.35, [12, 18, 12])
    // Two limits of the position at 1.708 and 1.800 standard deviations, the fwhm's lower one at 1.815: between the product
    // of the three and the least of them, if growth were linear.
    expect(good.pct).toBeGreaterThan(100 * 0.9562 * 0.9641 * 0.9652 - 6)
    expect(good.pct).toBeLessThan(100 * 0.9562 + 2)
    expect(good.failures[0]).toBeGreaterThan(0)
    expect(good.failures.slice(1)).toEqual([0, 0])
    expect(ask(0.35, [12, 18, 12])).toEqual(good)
    expect(ask(0.25, [15, 16, 15]).pct).toBeLessThan(good.pct)
  })
})

describe('Trials', () => {
  const relative = (layers: readonly GrownLayer[], seed = 'common') => {
    const grown = new Trials(layers, growth, seed).next()
    return grown.map((layer, i) => (layer.widthNm - layers[i].widthNm) / layers[i].widthNm)
  }

  test('draw the same numbers for the same source and place in every stack', () => {
    const only = { ...growth, spread: { ...growth.spread, rate: 0 } }
    const errors = (layers: readonly GrownLayer[]) =>
      new Trials(layers, only, 's').next().map((layer, i) => layer.widthNm - layers[i].widthNm)
    const three = errors(layersOf(0.35, [12, 18, 12]))
    const five = errors(layersOf(0.35, [8, 9, 12, 20, 14]))
    // The substrate is at the exit: the last three layers of five stand at the same places.
    for (let i = 0; i < 3; i++) expect(five[2 + i]).toBeCloseTo(three[i], 12)
    expect(Math.abs(five[0] - five[2])).toBeGreaterThan(1e-6)
  })

  test('count places from the entry when growth starts there', () => {
    const layers = layersOf(0.35, [12, 18, 12, 9])
    const only = { ...growth, spread: { rate: 0, layer: { value: 0.1, unit: 'nm' as const }, x: 0 } }
    const errors = (startsAt: 'entry' | 'exit') =>
      new Trials(layers, { ...only, startsAt }, 's').next().map((layer, i) => layer.widthNm - layers[i].widthNm)
    const reversed = errors('exit').reverse()
    for (const [i, error] of errors('entry').entries()) expect(error).toBeCloseTo(reversed[i], 12)
  })

  test('move a well with its one cell and an alloy with its two, x included', () => {
    const layers = layersOf(0.35, [12, 18, 12])
    const spread = { rate: 0.01, layer: { value: 0, unit: 'ML' as const }, x: 0 }
    const grown = new Trials(layers, { ...growth, spread }, 'cells').next()
    const ga = grown[1].widthNm / layers[1].widthNm - 1
    const alloy = grown[0].widthNm / layers[0].widthNm
    const al = (alloy - 0.65 * (1 + ga)) / 0.35 - 1
    const { choice } = grown[0]
    expect(Math.abs(ga)).toBeGreaterThan(1e-5)
    expect(Math.abs(al - ga)).toBeGreaterThan(1e-5)
    expect(choice.kind === 'material' && choice.x).toBeCloseTo((0.35 * (1 + al)) / alloy, 12)
    expect(grown[2]).toEqual(grown[0])
    expect(grown[1].choice).toEqual(layers[1].choice)
  })

  test('share the error of x among the layers of an alloy and leave their widths', () => {
    const layers = layersOf(0.35, [12, 18, 14])
    const spread = { rate: 0, layer: { value: 0, unit: 'ML' as const }, x: 0.005 }
    const grown = new Trials(layers, { ...growth, spread }, 'x').next()
    expect(grown.map(({ widthNm }) => widthNm)).toEqual(layers.map(({ widthNm }) => widthNm))
    expect(grown[0].choice).toEqual(grown[2].choice)
    expect(grown[0].choice).not.toEqual(layers[0].choice)
  })

  test('differ between seeds', () => {
    const layers = layersOf(0.35, [12, 18, 12])
    expect(relative(layers, 'a')).not.toEqual(relative(layers, 'b'))
  })
})

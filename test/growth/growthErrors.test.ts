import { describe, expect, test } from 'vitest'
import type { GrownLayer } from '../../src/design/index.js'
import { growthErrors, limitMargin, marginOf } from '../../src/growth/index.js'
import { buildSystem, type MediumChoice, resolveMedium } from '../../src/model/index.js'
import { compileTarget } from '../../src/target/index.js'
import { growth, layersOf, situation, spec, systemsOf } from '../target/coldCollector.js'

const layers = layersOf(0.35, [12, 18, 14])

describe('growthErrors', () => {
  test('of two cells, three layers and one alloy are six', () => {
    expect(growthErrors(layers, situation, growth).map(({ name, sd }) => [name, sd])).toEqual([
      ['rate of Al-2', 0.01],
      ['rate of Ga', 0.01],
      ['layer 3', 0.5 * layers[0].resolved.monolayerNm!],
      ['layer 2', 0.5 * layers[1].resolved.monolayerNm!],
      ['layer 1', 0.5 * layers[2].resolved.monolayerNm!],
      ['x of AlGaAs 0.35', 0.005],
    ])
  })

  test('takes the cells whose rates come nearest to x', () => {
    const names = (x: number) => growthErrors(layersOf(x, [12, 18, 12]), situation, growth).map(({ name }) => name)
    // 0.233/(0.233 + 0.70) = 0.250 and 0.377/(0.377 + 0.70) = 0.350.
    expect(names(0.25)).toContain('rate of Al-1')
    expect(names(0.25)).not.toContain('rate of Al-2')
    expect(names(0.35)).toContain('rate of Al-2')
  })

  test('has one source an element when the job names none', () => {
    const names = growthErrors(layers, situation, { ...growth, sources: [] }).map(({ name }) => name)
    expect(names.slice(0, 2)).toEqual(['rate of Al', 'rate of Ga'])
  })

  test('has one source a medium for media by numbers, none of them an alloy', () => {
    const numbers = (potentialEv: number): GrownLayer => {
      const choice: MediumChoice = { kind: 'numbers', name: 'film', potentialEv, massRel: 0.09, alphaPerEv: 0 }
      return { id: 'a', choice, resolved: resolveMedium(choice, situation), count: 30, stepNm: 0.1, widthNm: 3 }
    }
    const errors = growthErrors([numbers(0.3), numbers(0), numbers(0.3)], situation, { ...growth, sources: [] })
    expect(errors.map(({ sd }) => sd)).toEqual([0.01, 0.01, 0.05, 0.05, 0.05])
    expect([...errors[0].direction]).toEqual([3, 0, 0, 0, 0, 0, 0, 0, 3, 0, 0, 0])
  })

  test('scales the shares x and 1 - x of the width and moves x by x (1 - x), both ways', () => {
    const [al, ga] = growthErrors(layers, situation, growth)
    expect(al.direction[0] + ga.direction[0]).toBeCloseTo(layers[0].widthNm, 12)
    expect(al.direction[0]).toBeCloseTo(0.35 * layers[0].widthNm, 12)
    expect([al.direction[4], ga.direction[4]]).toEqual([0, layers[1].widthNm])
    for (let k = 1; k < 4; k++) expect(al.direction[k]).toBeCloseTo(-ga.direction[k], 12)
    const step = 1e-4
    const edge = (x: number) => resolveMedium({ kind: 'material', material: 'AlGaAs', x }, situation).region.potentialEv
    expect(al.direction[1]).toBeCloseTo((0.35 * 0.65 * (edge(0.35 + step) - edge(0.35 - step))) / (2 * step), 6)
  })
})

describe('marginOf', () => {
  const target = compileTarget(spec)
  const systems = systemsOf(layers)

  test('is null without limits, 0 without slack, 99 where nothing moves a limit', () => {
    const limit = { demand: 'd', part: 'p', slack: 1, gradient: Float64Array.of(0, 2) }
    const errors = [{ name: 'e', sd: 0.1, direction: Float64Array.of(0, 1) }]
    expect(marginOf([], errors)).toBeNull()
    expect(marginOf([{ ...limit, slack: 0 }], errors)).toBe(0)
    expect(marginOf([limit], [])).toBe(99)
    expect(marginOf([limit], errors)).toBe(5)
    expect(marginOf([{ ...limit, slack: 1 / 3 }], errors)).toBe(1.66667)
    expect(marginOf([limit], [...errors, { ...errors[0], direction: Float64Array.of(9, Math.sqrt(3)) }])).toBe(2.5)
  })

  test('is the slack over the root of the summed squares of what each error alone does to it', () => {
    const limits = target.limits(systems, target.evaluate(systems))
    const errors = growthErrors(layers, situation, growth)
    const slacks = (name: string, size: number) => {
      const alike = layers.map((layer, j) => {
        const { x } = layer.choice as { x: number | null }
        const share = x === null ? { Ga: 1, 'Al-2': 0 } : { Ga: 1 - x, 'Al-2': x }
        const source = name.replace('rate of ', '') as 'Ga' | 'Al-2'
        const grown = name.startsWith('rate') ? 1 + size * share[source] : 1
        const own = name === `layer ${layers.length - j}` ? size : 0
        const moved = name.startsWith('rate')
          ? ((x ?? 0) * (source === 'Al-2' ? 1 + size : 1)) / grown
          : (x ?? 0) + (name.startsWith('x') ? size : 0)
        return {
          choice: x === null ? layer.choice : { ...layer.choice, x: moved },
          widthNm: layer.widthNm * grown + own,
        }
      })
      const at = [buildSystem(situation, alike as GrownLayer[])]
      return target.limits(at, target.evaluate(at)).map(({ slack }) => slack)
    }
    const h = 1e-4
    const variance = limits.map(() => 0)
    for (const { name, sd } of errors) {
      const up = slacks(name, h * sd)
      const down = slacks(name, -h * sd)
      for (const i of limits.keys()) variance[i] += ((up[i] - down[i]) / (2 * h)) ** 2
    }
    for (const [i, limit] of limits.entries()) {
      // Differences of the slacks keep about seven digits.
      const expected = limit.slack / Math.sqrt(variance[i])
      if (expected < 99) expect(limitMargin(limit, errors) / expected).toBeCloseTo(1, 5)
    }
  })
})

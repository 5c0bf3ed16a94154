import fc from 'fast-check'
import { expect, test } from 'vitest'
import { problemOf } from '../../src/batch/problem.js'
import { readJobText } from '../../src/job/index.js'

/** One physical stack, mirror images aside, has one id, and one assignment lists it: brute force over small jobs. */

const one = <T>(...of: readonly T[]) => fc.constantFrom(...of)
const layer = one(
  'material: AlGaAs, x: { pick: [0.2, 0.3] }, width: 2..3 ML',
  'material: AlGaAs, x: 0.3, width: 1..3 ML',
  'material: { pick: [AlAs, GaAs] }, width: 2..3 ML',
  'material: GaAs, width: 0..2 ML',
  'material: GaAs, width: 3..4 ML',
  'potential: 0.2 eV, mass: 0.09, width: 1..2 nm step 0.5 nm',
)
const layers = fc
  .tuple(layer, layer, layer, one('plain', 'like', 'period', 'free', 'between', 'mirror', 'rising', 'tied'))
  .map(([a, b, c, form]) => {
    const [x, y, z] = [`{ id: a, ${a} }`, `{ id: b, ${b} }`, `{ id: c, ${c} }`]
    switch (form) {
      case 'plain':
        return `[${x}, ${y}, ${z}]`
      case 'like':
        return `[${x}, ${y}, { like: a }, ${z}]`
      case 'period':
        return `[{ repeat: 2, period: [${x}, ${y}] }, ${z}]`
      case 'free':
        return `[{ repeat: 1..2, period: [${x}] }, ${y}, { repeat: 1..2, period: [{ like: a }] }]`
      case 'between':
        return `[{ repeat: 1..2, period: [${x}, ${y}], between: [${z}] }]`
      case 'mirror':
        return `[${x}, ${y}, ${z}]\n  mirror: true`
      case 'rising':
        return `[${x}, ${y}, ${z}]\n  rising: [a, c]`
      default:
        return `[${x}, ${y}, { id: t, ${c.replace(/width: .*$/, 'width: { like: a, times: 2 }')} }]`
    }
  })

test('ids are those of distinct stacks, and each has one listed assignment', () => {
  let looked = 0
  fc.assert(
    fc.property(layers, one('', 'growth: { compositions: 1 }', 'growth: { total: 2..4 nm }'), (stack, growth) => {
      const text = `format: 1\nname: any\nkind: electron\nstack:\n  entry: GaAs\n  exit: GaAs\n  layers: ${stack}\ntarget: { scan: 20..220 meV, demands: [{ peak: 110 meV, within: 60 meV }] }\n${growth}\n`
      let design: ReturnType<typeof problemOf>['design']
      try {
        design = problemOf(readJobText(text, 'any.yaml')).design
      } catch {
        return
      }
      const physical = new Map<string, Set<string>>()
      const listed = new Set<string>()
      for (const assignment of design.assignments()) {
        looked++
        const canonical = Int32Array.from(design.canonical(assignment))
        expect(design.feasible(canonical)).toBe(true)
        expect([...design.canonical(canonical)]).toEqual([...canonical])
        const id = design.id(canonical)
        listed.add(id)
        const parts = design
          .layers(assignment)
          .map(({ choice, widthNm }) => `${JSON.stringify({ ...choice, name: null })} ${widthNm.toFixed(6)}`)
        const key = [parts.join(), [...parts].reverse().join()].sort()[0]
        if (!physical.has(key)) physical.set(key, new Set())
        physical.get(key)!.add(id)
      }
      const twice = [...physical].filter(([, ids]) => ids.size > 1)
      expect(twice, text).toEqual([])
      expect(listed.size).toBe(physical.size)
      expect(design.stackCount()).toBe(physical.size)
    }),
    { seed: 7, numRuns: 250 },
  )
  expect(looked).toBeGreaterThan(2000)
})

import { describe, expect, test } from 'vitest'
import { problemOf } from '../../src/batch/problem.js'
import { DesignError } from '../../src/index.js'
import { readJobText } from '../../src/job/index.js'

const bound = (growth: string, widths = '2..30 ML') =>
  problemOf(
    readJobText(
      `format: 1\nname: any\nkind: electron\nstack:\n  entry: InP\n  exit: InP\n  layers:\n    - { id: a, material: AlAs, width: 2..16 ML }\n    - { id: b, material: InGaAs, x: 0.7, width: ${widths} }\n    - { like: a }\ntarget: { scan: 20..400 meV, demands: [{ peak: 150 meV, within: 60 meV }] }\ngrowth: ${growth}`,
      'any.yaml',
    ),
  )

describe('the limits of strain', () => {
  test('keep the mean of every makeable stack, and what the search finds, below theirs', () => {
    const { design } = bound('{ strain: 0.3 % }')
    const free = bound('{ compositions: 3 }').design
    const meanOf = (assignment: Int32Array) => {
      const layers = free.layers(assignment)
      const total = layers.reduce((sum, { widthNm }) => sum + widthNm, 0)
      return Math.abs(layers.reduce((sum, { widthNm, resolved }) => sum + (resolved.strain ?? 0) * widthNm, 0) / total)
    }
    const all = Array.from(free.assignments(), (a) => Int32Array.from(a))
    const kept = all.filter((a) => meanOf(a) <= 0.003)
    expect(kept.length).toBeGreaterThan(20)
    expect(Array.from(design.assignments(), (a) => a.join())).toEqual(kept.map((a) => a.join()))
    expect(design.stackCount()).toBe(kept.length)
    for (const a of all) expect(design.feasible(design.repair(a))).toBe(true)
  })

  test('keep every layer within its critical thickness', () => {
    // AlAs on InP, 3.7 % strained: the formula of Matthews and Blakeslee at the misfit 3.554 % of InP, nu = 0.299, b = 0.4003 nm, buried (kappa 4).
    const f = (5.8697 - 5.6611) / 5.8697
    const nu = 534 / (1250 + 534)
    const b = 0.56611 / Math.SQRT2
    let thickest = 1
    for (let i = 0; i < 200; i++)
      thickest = ((b * (1 - nu / 4)) / (4 * Math.PI * f * (1 + nu) * 0.5)) * (Math.log(thickest / b) + 1)
    const { design } = bound('{ critical: true }', '2..6 ML')
    const widths = Array.from(design.assignments(), (a) => design.layers(a)[0].widthNm)
    expect(Math.max(...widths)).toBeLessThan(thickest)
    expect(Math.max(...widths)).toBeGreaterThan(thickest - 0.3)
  })

  test('are an error where nothing bears them', () => {
    expect(() => bound('{ strain: 0.01 % }', '2..3 ML')).toThrow(DesignError)
  })
})

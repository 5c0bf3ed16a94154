import { describe, expect, test } from 'vitest'
import { problemOf } from '../../src/batch/problem.js'
import { readJobText } from '../../src/job/index.js'
import { planComplete, runSlice, runUnit } from '../../src/search/index.js'

/** Widths, compositions and counts tied alone: what the lattice makes of them, their slopes, and both searches against brute force. */

function bound(layers: string, rest = '', kind = 'electron') {
  const [entry, scan, demand] =
    kind === 'electron'
      ? [
          'GaAs',
          '20..220 meV',
          '{ block: 40..120 meV, below: 1e-2, points: 16 }, { pass: 150..160 meV, above: 0.5, points: 8 }',
        ]
      : ['air', '400..700 nm', '{ block: 480..560 nm, below: 0.3, points: 16 }']
  return problemOf(
    readJobText(
      `format: 1\nname: any\nkind: ${kind}\nstack:\n  entry: ${entry}\n  exit: ${entry}\n  layers:\n${layers}\n${rest}\ntarget: { scan: ${scan}, demands: [${demand}] }`,
      'any.yaml',
    ),
  )
}

const jobs = {
  'a width twice that of a later layer': bound(`
    - { id: a, material: AlGaAs, x: 0.3, width: { like: c, times: 2 } }
    - { id: b, material: GaAs, width: 12..16 ML }
    - { id: c, material: AlAs, width: 2..6 ML }`),
  'a composition that follows': bound(`
    - { id: a, material: AlGaAs, x: { pick: [0.2, 0.3, 0.4] }, width: 4..6 ML }
    - { id: b, material: GaAs, width: 12..14 ML }
    - { id: c, material: AlGaAs, x: { like: a }, width: 3..7 ML step 2 ML }`),
  'both, under a limit of one alloy, mirrored': bound(
    `
    - { id: a, material: AlGaAs, x: { pick: [0.2, 0.3] }, width: 4..6 ML }
    - { id: w, material: GaAs, width: 10..12 ML }
    - { id: m, material: AlGaAs, x: { like: a }, width: { like: a, times: 2 } }
    - { like: w }
    - { like: a }
`,
    'growth: { compositions: 1 }',
  ),
  'widths by a chain of ties inside a period': bound(`
    - { repeat: 2, period: [{ id: a, material: AlAs, width: { like: b, times: 2 } }, { id: b, material: GaAs, width: { like: c } }] }
    - { id: c, material: AlGaAs, x: 0.3, width: 2..7 ML }`),
  'a count that follows': bound(`
    - { id: front, repeat: 1..3, period: [{ id: a, material: AlAs, width: 2..3 ML }, { id: b, material: GaAs, width: 8..9 ML }] }
    - { id: c, material: AlGaAs, x: 0.3, width: 4..5 ML }
    - { repeat: { like: front }, period: [{ like: b }, { like: a }] }`),
  'films half and twice as thick': bound(
    `
    - { id: a, index: 2.2, width: 40..60 nm step 4 nm }
    - { id: b, index: 1.4, width: { like: a, times: 2 } }
    - { id: c, index: 2, width: { like: a, times: 0.5 } }
    - { id: d, index: 1.4, width: 80..100 nm step 5 nm }`,
    '',
    'light',
  ),
}

/** Every makeable stack once, in the order of the job. */
function bruteForce({ design, problem }: ReturnType<typeof bound>) {
  const scores = Array.from(design.assignments(), (a) => problem.score(Int32Array.from(a)))
  return [...new Map(scores.map((score) => [score.id, score])).values()].sort(problem.compare)
}

describe('what is tied', () => {
  test('counts monolayers of its own', () => {
    const { design } = jobs['a width twice that of a later layer']
    for (const assignment of design.assignments()) {
      const [a, , c] = design.layers(assignment)
      expect(a.count).toBe(2 * c.count)
      expect(a.widthNm).toBe(a.count * a.resolved.monolayerNm!)
    }
    expect(design.places.map(({ name }) => name)).toEqual(['b.width', 'c.width'])
  })

  test('takes composition and count from the other', () => {
    const { design } = jobs['a composition that follows']
    for (const assignment of design.assignments()) {
      const [a, , c] = design.layers(assignment)
      expect(c.choice).toEqual(a.choice)
    }
    const periods = jobs['a count that follows'].design
    const lengths = new Set(Array.from(periods.assignments(), (a) => periods.layers(a).length))
    expect([...lengths].sort((x, y) => x - y)).toEqual([5, 9, 13])
  })

  test('is so many times as thick where nothing counts', () => {
    const { design } = jobs['films half and twice as thick']
    for (const assignment of design.assignments()) {
      const [a, b, c] = design.layers(assignment)
      expect(b.widthNm).toBeCloseTo(2 * a.widthNm, 12)
      expect(c.widthNm).toBeCloseTo(0.5 * a.widthNm, 12)
    }
  })

  for (const [name, job] of Object.entries(jobs)) {
    test(`${name}: the count, both searches and brute force agree`, () => {
      const { problem, design } = job
      const all = bruteForce(job)
      expect(design.stackCount()).toBe(all.length)
      const plan = planComplete(problem)
      if ('refused' in plan) throw new Error(plan.refused)
      const found = Array.from({ length: plan.slices }, (_, slice) => runSlice(problem, plan, slice, null).found).flat()
      const best = found.map(({ score }) => score).sort(problem.compare)
      expect(best.slice(0, 30).map(({ id }) => id)).toEqual(all.slice(0, 30).map(({ id }) => id))
      const starts = Array.from({ length: 4 }, (_, unit) => runUnit(problem, unit, 'ties').found[0].score)
      expect(starts.some(({ merit }) => merit <= all[0].merit * (1 + 1e-9))).toBe(true)
      for (const assignment of design.assignments()) {
        const canonical = Int32Array.from(design.canonical(assignment))
        expect(design.feasible(canonical)).toBe(true)
        expect([...design.canonical(canonical)]).toEqual([...canonical])
      }
    })

    test(`${name}: the fit has the slopes of its residuals`, () => {
      const { problem, design } = job
      const middle = design.repair(Int32Array.from(design.places, ({ choices }) => choices >> 1))
      const relaxed = problem.relax(middle)
      const n = relaxed.start.length
      const residuals = (values: Float64Array, jacobian = new Float64Array(relaxed.residuals * n)) => {
        const out = new Float64Array(relaxed.residuals)
        relaxed.evaluate(values, out, jacobian)
        return out
      }
      const jacobian = new Float64Array(relaxed.residuals * n)
      residuals(relaxed.start, jacobian)
      for (let v = 0; v < n; v++) {
        const at = (by: number) => residuals(relaxed.start.map((value, i) => (i === v ? value + by : value)))
        const [a, b, c, d] = [-2e-4, -1e-4, 1e-4, 2e-4].map(at)
        for (let i = 0; i < a.length; i++) {
          const slope = (a[i] - 8 * b[i] + 8 * c[i] - d[i]) / 12e-4
          expect(Math.abs(jacobian[i * n + v] - slope)).toBeLessThan(1e-6 * (1 + Math.abs(slope)))
        }
      }
      expect([...relaxed.snap(relaxed.start)]).toEqual([...middle])
    })
  }
})

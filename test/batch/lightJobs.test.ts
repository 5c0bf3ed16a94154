import { describe, expect, test } from 'vitest'
import { problemOf } from '../../src/batch/problem.js'
import { type Job, readJobText } from '../../src/job/index.js'
import { hcEvNm } from '../../src/media/index.js'
import { spectrum, stackOf } from '../../src/model/index.js'
import { firstRound, planComplete, runSlice, runUnit, startBoundOf } from '../../src/search/index.js'

/** Whole jobs of light against closed forms, the library and brute force. */

function lightJob(parts: {
  readonly head?: string
  readonly stack: string
  readonly scan: string
  readonly demands: string
  readonly rest?: string
}): Job {
  const { head = '', stack, scan, demands, rest = '' } = parts
  return readJobText(
    `format: 1\nname: any\nkind: light\n${head}\nstack:\n${stack}\ntarget:\n  scan: ${scan}\n  demands:\n${demands}\n${rest}`,
    'any.yaml',
  )
}

function bestOf(job: Job, units: number) {
  const bound = problemOf(job)
  const found = Array.from({ length: units }, (_, unit) => runUnit(bound.problem, unit, 'light').found[0])
  const best = found.reduce((a, b) => (bound.problem.compare(b.score, a.score) < 0 ? b : a))
  return { bound, assignment: Int32Array.from(best.assignment), score: best.score }
}

describe('light between two prisms', () => {
  // With equal polarisation factors (s) the photon's double barrier is the electron's: kw = theta mod pi, with
  // tan theta = 2 k kappa cosh(kappa b)/((k² - kappa²) sinh(kappa b)) (a semiconductor device textbook, equations 10.3.3 to 10.3.5).
  const job = lightJob({
    head: 'conditions: { s: { angle: 45 deg, polarisation: s } }',
    stack:
      '  entry: { index: 2.29 }\n  layers: [{ id: gap, index: 1.38, width: 300..500 nm step 20 nm }, { index: 2.29, width: 380..480 nm step 2 nm }, { like: gap }]\n  exit: { index: 2.29 }\n  reference: 1064 nm',
    scan: '900..1250 nm',
    demands: '    - { peak: 1064 nm, within: 2 nm, height: 0.9 }',
  })

  test('the peak that a job finds lies where the closed form has it, to 1e-9', () => {
    const { bound, assignment, score } = bestOf(job, 1)
    expect(score.met).toBe(true)
    const { peak } = bound.target.evaluate(bound.design.systems(assignment))
    const [{ widthNm: b }, { widthNm: w }] = bound.design.layers(assignment)
    const k0 = (2 * Math.PI * peak!.energyEv) / hcEvNm
    const along2 = 2.29 ** 2 / 2
    const k = k0 * Math.sqrt(2.29 ** 2 - along2)
    const kappa = k0 * Math.sqrt(along2 - 1.38 ** 2)
    const theta = Math.atan2(2 * k * kappa * Math.cosh(kappa * b), (k * k - kappa * kappa) * Math.sinh(kappa * b))
    expect(Math.abs(Math.sin(k * w - theta))).toBeLessThan(1e-9)
    expect(peak!.T).toBeCloseTo(1, 9)
    expect(Math.abs(hcEvNm / peak!.energyEv - 1064)).toBeLessThan(2)
  })

  test('a width in nm is the distance between the half points of the spectrum', () => {
    const { bound, assignment } = bestOf(job, 1)
    const { peak } = bound.target.evaluate(bound.design.systems(assignment))
    const rows = bound.design.layers(assignment).map(({ id, choice, widthNm }) => ({
      ...{ where: '', id, medium: choice, ml: null, widthNm },
    }))
    const ends = [peak!.lowEv, peak!.highEv].map((ev) => hcEvNm / ev)
    const { T } = spectrum(stackOf(job, rows as never), ends)
    for (const half of T) expect(Math.abs(half - peak!.T / 2)).toBeLessThan(1e-9)
  })
})

describe('induced transmission', () => {
  // Ag 0.06 + 3.586i, 50 nm, 548.6 nm: T/(1 - R) is at most 0.897386531782 whatever stands around it (Berning and Turner 1957; the
  // number computed from the closed form).
  const bound = 0.897386531782
  const job = lightJob({
    stack: `  entry: { index: 1 }
  layers:
    - { repeat: 2, period: [{ id: H, index: 2.2, width: 40..80 nm }, { id: L, index: 1.38, width: 70..130 nm }] }
    - { id: front, index: 2.2, width: 20..60 nm }
    - { index: 0.06, extinction: 3.586, width: 50 nm }
    - { id: rear, index: 2.2, width: 20..60 nm }
    - { repeat: 2, period: [{ id: L2, index: 1.38, width: 70..130 nm }, { id: H2, index: 2.2, width: 40..80 nm }] }
  exit: { index: 1.52 }
  reference: 548.6 nm`,
    scan: '540..558 nm',
    demands: '    - { pass: 548.5..548.7 nm, above: 0.99, points: 2 }',
  })

  test('comes near its bound, and never beyond', () => {
    const { bound: bind, assignment } = bestOf(job, 3)
    const rows = (a: Int32Array) =>
      bind.design.layers(a).map(({ id, choice, widthNm }) => ({ where: '', id, medium: choice, ml: null, widthNm }))
    const at = (a: Int32Array) => spectrum(stackOf(job, rows(a) as never), [548.6])
    const best = at(assignment)
    expect(best.T[0]).toBeGreaterThan(0.85)
    const places = bind.design.places
    for (let i = 0; i < 200; i++) {
      const any = bind.design.repair(
        Int32Array.from(places, ({ choices }, p) => (i * 7919 + p * 104729 + i * i * 31) % choices),
      )
      const { T, R } = at(any)
      expect(T[0] / (1 - R[0])).toBeLessThan(bound + 1e-9)
    }
    expect(best.T[0] / (1 - best.R[0])).toBeLessThan(bound + 1e-9)
  })
})

describe('a complete search of light finds what brute force finds', () => {
  const layers = (k: string) =>
    `  layers: [{ id: a, index: 2.2, width: 40..80 nm step 8 nm }, { id: b, index: 1.4${k}, width: 60..120 nm step 12 nm }, { id: c, index: 2, width: 0..50 nm step 10 nm }]`
  const jobs: Record<string, Job> = {
    'of s, by halves': lightJob({
      stack: `  entry: { index: 1 }\n${layers('')}\n  exit: { index: 1.52 }\n  reference: 550 nm`,
      scan: '400..700 nm',
      demands: '    - { pass: 500..600 nm, above: 0.99 }\n    - { block: 400..450 nm, below: 0.8 }',
    }),
    'of the mean, T and R': lightJob({
      head: 'conditions: { low: { angle: 0 deg }, high: { angle: 40 deg, polarisation: mean } }',
      stack: `  entry: { index: 1 }\n${layers('')}\n  exit: { index: 1.52 }\n  reference: 550 nm`,
      scan: '400..700 nm',
      demands:
        '    - { block: 500..600 nm, below: 0.01, quantity: R, at: high }\n    - { pass: 520..560 nm, above: 0.9, points: 8 }',
    }),
    'of an absorbing coating on a plate': lightJob({
      stack: `  entry: { index: 1 }\n${layers(', extinction: 0.01')}\n  exit: { index: 1.52 }\n  reference: 550 nm\n  back: { thickness: 1 mm, then: { index: 1 } }`,
      scan: '400..700 nm',
      demands:
        '    - { pass: 450..650 nm, above: 0.95, points: 16 }\n    - { block: 450..650 nm, below: 0.02, quantity: A, points: 16 }',
    }),
  }
  for (const [name, job] of Object.entries(jobs)) {
    test(name, () => {
      const { design, problem } = problemOf(job)
      const all = Array.from(design.assignments(), (a) => problem.score(Int32Array.from(a)))
      const distinct = [...new Map(all.map((score) => [score.id, score])).values()].sort(problem.compare)
      const plan = planComplete(problem)
      if ('refused' in plan) throw new Error(plan.refused)
      expect(plan.stacks).toBe(distinct.length)
      const start = startBoundOf(firstRound(problem, plan, 'seed'))
      const found = Array.from(
        { length: plan.slices },
        (_, slice) => runSlice(problem, plan, slice, start).found,
      ).flat()
      const best = found.map(({ score }) => score).sort(problem.compare)
      expect(best.slice(0, 100).map(({ id, merit }) => [id, merit])).toEqual(
        distinct.slice(0, 100).map(({ id, merit }) => [id, merit]),
      )
    })
  }
})

describe('the extremes of a share', () => {
  test('hold every value of 20 001 wavelengths between them', () => {
    const job = lightJob({
      head: 'conditions: { one: { angle: 50 deg, polarisation: mean } }',
      stack:
        '  entry: { index: 1 }\n  layers:\n    - { repeat: 8, alike: false, period: [{ index: 2.3, width: 20..300 nm }, { index: 1.4, width: 20..400 nm }] }\n  exit: { index: 1.52 }\n  reference: 600 nm\n  back: { thickness: 2 mm, then: { index: 1 } }',
      scan: '420..900 nm',
      demands: [
        '    - { block: 450..800 nm, below: 1e-3, points: 2 }',
        '    - { pass: 450..800 nm, above: 0.99, points: 2 }',
        '    - { block: 450..800 nm, below: 1e-3, points: 2, quantity: R }',
        '    - { pass: 450..800 nm, above: 0.99, points: 2, quantity: R }',
      ].join('\n'),
    })
    const { design, target } = problemOf(job)
    const grid = Array.from({ length: 20_001 }, (_, i) => 450 + (350 * i) / 20_000)
    for (let i = 0; i < 6; i++) {
      const a = design.repair(
        Int32Array.from(design.places, ({ choices }, p) => (i * 7919 + p * 1299709 + p * i * 331) % choices),
      )
      const rows = design
        .layers(a)
        .map(({ id, choice, widthNm }) => ({ where: '', id, medium: choice, ml: null, widthNm }))
      const [situation] = design.situations
      expect(situation.kind).toBe('light')
      // The library has one polarisation at a time.
      const each = (['s', 'p'] as const).map((polarisation) => {
        const conditions = [{ ...job.conditions[0], polarisation }]
        return spectrum(stackOf({ ...job, conditions }, rows as never), grid)
      })
      const mean = (key: 'T' | 'R') => each[0][key].map((value, n) => (value + each[1][key][n]) / 2)
      const evaluation = target.evaluate(design.systems(a))
      const extremes = evaluation.demands.map(({ reached }) => reached!)
      const expected = [Math.max(...mean('T')), Math.min(...mean('T')), Math.max(...mean('R')), Math.min(...mean('R'))]
      expected.forEach((value, d) => {
        const off = (extremes[d] - value) * (d % 2 === 0 ? 1 : -1)
        expect(off).toBeGreaterThan(-1e-9)
        expect(off).toBeLessThan(1e-4)
      })
    }
  })
})

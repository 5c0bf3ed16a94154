import { describe, expect, test } from 'vitest'
import { problemOf } from '../../src/batch/problem.js'
import { readJobText } from '../../src/job/index.js'
import { Response } from '../../src/model/index.js'

const job = readJobText(
  `format: 1
name: any
kind: light
stack:
  entry: air
  layers:
    - repeat: 5
      alike: false
      period: [{ id: H, index: 2.3, width: 0..300 nm step 0.5 nm }, { id: L, index: 1.38, width: 0..300 nm step 0.5 nm }]
  exit: { index: 1.52 }
  reference: 550 nm
target:
  scan: 400..800 nm
  demands:
    - { block: 450..650 nm, below: 0.002, quantity: R, points: 40 }
    - { pass: 700..780 nm, above: 0.97, points: 20 }
growth: { thinnest: 4 nm }`,
  'any.yaml',
)
const { design, target, problem } = problemOf(job)

/** Counts of half nanometres. */
const stack = (...counts: number[]) => Int32Array.from([...counts, ...new Array(10 - counts.length).fill(0)])
const here = stack(40, 90, 120, 0, 0, 50, 60, 20)

describe('needles', () => {
  const needles = design.needles(here)!

  test('of no width leave the stack as it is', () => {
    const energies = Float64Array.from({ length: 30 }, (_, i) => 1.6 + 0.05 * i)
    const R = (system: (typeof needles.systems)[number]) => new Response(energies).at(system).R.slice()
    const [with_, without] = [R(needles.systems[0]), R(design.systems(here)[0])]
    with_.forEach((value, e) => {
      expect(Math.abs(value - without[e])).toBeLessThan(1e-12)
    })
  })

  test('are makeable, two layers more or one less, and move nothing else', () => {
    expect(needles.inserted.length).toBeGreaterThan(20)
    const total = design.totalNm(here)
    for (const other of needles.inserted) {
      expect(design.feasible(other)).toBe(true)
      expect(design.totalNm(other)).toBeCloseTo(total + 4, 9)
    }
    const longer = needles.inserted.filter((other) => design.layers(other).length === design.layers(here).length + 2)
    expect(longer.length).toBe(needles.inserted.length)
    expect(needles.removed).toHaveLength(4)
    for (const other of needles.removed) expect(design.totalNm(other)).toBeLessThan(total)
  })

  test('have the slopes that a hundredth of a nanometre shows', () => {
    const size = needles.inserted.length
    const squares = (systems: typeof needles.systems, jacobian: Float64Array) => {
      const residuals = new Float64Array(target.fitSize)
      target.fit(systems, needles.directions, size, residuals, jacobian)
      return residuals
    }
    const jacobian = new Float64Array(target.fitSize * size)
    const residuals = squares(needles.systems, jacobian)
    const stride = 1 + needles.systems[0].media.parameters
    const rows = needles.systems[0].stack.medium.length
    for (let v = 0; v < size; v += 7) {
      const row = needles.directions[0].subarray(v * rows * stride, (v + 1) * rows * stride).indexOf(1) / stride
      const [{ stack: waves, ...rest }] = needles.systems
      const width = waves.width.slice()
      expect(width[row]).toBe(0)
      width[row] = 0.01
      const thicker = squares([{ ...rest, stack: { ...waves, width } }], new Float64Array(jacobian.length))
      const sum = (of: Float64Array) => of.reduce((total, r) => total + r * r, 0)
      const slope = 2 * residuals.reduce((total, r, i) => total + r * jacobian[i * size + v], 0)
      expect(Math.abs((sum(thicker) - sum(residuals)) / 0.01 - slope)).toBeLessThan(2e-3 * Math.abs(slope) + 1e-4)
    }
  })

  test('are offered in the order of their slopes, the two best first, then what may be left out', () => {
    const offered = problem.restructured!(here)
    expect(offered.length).toBeGreaterThan(6)
    expect(offered.slice(2, 6)).toEqual(needles.removed)
  })

  test('have no place where every layer is needed', () => {
    expect(design.needles(stack(40, 90, 120, 70, 80, 50, 60, 20, 30, 40))!.inserted).toHaveLength(0)
    const fixed = readJobText(job.text.replaceAll('width: 0..300', 'width: 20..300'), 'any.yaml')
    expect(problemOf(fixed).design.needles(new Int32Array(10))).toBeNull()
  })
})

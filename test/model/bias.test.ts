import { describe, expect, test } from 'vitest'
import { designOf } from '../../src/design/index.js'
import { parseLayers, readJobText } from '../../src/job/index.js'
import { hbar2Over2m0 } from '../../src/media/index.js'
import {
  buildSystem,
  type MediumChoice,
  type ModelLayer,
  type Situation,
  spectrum,
  stackOf,
} from '../../src/model/index.js'
import { parameterGradient, spectrumInto, type WaveSystem } from '../../src/wave/index.js'

const numbers = (potentialEv: number, massRel: number, alphaPerEv = 0): MediumChoice => ({
  ...{ kind: 'numbers', name: null, potentialEv, massRel, alphaPerEv },
})
const lead = numbers(0, 0.067)
const situation = (biasV: number): Situation => ({
  ...{ temperatureK: 300, substrateNm: null, massModel: 'parabolic', entry: lead, exit: lead, inPlaneKPerNm: 0, biasV },
})
const layer = (choice: MediumChoice, widthNm: number, slices: number, biased = true): ModelLayer => ({
  ...{ choice, widthNm, slices, biased },
})

function transmission({ media, stack }: WaveSystem, energy: number): number {
  const table = { count: media.count, points: 1, q: new Float64Array(media.count), mu: new Float64Array(media.count) }
  media.fill(Float64Array.of(energy), table)
  const T = new Float64Array(1)
  spectrumInto(table, stack, { T, R: new Float64Array(1) })
  return T[0]
}

/** T of a potential V(z) over 0..length between flat leads, one mass throughout, by Runge and Kutta's fourth order from exit to entry. */
function integrated(V: (z: number) => number, length: number, exitEv: number, mass: number, energy: number): number {
  const q = (z: number) => (mass / hbar2Over2m0) * (energy - V(z))
  const kExit = Math.sqrt((mass / hbar2Over2m0) * (energy - exitEv))
  const kEntry = Math.sqrt((mass / hbar2Over2m0) * energy)
  const steps = 40_000
  const h = -length / steps
  // Real and imaginary parts of psi and psi'.
  let y = [1, 0, 0, kExit]
  const slope = (z: number, [a, b, c, d]: number[]) => [c, d, -q(z) * a, -q(z) * b]
  const plus = (u: number[], v: number[], f: number) => u.map((one, i) => one + f * v[i])
  for (let n = 0; n < steps; n++) {
    const z = length + n * h
    const k1 = slope(z, y)
    const k2 = slope(z + h / 2, plus(y, k1, h / 2))
    const k3 = slope(z + h / 2, plus(y, k2, h / 2))
    const k4 = slope(z + h, plus(y, k3, h))
    y = y.map((one, i) => one + (h / 6) * (k1[i] + 2 * k2[i] + 2 * k3[i] + k4[i]))
  }
  const [a, b, c, d] = y
  // 2 A = psi + psi'/(i k).
  const re = (a + d / kEntry) / 2
  const im = (b - c / kEntry) / 2
  return kExit / kEntry / (re * re + im * im)
}

describe('a bias', () => {
  test('converges to the tilted potential with the square of the number of slices', () => {
    const barrier = numbers(0.3, 0.067)
    for (const [energy, biasV] of [
      [0.1, 0.15],
      [0.28, 0.2],
      [0.4, -0.1],
    ]) {
      const truth = integrated((z) => 0.3 - (biasV * z) / 6, 6, -biasV, 0.067, energy)
      const error = (slices: number) =>
        Math.abs(transmission(buildSystem(situation(biasV), [layer(barrier, 6, slices)]), energy) / truth - 1)
      expect(error(12)).toBeLessThan(5e-3)
      expect(error(24) / error(12)).toBeCloseTo(0.25, 1)
      expect(error(768)).toBeLessThan(1e-5)
    }
  })

  // Exact by Airy functions in 30 digits, and what a staircase of the middles is off with 10, 100 and 400 slices: a reference computed apart.
  test.each([
    [0.5, 0.2, 5, 0.1, 0.00232861082928224, [8.4e-4, 8.5e-6, 5.3e-7]],
    [0.5, 0.2, 5, 0.3, 0.0370062941146429, [1.0e-3, 1.0e-5, 6.2e-7]],
    [0.5, 0.2, 5, 0.45, 0.298543086365271, [9.9e-4, 9.8e-6, 6.1e-7]],
    [0.7, 0.33, 6, 0.1, 8.2302926698542e-5, [1.6e-3, 1.6e-5, 1.0e-6]],
    [0.7, 0.33, 6, 0.3, 0.0015079281240054, [1.9e-3, 1.9e-5, 1.2e-6]],
    [0.7, 0.33, 6, 0.45, 0.0161231342998178, [2.4e-3, 2.4e-5, 1.5e-6]],
  ])(
    'over a barrier of %d eV, %d V and %d nm has the error of a staircase at %d eV',
    (V, biasV, nm, energy, exact, errors) => {
      ;[10, 100, 400].forEach((slices, i) => {
        const T = transmission(buildSystem(situation(biasV), [layer(numbers(V, 0.067), nm, slices)]), energy)
        // The errors are given to two digits.
        expect(Math.abs(T / exact - 1) / errors[i]).toBeCloseTo(1, 1)
      })
    },
  )

  test('falls over the layers that it is said to fall over, and not in the others', () => {
    const wide = numbers(0, 0.067)
    const layers = [layer(wide, 3, 2, false), layer(numbers(0.3, 0.067), 4, 400), layer(wide, 5, 2, false)]
    const truth = integrated((z) => (z < 3 ? 0 : z < 7 ? 0.3 - 0.05 * (z - 3) : -0.2), 12, -0.2, 0.067, 0.1)
    expect(transmission(buildSystem(situation(0.2), layers), 0.1) / truth - 1).toBeCloseTo(0, 4)
  })

  test('of zero cuts nothing', () => {
    const { stack, rowMap } = buildSystem(situation(0), [layer(numbers(0.3, 0.067), 6, 12)])
    expect(stack.medium).toHaveLength(1)
    expect(rowMap).toBeUndefined()
  })
})

describe('slopes under a bias', () => {
  const start = [3.1, 0.3, 0.09, 0.5, 5.2, 0.01, 0.067, 0.6, 2.7, 0.28, 0.085, 0.4, 1.4, 0.02, 0.07, 0.3]
  const systemOf = (p: readonly number[], over: readonly boolean[]) =>
    buildSystem(
      situation(0.12),
      [0, 4, 8, 12].map((j, i) => layer(numbers(p[j + 1], p[j + 2], p[j + 3]), p[j], 4 + i, over[i])),
    )

  test.each([[[true, true, true, true]], [[false, true, true, false]], [[false, false, true, true]]])(
    'are those of T by each layer, its slices and potentials moved along (%s)',
    (over) => {
      const gradient = new Float64Array(16)
      parameterGradient(systemOf(start, over), Float64Array.of(0.07), { T: new Float64Array(1), gradient })
      const scale = Math.max(...gradient.map(Math.abs))
      start.forEach((value, k) => {
        const h = 1e-4 * Math.max(value, 0.01)
        const T = (by: number) =>
          transmission(
            systemOf(
              start.map((one, i) => (i === k ? one + by : one)),
              over,
            ),
            0.07,
          )
        const slope = (8 * (T(h) - T(-h)) - (T(2 * h) - T(-2 * h))) / (12 * h)
        expect(Math.abs(gradient[k] - slope) / scale, `parameter ${k}`).toBeLessThan(1e-9)
      })
    },
  )
})

describe('a job under bias', () => {
  const text = (rest: string) => `format: 1
name: any
kind: electron
temperature: 77 K
stack:
  entry: GaAs
  layers:
    - { id: spacer, material: GaAs, width: 4..10 ML }
    - { id: outer, material: AlGaAs, x: 0.3, width: 6..20 ML }
    - { id: well, material: GaAs, width: 10..30 ML }
    - { like: outer }
  exit: GaAs
target: { scan: 5..200 meV, demands: [{ peak: 80 meV, within: 5 meV, at: on }] }
conditions: { rest: { bias: 0 mV }, on: { bias: 120 mV } }
${rest}`

  test('cuts each layer by the widest that it may be, and the library cuts the same layers the same', () => {
    const job = readJobText(text('bias over: [outer, outer]\n'.replace('[outer, outer]', '[outer, well]')), 'any.yaml')
    const design = designOf(job)
    const assignment = Int32Array.from(design.places, ({ choices }) => choices >> 1)
    const layers = design.layers(assignment)
    // 10, 20, 30, 20 monolayers of 0.283 nm by 0.5 nm.
    expect(layers.map(({ slices }) => slices)).toEqual([6, 12, 17, 12])
    expect(layers.map(({ biased }) => biased)).toEqual([false, true, true, false])
    const csv = [
      'id,material,x,ml',
      ...layers.map(({ id, choice, count }) => {
        const { material, x } = choice as Extract<typeof choice, { kind: 'material' }>
        return `${id},${material},${x ?? ''},${count}`
      }),
    ].join('\n')
    const rows = parseLayers(csv, 'layers.csv')
    const energies = [0.01, 0.05, 0.081, 0.19]
    design.systems(assignment).forEach((system, i) => {
      const { T } = spectrum(stackOf(job, rows, job.conditions[i].name), energies)
      expect([...T]).toEqual(energies.map((energy) => transmission(system, energy)))
    })
    expect(stackOf(job, rows, 'on').layers).toHaveLength(47)
    expect(stackOf(job, rows).layers).toHaveLength(4)
  })
})

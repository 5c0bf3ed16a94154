import { Decimal } from 'decimal.js'
import { describe, expect, it } from 'vitest'
import { AngleIndex, isNoisy } from '../../../src/search/complete/AngleIndex.js'
import { forcedTransmission } from '../../../src/search/complete/forcedTransmission.js'
import { type VectorTable, vectorTable, writeChoices } from '../../../src/search/complete/HalfVectors.js'
import { filledTable } from '../../../src/search/complete/HalvesSearch.js'
import { bucketOf, pointTables } from '../../../src/search/complete/PointTables.js'
import { samplePairs } from '../../../src/search/complete/samplePairs.js'
import { splitChain } from '../../../src/search/complete/splitChain.js'
import { discriminating } from '../../../src/search/discriminating.js'
import {
  type CompletePlan,
  firstRound,
  planComplete,
  runSlice,
  type SearchChain,
  startBoundOf,
} from '../../../src/search/index.js'
import { mediaTable, type WaveSystem } from '../../../src/wave/index.js'
import { transmissionAt } from '../../../src/wave/transmissionAt.js'
import { decimalT } from '../../wave/decimalWave.js'
import { boundJob, bySlices, seeded, structures, targets } from './jobs.js'

/** Barriers up to 30 nm, through which nothing passes but by resonance. */
const opaque = `  entry: { potential: 0 eV, mass: 0.043 }
  layers:
    - { potential: 1.2 eV, mass: 0.15, width: 0..30 nm step 1.5 nm }
    - { potential: -10..10 meV step 10 meV, mass: 0.043, width: 2..9 nm step 0.5 nm }
    - { potential: 1.2 eV, mass: 0.15, width: 1..30 nm step 2.9 nm }
    - { potential: 0 eV, mass: 0.043, width: 2..9 nm step 0.5 nm }
    - { potential: 1.2 eV, mass: 0.15, width: 1..30 nm step 2.9 nm }
  exit: { potential: -100 meV, mass: 0.05 }`

const Digits = Decimal.clone({ precision: 60 })
const pairs = 40

/** Of a system whose numbers are taken as they stand, as exact decimals. */
function exactT({ media, stack }: WaveSystem, energyEv: number): Decimal {
  const { q, mu } = mediaTable(media, 1)
  media.fill(Float64Array.of(energyEv), { count: media.count, points: 1, q, mu })
  // Just above a band edge rather than on it, where there is no wave to divide by.
  const medium = (i: number) => ({ q: new Digits(q[i] === 0 ? 1e-40 : q[i]), mu: new Digits(mu[i]) })
  const layers = Array.from(stack.medium, (i, j) => ({ ...medium(i), w: new Digits(stack.width[j]) }))
  return decimalT(medium(stack.entry), layers, medium(stack.exit), Digits)
}

describe('halves', () => {
  const cases = { ...structures, opaque: () => opaque }
  it.each(Object.entries(cases))('of %s enclose T, as the spectrum has it', (_, stack) => {
    const { problem, design } = boundJob({ stack: stack(seeded(3)), demands: targets['a pass and blocks'](seeded(1)) })
    const chain = problem.chain() as SearchChain
    const split = splitChain(chain, problem.places)!
    const matrices = chain.matrices(chain.points)
    let compared = 0
    let sharp = 0
    for (const { sliced, held, common } of samplePairs(chain, split, problem.places, 24)) {
      const choice = new Int32Array(problem.places.length)
      writeChoices(common, split.common, problem.places, choice)
      chain.points.forEach((point, p) => {
        const [A, B] = [filledTable(sliced, matrices, p), filledTable(held, matrices, p)]
        for (let n = 0; n < 16; n++) {
          const [a, b] = [(7 * n) % sliced.count, (5 * n) % held.count]
          writeChoices(sliced.numbers[a], split.sliced.places, problem.places, choice)
          writeChoices(held.numbers[b], split.held.places, problem.places, choice)
          const T = transmissionAt(design.systems(choice)[point.condition], Float64Array.of(point.at))[0]
          const rest = A.d[a] * B.d[b] + A.e[a] * B.e[b]
          const [low, high] = [A.low[a] * B.low[b] + rest, A.high[a] * B.high[b] + rest]
          expect(2 / (1 + high)).toBeLessThanOrEqual(T * (1 + 1e-9))
          // Noise may leave nothing known.
          if (low > -1) expect(2 / (1 + low)).toBeGreaterThanOrEqual(T * (1 - 1e-9))
          compared++
          if (low > 0 && high / low - 1 < 1e-9) sharp++
        }
      })
    }
    expect(compared).toBeGreaterThan(500)
    expect(sharp / compared).toBeGreaterThan(0.9)
  })

  it.each(Object.entries(cases))('of %s enclose T in 60 digits, without any margin', (_, stack) => {
    const { problem, design } = boundJob({ stack: stack(seeded(4)), demands: targets['a pass and blocks'](seeded(2)) })
    const chain = problem.chain() as SearchChain
    const split = splitChain(chain, problem.places)!
    const matrices = chain.matrices(chain.points)
    const random = seeded(8)
    const choice = new Int32Array(problem.places.length)
    const [{ sliced, held, common }] = samplePairs(chain, split, problem.places, 64)
    writeChoices(common, split.common, problem.places, choice)
    let sharp = 0
    for (let n = 0; n < pairs; n++) {
      const p = Math.floor(random() * chain.points.length)
      const [a, b] = [Math.floor(random() * sliced.count), Math.floor(random() * held.count)]
      const [A, B] = [filledTable(sliced, matrices, p), filledTable(held, matrices, p)]
      writeChoices(sliced.numbers[a], split.sliced.places, problem.places, choice)
      writeChoices(held.numbers[b], split.held.places, problem.places, choice)
      const { condition, at } = chain.points[p]
      const exact = exactT(design.systems(choice)[condition], at)
      const rest = A.d[a] * B.d[b] + A.e[a] * B.e[b]
      const [low, high] = [A.low[a] * B.low[b] + rest, A.high[a] * B.high[b] + rest]
      const cosh = new Digits(2).div(exact).minus(1)
      expect(cosh.lte(high), `${cosh} is above ${high}`).toBe(true)
      expect(cosh.gte(low), `${cosh} is below ${low}`).toBe(true)
      if (low > 0 && high / low - 1 < 1e-9) sharp++
    }
    expect(sharp / pairs).toBeGreaterThan(0.8)
  })
})

describe('a range search', () => {
  it('finds every point within reach, near and far out, and few others', () => {
    const r = seeded(5)
    // Distances from the origin up to 20: sizes up to 1e8.
    const points = (count: number): VectorTable => {
      const table = vectorTable(count)
      for (let i = 0; i < count; i++) {
        const size = 1 + 10 ** (8 * r()) * r()
        const angle = i % 3 === 0 ? 0.001 * r() : 2 * Math.PI * r()
        const sinh = Math.sqrt((size - 1) * (size + 1))
        table.low[i] = size * (1 - 1e-15)
        table.high[i] = i % 50 === 7 ? size * 1.01 : size * (1 + 1e-15)
        table.d[i] = sinh * Math.cos(angle)
        table.e[i] = sinh * Math.sin(angle)
      }
      return table
    }
    const [held, others] = [points(3000), points(400)]
    // Of the other side, turned by half a turn, some of them partners of a held point.
    for (let i = 0; i < 400; i += 2) {
      others.low[i] = held.low[7 * i]
      others.high[i] = held.low[7 * i] * (1 + 2e-15)
      others.d[i] = -held.d[7 * i] * (1 + 1e-9 * r())
      others.e[i] = -held.e[7 * i] * (1 + 1e-9 * r())
    }
    const index = new AngleIndex(held, 3000)
    const coshOf = (a: number, b: number) =>
      others.low[a] * held.low[b] + others.d[a] * held.d[b] + others.e[a] * held.e[b]
    let within = 0
    let looked = 0
    for (const cosh of [1.5, 12, 1e4]) {
      for (let a = 0; a < 400; a++) {
        if (isNoisy(others, a)) continue
        const found = new Set(index.noisy)
        const used = index.search(others.low[a], others.d[a], others.e[a], cosh)
        for (let s = 0; s < used; s += 2)
          for (let i = index.stretches[s]; i < index.stretches[s + 1]; i++) found.add(index.order[i])
        looked += found.size
        for (let b = 0; b < 3000; b++) {
          if (!(coshOf(a, b) <= cosh)) continue
          within++
          expect(found.has(b)).toBe(true)
        }
      }
    }
    expect(within).toBeGreaterThan(5000)
    expect(looked).toBeLessThan(4 * within + 200_000)
    expect(index.noisy.length).toBe(60)
  })
})

describe('point tables', () => {
  const { problem } = boundJob({
    stack: structures['three layers'](seeded(1)),
    demands: targets['a pass and blocks'](seeded(1)),
  })
  it('are lower bounds of what a point adds, and close to it', () => {
    const { points } = problem.chain()!
    const r = seeded(2)
    let close = 0
    let any = 0
    for (const point of points) {
      const tables = pointTables(point)
      for (let n = 0; n < 200; n++) {
        const T = 10 ** (-8 * r() * r())
        const bucket = bucketOf(2 / T - 1)
        const bound = (tables.tooLow?.[bucket] ?? 0) + (tables.tooHigh?.[bucket] ?? 0)
        const extreme = (tables.lowExtreme?.[bucket] ?? 0) + (tables.highExtreme?.[bucket] ?? 0)
        expect(bound).toBeLessThanOrEqual(point.square(T))
        expect(extreme).toBeLessThanOrEqual(point.extreme(T))
        if (point.square(T) > 1e-3) any++
        if (point.square(T) > 1e-3 && bound > 0.9 * point.square(T)) close++
      }
    }
    expect(any).toBeGreaterThan(500)
    expect(close / any).toBeGreaterThan(0.8)
  })
})

describe('forcedTransmission', () => {
  const line = (goal: number, weight: number) => ({
    condition: 0,
    at: 0,
    goal: [goal, 1] as const,
    square: (T: number) => weight * Math.max(0, goal - T) ** 2,
    extreme: () => 0,
  })

  it('knows below which T a point, or several at once, add more than is allowed', () => {
    const points = [line(1, 0.1), line(1, 0.1), line(1, 0.1), line(0, 1)]
    // Silence at one adds 0.1, at two 0.2: at least one of two transmits 1 - sqrt(0.15/0.2).
    const covers = forcedTransmission(points, [0, 1, 2, 3], 0.15)
    expect(covers.map(({ length }) => length)).toEqual([2, 3])
    expect(covers[0][0].least).toBeCloseTo(1 - Math.sqrt(0.15 / 0.2), 5)
    expect(covers[1][0].least).toBeCloseTo(1 - Math.sqrt(0.15 / 0.3), 5)
    expect(new Set(covers[1].map(({ point }) => point))).toEqual(new Set([0, 1, 2]))
  })

  it('forces nothing where silence is allowed', () => {
    expect(forcedTransmission([line(1, 0.1), line(1, 0.1)], [0, 1], 0.3)).toEqual([])
    expect(forcedTransmission([line(1, 0.1)], [0], Number.POSITIVE_INFINITY)).toEqual([])
  })
})

describe('discriminating', () => {
  it('takes the points that cut most first, and never one that adds nothing', () => {
    // Stacks by points: the third cuts two of three, the first the last one.
    const added = Float64Array.of(0.4, 0, 1, 0.4, 0, 1, 1, 0, 0)
    expect(discriminating(added, 3, 1, 5)).toEqual([2, 0])
  })
})

/** Five layers, a hundred thousand stacks and more: enough for a range search. */
const five = `  entry: { potential: 0 eV, mass: 0.067 }
  layers:
    - { potential: 230 meV, mass: 0.092, width: 1..4.6 nm step 0.2 nm }
    - { id: well, potential: 0 meV, mass: 0.067, width: 4..8 nm step 0.2 nm }
    - { potential: 230 meV, mass: 0.092, width: 2..4 nm step 1 nm }
    - { id: second, potential: 0 meV, mass: 0.067, width: 4..8 nm step 0.25 nm }
    - { potential: 230 meV, mass: 0.092, width: 1..4.5 nm step 0.5 nm }
  exit: { potential: -20 meV, mass: 0.067 }`

const alloys = `  entry: GaAs
  layers:
    - { id: a, material: AlGaAs, x: { pick: [0.2, 0.3, 0.4] }, width: 3..12 ML }
    - { id: b, material: GaAs, width: 12..22 ML }
    - { id: c, material: AlGaAs, x: { pick: [0.2, 0.3, 0.4] }, width: 9 ML }
    - { id: d, material: GaAs, width: 14..23 ML }
    - { id: e, material: AlGaAs, x: { pick: [0.2, 0.3, 0.4] }, width: 4..7 ML }
  exit: GaAs`

const tied = `  entry: GaAs
  layers:
    - { id: a, material: AlGaAs, x: 0.3, width: 3..9 ML }
    - { id: b, material: GaAs, width: 14..22 ML }
    - { id: c, material: AlGaAs, x: 0.3, width: 5..14 ML }
    - { id: d, material: GaAs, width: 14..22 ML }
    - { like: a }
  exit: GaAs`

const window = `    - { pass: 78..86 meV, above: 0.9, points: 9 }
    - { block: 5..60 meV, below: 1e-2, points: 12 }
    - { block: 120..160 meV, below: 5e-2, weight: 0.5, points: 12 }`

const stopBands = `    - { block: 5..50 meV, below: 1e-5, points: 12 }
    - { block: 90..130 meV, below: 1e-4, points: 12 }`

describe('a search by halves', () => {
  const jobs = [
    { name: 'a window', stack: five, demands: window, cuts: 'transmission forced' },
    { name: 'stop bands', stack: five, demands: stopBands, cuts: 'point terms' },
    {
      name: 'a window, one alloy of three',
      stack: alloys,
      demands: window,
      rest: 'growth: { compositions: 1 }',
      cuts: 'point terms',
    },
    { name: 'a window, ties', stack: tied, demands: window, cuts: 'point terms' },
  ]
  it.each(jobs)('finds for $name what the search stack by stack finds', ({ stack, demands, rest, cuts }) => {
    const job = boundJob({ stack, demands, rest })
    const plain = { ...job, problem: { ...job.problem, chain: () => null } }
    const plan = planComplete(job.problem) as CompletePlan
    expect(plan.method).toBe('halves')
    expect((planComplete(plain.problem) as CompletePlan).method).toBe('every stack')
    const start = startBoundOf(firstRound(job.problem, plan, 'seed'))
    const { found, accounts } = bySlices(job, start)
    const oracle = bySlices(plain, start)
    expect(found).toEqual(oracle.found)
    expect(found.length).toBe(256)
    const sum = (key: string, of = accounts) => of.reduce((total, { cut }) => total + (cut[key] ?? 0), 0)
    expect(sum(cuts)).toBeGreaterThan(5_000)
    // All makeable assignments are accounted for.
    const examined = accounts.reduce((total, one) => total + one.examined, 0)
    let makeable = 0
    for (const _ of job.design.assignments()) makeable++
    expect(examined + sum('transmission forced') + sum('point terms')).toBe(makeable)
    // The same again, whichever slice comes first.
    const last = accounts.length - 1
    expect(runSlice(job.problem, plan, last, start)).toEqual(accounts[last])
  })
})

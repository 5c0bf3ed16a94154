import type { RelaxedProblem, SearchProblem } from '../../src/search/index.js'
import type { Score } from '../../src/target/index.js'

/** Residuals and their slopes in each variable, at a point. */
export type Residuals = (at: ArrayLike<number>) => { residuals: number[]; slopes: number[][] }

/** Least squares with a known best. */
export interface Known {
  readonly name: string
  readonly residuals: Residuals
  readonly start: number[]
  readonly lower: number[]
  readonly upper: number[]
  readonly best: number[]
  readonly least: number
}

const free = 1e3

/** Rosenbrock, Powell and Beale as More, Garbow and Hillstrom number them (ACM TOMS 7, 17, 1981: 1, 13, 5; from memory). */
export const known: readonly Known[] = [
  {
    name: 'Rosenbrock\u2019s valley',
    residuals: rosenbrock,
    start: [-1.2, 1],
    lower: [-free, -free],
    upper: [free, free],
    best: [1, 1],
    least: 0,
  },
  {
    name: 'Rosenbrock\u2019s valley with its end beyond a bound',
    residuals: rosenbrock,
    start: [-1.2, 1],
    lower: [-free, -free],
    upper: [0.5, free],
    // On the bound the first residual vanishes at y = x².
    best: [0.5, 0.25],
    least: 0.25,
  },
  {
    name: 'Powell\u2019s singular function',
    residuals: ({ 0: a, 1: b, 2: c, 3: d }) => ({
      residuals: [a + 10 * b, Math.sqrt(5) * (c - d), (b - 2 * c) * (b - 2 * c), Math.sqrt(10) * (a - d) * (a - d)],
      slopes: [
        [1, 10, 0, 0],
        [0, 0, Math.sqrt(5), -Math.sqrt(5)],
        [0, 2 * (b - 2 * c), -4 * (b - 2 * c), 0],
        [2 * Math.sqrt(10) * (a - d), 0, 0, -2 * Math.sqrt(10) * (a - d)],
      ],
    }),
    start: [3, -1, 0, 1],
    lower: [-free, -free, -free, -free],
    upper: [free, free, free, free],
    best: [0, 0, 0, 0],
    least: 0,
  },
  {
    name: 'Beale\u2019s function',
    residuals: ({ 0: x, 1: y }) => ({
      residuals: [1.5 - x * (1 - y), 2.25 - x * (1 - y * y), 2.625 - x * (1 - y * y * y)],
      slopes: [
        [y - 1, x],
        [y * y - 1, 2 * x * y],
        [y * y * y - 1, 3 * x * y * y],
      ],
    }),
    start: [1, 1],
    lower: [-4.5, -4.5],
    upper: [4.5, 4.5],
    best: [3, 0.5],
    least: 0,
  },
]

function rosenbrock(at: ArrayLike<number>): { residuals: number[]; slopes: number[][] } {
  const [x, y] = [at[0], at[1]]
  return {
    residuals: [10 * (y - x * x), 1 - x],
    slopes: [
      [-20 * x, 10],
      [-1, 0],
    ],
  }
}

/** What the fit asks for. */
export function relaxedOf({ residuals, start, lower, upper }: Known): RelaxedProblem {
  return {
    residuals: residuals(start).residuals.length,
    start: Float64Array.from(start),
    lower: Float64Array.from(lower),
    upper: Float64Array.from(upper),
    place: Int32Array.from(start, (_, v) => v),
    valueOf: (_, choice) => choice,
    evaluate: writer(residuals),
    snap: (at) => Int32Array.from(at, Math.round),
  }
}

/**
 * A lattice with a planted best: a rippled, coupled bowl over ordered places, a different bowl for each choice of one unordered place
 * (the last), of which `list` is right. Its merit is 0 at the planted stack alone.
 */
export function planted(best: readonly number[], choices: number, list: number, lists: number): SearchProblem {
  const n = best.length
  const residuals = (at: ArrayLike<number>, chosen: number) => {
    const depth = chosen === list ? 0 : 1
    const d = best.map((value, i) => at[i] - value - (chosen - list))
    const values = d.map((x, i) => (0.7 * x + 0.3 * d[(i + 1) % n]) / choices)
    const slopes = d.map((_, i) => d.map((_, k) => ((k === i ? 0.7 : 0) + (k === (i + 1) % n ? 0.3 : 0)) / choices))
    const ripples = d.map((x) => 0.05 * Math.sin((Math.PI * x) / 3))
    const rippled = d.map((x, i) => d.map((_, k) => (k === i ? (0.05 * Math.PI * Math.cos((Math.PI * x) / 3)) / 3 : 0)))
    return { residuals: [...values, ...ripples, depth], slopes: [...slopes, ...rippled, d.map(() => 0)] }
  }
  const merit = (stack: Int32Array) =>
    Math.sqrt(residuals(stack, stack[n]).residuals.reduce((sum, r) => sum + r * r, 0))
  const places = [
    ...best.map(() => ({ choices, ordered: true, family: 0 })),
    { choices: lists, ordered: false, family: 1 },
  ]
  return {
    places,
    stackCount: () => places.reduce((product, place) => product * place.choices, 1),
    points: 2 * n + 1,
    chain: () => null,
    feasible: (stack) => places.every((place, i) => stack[i] >= 0 && stack[i] < place.choices),
    repair: (stack) => stack,
    canonical: (stack) => stack,
    bound: merit,
    boundGuides: true,
    reach: ({ merit }) => merit,
    score: (stack) => scoreOf(merit(stack), stack.join()),
    compare: byMerit,
    relax: (stack) => ({
      residuals: 2 * n + 1,
      start: Float64Array.from(stack.subarray(0, n)),
      lower: new Float64Array(n),
      upper: new Float64Array(n).fill(choices - 1),
      place: Int32Array.from(best, (_, v) => v),
      valueOf: (_, choice) => choice,
      evaluate: writer((at) => residuals(at, stack[n])),
      snap: (at) => Int32Array.from([...at.map(Math.round), stack[n]]),
    }),
  }
}

export function scoreOf(merit: number, id: string): Score {
  return { met: false, merit, margin: null, totalNm: 0, id }
}

export function byMerit(a: Score, b: Score): number {
  return a.merit - b.merit || (a.id < b.id ? -1 : a.id > b.id ? 1 : 0)
}

function writer(of: Residuals): RelaxedProblem['evaluate'] {
  return (at, residuals, jacobian) => {
    const { residuals: values, slopes } = of(at)
    residuals.set(values)
    slopes.forEach((row, i) => void jacobian.set(row, i * at.length))
  }
}

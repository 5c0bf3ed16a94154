import { levenbergMarquardt } from 'ml-levenberg-marquardt'
import { factor, type Quadratic, quadraticOf } from './quadratic.js'
import type { RelaxedProblem } from './types.js'

export interface Fit {
  readonly variables: Float64Array
  /** Sum of squares there. */
  readonly sum: number
  /** Of residuals and Jacobian together. */
  readonly evaluations: number
  readonly residuals: Float64Array
  readonly jacobian: Float64Array
}

type BoundedResiduals = Pick<RelaxedProblem, 'residuals' | 'lower' | 'upper' | 'evaluate'>

/**
 * Least squares within bounds by Levenberg and Marquardt, from `start`, with at most `most` evaluations of residuals and Jacobian.
 *
 * The steps are those of ml-levenberg-marquardt, taken one at a time, for by itself it accepts steps that make the sum worse, can't
 * tell a stall, throws at NaN, and decides on sums that it squares with `**`, whose last bit is not the same everywhere. Here a step
 * counts only where it lowers the sum; damping, stall test and the best point are our own. Its damping is lambda times the identity,
 * so every step is taken in variables scaled by the norms of the Jacobian's columns (Marquardt, 1963). A variable at its bound that
 * the gradient pushes outwards is left out of the step. Points without finite residuals count as worse than any.
 */
export function leastSquares(problem: BoundedResiduals, start: Float64Array, most: number): Fit {
  const { lower, upper } = problem
  let best = evaluate(
    problem,
    start.map((value, v) => Math.min(Math.max(value, lower[v]), upper[v])),
  )
  let quadratic = quadraticOf(best.residuals, best.jacobian, start.length)
  let evaluations = 1
  let damping = firstDamping
  let stalls = 0
  while (evaluations < most && Number.isFinite(best.sum) && best.sum > 0) {
    const free = freeVariables(best, quadratic, problem)
    if (free.length === 0) break
    const moved = step(problem, best.variables, quadratic, free, damping)
    if (moved === null) break
    const trial = evaluate(problem, moved)
    evaluations++
    if (trial.sum < best.sum) {
      stalls = best.sum - trial.sum > stalled * best.sum ? 0 : stalls + 1
      best = trial
      quadratic = quadraticOf(best.residuals, best.jacobian, start.length)
      damping = Math.max(damping / 9, leastDamping)
      if (stalls === 2) break
    } else {
      damping *= 7
      if (damping > mostDamping) break
    }
  }
  return { ...best, evaluations }
}

const firstDamping = 1e-2
const leastDamping = 1e-7
/** Steps are then a ten-thousandth of a steepest descent: nothing is to be had here. */
const mostDamping = 1e4
/** Relative gain of a step below which, twice in a row, the fit has arrived. */
const stalled = 1e-5

type Point = Omit<Fit, 'evaluations'>

function evaluate(problem: BoundedResiduals, variables: Float64Array): Point {
  const residuals = new Float64Array(problem.residuals).fill(Number.NaN)
  const jacobian = new Float64Array(problem.residuals * variables.length).fill(Number.NaN)
  problem.evaluate(variables, residuals, jacobian)
  let sum = 0
  for (let i = 0; i < residuals.length; i++) sum += residuals[i] * residuals[i]
  let check = sum
  for (let i = 0; i < jacobian.length; i++) check += jacobian[i]
  return { variables, residuals, jacobian, sum: Number.isFinite(check) ? sum : Number.POSITIVE_INFINITY }
}

/** All but those at a bound that a descent would leave. */
function freeVariables({ variables }: Point, { gradient }: Quadratic, { lower, upper }: BoundedResiduals): number[] {
  return [...variables.keys()].filter((v) => {
    const slope = gradient[v]
    const outwards = (variables[v] <= lower[v] && slope > 0) || (variables[v] >= upper[v] && slope < 0)
    return slope !== 0 && !outwards
  })
}

/**
 * The point that one step of the library reaches; null where it finds none. A step hangs on J^T J and J^T r alone, so the library gets
 * as many residuals as there are variables, with the same products (Cholesky's factor of J^T J): its cost is that of a small problem.
 */
function step(
  problem: BoundedResiduals,
  variables: Float64Array,
  all: Quadratic,
  free: readonly number[],
  damping: number,
): Float64Array | null {
  const n = free.length
  const scale = free.map((v) => Math.sqrt(all.hessian[v * all.n + v]))
  const scaled = free.map((v, k) => variables[v] * scale[k])
  const gradient = Float64Array.from(free, (v, k) => all.gradient[v] / scale[k])
  const hessian = new Float64Array(n * n)
  free.forEach((v, k) => {
    for (let l = 0; l < n; l++) hessian[k * n + l] = all.hessian[v * all.n + free[l]] / (scale[k] * scale[l])
  })
  const { R, y } = factor({ n, gradient, hessian }, noRidge)
  let moved: Float64Array | null = null
  const model = (values: number[]) => {
    if (values.every((value, k) => value === scaled[k])) return (i: number) => (i < n ? y[i] : 0)
    moved = Float64Array.from(variables)
    for (const [k, v] of free.entries()) {
      moved[v] = Math.min(Math.max(values[k] / scale[k], problem.lower[v]), problem.upper[v])
    }
    return () => 0
  }
  const jacobianFunction = () => (i: number) => free.map((_, k) => (i < n ? R[i * n + k] : 0))
  // The library takes no fewer than two residuals.
  const numbers = Array.from({ length: Math.max(n, 2) }, (_, i) => i)
  // The library's own verdict on the step is not asked for.
  levenbergMarquardt({ x: numbers, y: numbers.map(() => 0) }, model, {
    initialValues: scaled,
    minValues: free.map((v, k) => problem.lower[v] * scale[k]),
    maxValues: free.map((v, k) => problem.upper[v] * scale[k]),
    jacobianFunction,
    damping,
    maxIterations: 1,
    errorTolerance: 0,
  })
  return moved
}

/** Of the curvature: what keeps a singular factor finite, far below any damping. */
const noRidge = 1e-14

import { quadraticOf } from './quadratic.js'
import type { RelaxedProblem, SearchProblem } from './types.js'

/**
 * Moves of one, two and three ordered places away from a stack, the most promising first by the quadratic of its own residuals: one
 * Jacobian ranks thousands of neighbours. Only those that the quadratic calls better; it knows neither extremes nor residuals that are
 * zero here, so that an empty list proves nothing.
 */
export function promisingMoves(
  places: SearchProblem['places'],
  relaxed: RelaxedProblem,
  stack: Int32Array,
  most: number,
): Int32Array[] {
  const n = relaxed.start.length
  const residuals = new Float64Array(relaxed.residuals).fill(Number.NaN)
  const jacobian = new Float64Array(relaxed.residuals * n).fill(Number.NaN)
  relaxed.evaluate(relaxed.start, residuals, jacobian)
  const { gradient, hessian } = quadraticOf(residuals, jacobian, n)
  const steps: Step[] = []
  for (let v = 0; v < n; v++) {
    const place = relaxed.place[v]
    for (const by of strides) {
      const choice = stack[place] + by
      if (choice < 0 || choice >= places[place].choices) continue
      const d = relaxed.valueOf(v, choice) - relaxed.start[v]
      if (Number.isFinite(d))
        steps.push({ v, place, choice, d, alone: 2 * gradient[v] * d + hessian[v * n + v] * d * d })
    }
  }
  const moves: { readonly gain: number; readonly steps: readonly Step[] }[] = []
  const keep = (gain: number, taken: readonly Step[]): void => {
    if (gain < 0) moves.push({ gain, steps: taken })
  }
  const cross = (a: Step, b: Step) => 2 * hessian[a.v * n + b.v] * a.d * b.d
  steps.forEach((a, i) => {
    keep(a.alone, [a])
    for (let j = i + 1; j < steps.length; j++) {
      const b = steps[j]
      if (b.v === a.v) continue
      const two = a.alone + b.alone + cross(a, b)
      keep(two, [a, b])
      for (let k = j + 1; k < steps.length; k++) {
        const c = steps[k]
        if (c.v !== b.v) keep(two + c.alone + cross(a, c) + cross(b, c), [a, b, c])
      }
    }
  })
  moves.sort((a, b) => a.gain - b.gain)
  return moves.slice(0, most).map(({ steps: taken }) => {
    const moved = Int32Array.from(stack)
    for (const { place, choice } of taken) moved[place] = choice
    return moved
  })
}

interface Step {
  readonly v: number
  readonly place: number
  readonly choice: number
  readonly d: number
  /** Change of the sum by this step alone. */
  readonly alone: number
}

const strides = [-2, -1, 1, 2]

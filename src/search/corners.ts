import type { Fit } from './leastSquares.js'
import { factor, quadraticOf } from './quadratic.js'
import type { RelaxedProblem, SearchProblem } from './types.js'

/**
 * Lattice points around a fit, the most promising first by the fit's own quadratic: rounding each variable for itself goes wrong where
 * several together move a resonance. A beam search over the rows of Cholesky's factor from the last to the first (the nearest-plane
 * idea of Babai, Combinatorica 6, 1, 1986, from memory, with several planes kept): each row adds a square that depends on the variables
 * chosen so far, so that partial sums rank. `origin` has the choices of all other places.
 */
export function corners(
  places: SearchProblem['places'],
  relaxed: RelaxedProblem,
  fit: Fit,
  origin: Int32Array,
  most: number,
): Int32Array[] {
  const n = fit.variables.length
  const { R, y } = factor(quadraticOf(fit.residuals, fit.jacobian, n), ridge)
  let beam: Partial[] = [{ sum: 0, moves: new Float64Array(n), choices: new Int32Array(n) }]
  for (let v = n - 1; v >= 0; v--) {
    const ladder = ladderOf(relaxed, v, places[relaxed.place[v]].choices)
    const next: Partial[] = []
    for (const { sum, moves, choices } of beam) {
      let offset = y[v]
      for (let k = v + 1; k < n; k++) offset += R[v * n + k] * moves[k]
      const wanted = fit.variables[v] - offset / R[v * n + v]
      for (const { choice, value } of nearestRungs(ladder, wanted)) {
        const move = value - fit.variables[v]
        const row = R[v * n + v] * move + offset
        const grown = { sum: sum + row * row, moves: Float64Array.from(moves), choices: Int32Array.from(choices) }
        grown.moves[v] = move
        grown.choices[v] = choice
        next.push(grown)
      }
    }
    beam = next.sort((a, b) => a.sum - b.sum).slice(0, most)
  }
  return beam.map(({ choices }) => {
    const corner = Int32Array.from(origin)
    choices.forEach((choice, v) => {
      corner[relaxed.place[v]] = choice
    })
    return corner
  })
}

/** Of the mean curvature. */
const ridge = 1e-4

interface Partial {
  readonly sum: number
  readonly moves: Float64Array
  readonly choices: Int32Array
}

interface Rung {
  readonly choice: number
  readonly value: number
}

/** The choices of a variable's place that the stack's media have, values ascending. */
export function ladderOf(relaxed: RelaxedProblem, variable: number, choices: number): Rung[] {
  const ladder: Rung[] = []
  for (let choice = 0; choice < choices; choice++) {
    const value = relaxed.valueOf(variable, choice)
    if (!Number.isNaN(value)) ladder.push({ choice, value })
  }
  return ladder
}

function nearestRungs(ladder: readonly Rung[], wanted: number): Rung[] {
  let low = 0
  let high = ladder.length
  while (low < high) {
    const middle = (low + high) >> 1
    if (ladder[middle].value < wanted) low = middle + 1
    else high = middle
  }
  // One below and one above, and at the ends of the ladder the nearest two.
  const first = Math.min(Math.max(low - 1, 0), Math.max(ladder.length - 2, 0))
  return ladder.slice(first, first + 2)
}

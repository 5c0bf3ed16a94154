import { log10 } from '../wave/index.js'
import type { RelaxedProblem } from './types.js'

/** Differences are taken at this step of a variable (of order one) and its halves. */
const firstStep = 1e-3
const halvings = 9

/**
 * How many decimal digits of the Jacobian of a fit agree with central differences of its residuals, extrapolated to step 0
 * (Richardson; Ridders, Adv. Eng. Software 4, 75, 1982, from memory), for each variable, relative to its largest entry. Differences of
 * doubles show some nine digits at best, and fewer of a residual that has a kink nearby.
 */
export function jacobianDigits(problem: RelaxedProblem, at: Float64Array): number[] {
  const { residuals } = problem
  const variables = at.length
  const jacobian = new Float64Array(residuals * variables)
  problem.evaluate(at, new Float64Array(residuals), jacobian)
  return Array.from(at, (_, v) => {
    const differences = extrapolated(problem, at, v)
    let scale = 0
    let worst = 0
    for (let i = 0; i < residuals; i++) {
      scale = Math.max(scale, Math.abs(differences[i]))
      worst = Math.max(worst, Math.abs(jacobian[i * variables + v] - differences[i]))
    }
    if (worst === 0 || scale === 0) return worst === 0 ? 16 : 0
    return Math.min(16, Math.max(0, -log10(worst / scale)))
  })
}

/** Of each residual the extrapolation that its neighbours in the table agree with best: small steps round, large ones may meet a kink. */
function extrapolated(problem: RelaxedProblem, at: Float64Array, v: number): Float64Array {
  let table: Float64Array[] = []
  const best = new Float64Array(problem.residuals)
  const errors = new Float64Array(problem.residuals).fill(Infinity)
  for (let k = 0; k <= halvings; k++) {
    const row = [difference(problem, at, v, firstStep / (1 << k))]
    let factor = 1
    for (let m = 1; m <= k; m++) {
      factor *= 4
      const next = row[m - 1].map((one, i) => (factor * one - table[m - 1][i]) / (factor - 1))
      for (let i = 0; i < next.length; i++) {
        const error = Math.max(Math.abs(next[i] - row[m - 1][i]), Math.abs(next[i] - table[m - 1][i]))
        if (error >= errors[i]) continue
        errors[i] = error
        best[i] = next[i]
      }
      row.push(next)
    }
    table = row
  }
  return best
}

function difference(problem: RelaxedProblem, at: Float64Array, v: number, h: number): Float64Array {
  const { residuals } = problem
  const unused = new Float64Array(residuals * at.length)
  const beside = (by: number) => {
    const moved = Float64Array.from(at)
    moved[v] += by
    const out = new Float64Array(residuals)
    problem.evaluate(moved, out, unused)
    return out
  }
  const above = beside(h)
  const below = beside(-h)
  return above.map((one, i) => (one - below[i]) / (2 * h))
}

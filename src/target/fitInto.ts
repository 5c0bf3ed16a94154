import type { Quantity } from '../job/index.js'
import type { Judge } from './Judge.js'
import type { Landscape } from './Landscape.js'

/**
 * The residuals of the fit and their slopes in the variables: for each condition and the demands that hold there the points, or the parts of a peak,
 * scaled so that the sum of squares is merit² without the extremes. `directions` has, for each condition, a row a variable with
 * d(layer parameter)/d(variable); jacobian[i * variables + v]. The adjoint runs only at points that have a slope.
 */
export function fitInto(
  landscapes: readonly ((quantity: Quantity) => Landscape)[],
  judges: readonly Judge[],
  holds: readonly (readonly number[])[],
  directions: readonly Float64Array[],
  variables: number,
  residuals: Float64Array,
  jacobian: Float64Array,
): void {
  const total = judges.reduce((sum, { weight }) => sum + weight, 0)
  let next = 0
  for (let c = 0; c < landscapes.length; c++) {
    const held = judges.filter((_, d) => holds[d].includes(c))
    const moved = movedParameters(directions[c], variables)
    const gradients = new Map<Quantity, ReturnType<typeof pointGradients>>()
    const gradientOf = (quantity: Quantity) => {
      const known = gradients.get(quantity)
      if (known) return known
      const found = pointGradients(
        landscapes[c](quantity),
        held.filter((judge) => judge.quantity === quantity),
      )
      gradients.set(quantity, found)
      return found
    }
    for (const judge of held) {
      const { terms, parts, weight, quantity } = judge
      const landscape = landscapes[c](quantity)
      const size = landscape.layerParameters
      const scale = Math.sqrt(weight / (total * holds[judges.indexOf(judge)].length))
      if (terms) {
        const points = gradientOf(quantity)
        for (let i = 0; i < terms.energiesEv.length; i++) {
          const T = landscape.T[terms.first + i]
          const factor = scale * Math.sqrt(terms.share(i))
          residuals[next] = factor * terms.residual(i, T)
          row(next++, c, factor * terms.slope(i, T), points.gradient, points.at(terms.first + i) * size, moved)
        }
      }
      const slopes = parts > 0 ? judge.fitParts(landscape, residuals.subarray(next, next + parts)) : []
      const factor = scale / Math.sqrt(parts)
      for (const slope of slopes) {
        residuals[next] *= factor
        row(next++, c, factor, slope, 0, moved)
      }
    }
  }

  function row(i: number, c: number, factor: number, gradient: Float64Array, first: number, moved: Int32Array[]): void {
    const size = directions[c].length / variables
    for (let v = 0; v < variables; v++) {
      let sum = 0
      if (factor !== 0) for (const k of moved[v]) sum += gradient[first + k] * directions[c][v * size + k]
      jacobian[i * variables + v] = factor * sum
    }
  }
}

/** For each variable the layer parameters that it moves: few of all. */
function movedParameters(directions: Float64Array, variables: number): Int32Array[] {
  const size = directions.length / variables
  return Array.from({ length: variables }, (_, v) => {
    const row = directions.subarray(v * size, (v + 1) * size)
    return Int32Array.from([...row.keys()].filter((k) => row[k] !== 0))
  })
}

/** dT/d(layer parameter) at the points of all demands that have a slope; `at` says in which row a point of the target stands. */
function pointGradients(
  landscape: Landscape,
  judges: readonly Judge[],
): { gradient: Float64Array; at(point: number): number } {
  const energies: number[] = []
  const rows = new Int32Array(landscape.T.length)
  for (const { terms } of judges) {
    terms?.energiesEv.forEach((energy, i) => {
      const point = terms.first + i
      if (terms.slope(i, landscape.T[point]) === 0) return
      rows[point] = energies.length
      energies.push(energy)
    })
  }
  const { gradient } = landscape.gradient(energies)
  return { gradient, at: (point) => rows[point] }
}

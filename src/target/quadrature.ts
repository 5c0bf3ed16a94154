import { cos } from '../wave/index.js'

/** Gauss and Legendre's rule on [-1, 1]: places and weights, exact for polynomials up to degree 2 n - 1. */
export interface Rule {
  readonly x: Float64Array
  readonly w: Float64Array
}

/** By Newton on the Legendre polynomial of degree n from the usual guess. */
export function gaussLegendre(n: number): Rule {
  const x = new Float64Array(n)
  const w = new Float64Array(n)
  for (let i = 0; i < n; i++) {
    let z = -cos((Math.PI * (i + 0.75)) / (n + 0.5))
    let slope = 1
    for (let step = 0; step < 8; step++) {
      let before = 1
      let p = z
      for (let k = 2; k <= n; k++) {
        const next = ((2 * k - 1) * z * p - (k - 1) * before) / k
        before = p
        p = next
      }
      slope = (n * (z * p - before)) / (z * z - 1)
      z -= p / slope
    }
    x[i] = z
    w[i] = 2 / ((1 - z * z) * slope * slope)
  }
  return { x, w }
}

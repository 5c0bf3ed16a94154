/** A sum of squares near a point, |r + J d|² = constant + 2 g d + d H d, to first order in the residuals. */
export interface Quadratic {
  readonly n: number
  readonly gradient: Float64Array
  /** Row by row, symmetric. */
  readonly hessian: Float64Array
}

/** From residuals and `jacobian[i * n + v]`. */
export function quadraticOf(residuals: Float64Array, jacobian: Float64Array, n: number): Quadratic {
  const gradient = new Float64Array(n)
  const hessian = new Float64Array(n * n)
  for (let i = 0; i < residuals.length; i++) {
    const row = i * n
    for (let a = 0; a < n; a++) {
      const slope = jacobian[row + a]
      if (slope === 0) continue
      gradient[a] += slope * residuals[i]
      for (let b = 0; b <= a; b++) hessian[a * n + b] += slope * jacobian[row + b]
    }
  }
  for (let a = 0; a < n; a++) for (let b = 0; b < a; b++) hessian[b * n + a] = hessian[a * n + b]
  return { n, gradient, hessian }
}

/**
 * Cholesky's factor R (upper, row by row) of H + ridge: |R d + y|² is the quadratic with R^T y = g. The ridge keeps directions that the
 * residuals do not feel from running away.
 */
export function factor({ n, gradient, hessian }: Quadratic, ridge: number): { R: Float64Array; y: Float64Array } {
  const R = new Float64Array(n * n)
  const y = new Float64Array(n)
  let trace = 0
  for (let a = 0; a < n; a++) trace += hessian[a * n + a]
  const added = ridge * (trace / n) || 1
  for (let a = 0; a < n; a++) {
    let square = hessian[a * n + a] + added
    for (let k = 0; k < a; k++) square -= R[k * n + a] * R[k * n + a]
    const diagonal = Math.sqrt(Math.max(square, added))
    R[a * n + a] = diagonal
    for (let b = a + 1; b < n; b++) {
      let sum = hessian[a * n + b]
      for (let k = 0; k < a; k++) sum -= R[k * n + a] * R[k * n + b]
      R[a * n + b] = sum / diagonal
    }
    let sum = gradient[a]
    for (let k = 0; k < a; k++) sum -= R[k * n + a] * y[k]
    y[a] = sum / diagonal
  }
  return { R, y }
}

/**
 * Cubics through points of ascending x that keep between neighbouring points: Fritsch and Carlson, SIAM J. Numer. Anal. 17, 238
 * (1980), with the slopes of Fritsch and Butland (weighted harmonic means; both from memory). Beyond the ends the last cubic goes on.
 */
export function monotoneCubic(x: readonly number[], y: readonly number[]): (at: number) => number {
  const slopes = slopesOf(x, y)
  return (at) => {
    let i = 0
    let end = x.length - 2
    while (i < end) {
      const middle = (i + end + 1) >> 1
      if (x[middle] <= at) i = middle
      else end = middle - 1
    }
    const h = x[i + 1] - x[i]
    const t = (at - x[i]) / h
    const u = 1 - t
    return u * u * (1 + 2 * t) * y[i] + t * t * (1 + 2 * u) * y[i + 1] + h * t * u * (u * slopes[i] - t * slopes[i + 1])
  }
}

function slopesOf(x: readonly number[], y: readonly number[]): number[] {
  const last = x.length - 1
  const steps = x.slice(1).map((to, i) => to - x[i])
  const secants = steps.map((step, i) => (y[i + 1] - y[i]) / step)
  if (last === 1) return [secants[0], secants[0]]
  return x.map((_, i) => {
    if (i === 0) return endSlope(steps[0], steps[1], secants[0], secants[1])
    if (i === last) return endSlope(steps[last - 1], steps[last - 2], secants[last - 1], secants[last - 2])
    const [a, b] = [secants[i - 1], secants[i]]
    if (a * b <= 0) return 0
    const w1 = 2 * steps[i] + steps[i - 1]
    const w2 = steps[i] + 2 * steps[i - 1]
    return (w1 + w2) / (w1 / a + w2 / b)
  })
}

/** That of the parabola through three points, held to the sign and thrice the size of the last secant. */
function endSlope(step: number, next: number, secant: number, nextSecant: number): number {
  const slope = ((2 * step + next) * secant - step * nextSecant) / (step + next)
  if (slope * secant <= 0) return 0
  if (secant * nextSecant <= 0 && Math.abs(slope) > 3 * Math.abs(secant)) return 3 * secant
  return slope
}

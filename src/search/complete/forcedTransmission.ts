import type { ChainPoint } from '../types.js'

/** A point at which a stack must transmit at least `least`, or it is cut, unless it does so at another point of its cover. */
export interface Forced {
  readonly point: number
  readonly least: number
}

/**
 * Covers of the stacks whose merit squared is at most `square`: each such stack transmits at least `least` at one point of each cover.
 * For if it did so at none, the terms of the cover's points alone would add up to more. Of 1, 2, ... points, as long as there are
 * points with goals above 0: the more points, the higher the least T. Empty where nothing is forced.
 */
export function forcedTransmission(points: readonly ChainPoint[], open: readonly number[], square: number): Forced[][] {
  const silent = open.map((point) => ({ point, added: points[point].square(0) + points[point].extreme(0) }))
  const greatest = silent.reduce((most, { added }) => Math.max(most, added), 0)
  const strong = silent.filter(({ point, added }) => points[point].goal[0] > 0 && added > 0.3 * greatest)
  const covers: Forced[][] = []
  for (const size of sizes) {
    if (size > strong.length) break
    const chosen = Array.from({ length: size }, (_, i) => strong[Math.floor(((i + 0.5) * strong.length) / size)].point)
    const least = leastT(
      chosen.map((point) => points[point]),
      square,
    )
    if (least > 0) covers.push(chosen.map((point) => ({ point, least })))
  }
  return covers
}

const sizes = [1, 2, 3, 4, 6, 8, 12, 16, 24]

/** The greatest T, to 1e-3, below which all of the points at once add more than `square`. */
function leastT(points: readonly ChainPoint[], square: number): number {
  const added = (T: number) => {
    let sum = 0
    let worst = 0
    for (const point of points) {
      if (T >= point.goal[0]) continue
      sum += point.square(T)
      worst = Math.max(worst, point.extreme(T))
    }
    return sum + worst
  }
  let low = 0
  let high = 1
  for (let i = 0; i < 20; i++) {
    const middle = 0.5 * (low + high)
    if (added(middle) > square * (1 + 1e-9)) low = middle
    else high = middle
  }
  return low
}

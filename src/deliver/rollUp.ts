/** Points of a curve by their numbers: x[i], y[i]. */
export interface Curve {
  readonly x: ArrayLike<number>
  readonly y: ArrayLike<number>
}

/** Up to so many points a curve is drawn as it is. */
const plain = 2000

/**
 * The numbers of the points that a curve of `columns` pixels needs: all of them, or the first, least, greatest and last of each pixel
 * column, so that no needle is lost and the picture is the same to the pixel. Points outside [from, to] are left out but for the
 * neighbours at the ends, which the line has to reach.
 */
export function rollUp({ x, y }: Curve, from: number, to: number, columns: number): number[] {
  let first = 0
  while (first + 1 < x.length && x[first + 1] < from) first++
  let end = x.length
  while (end > 1 && x[end - 2] > to) end--
  const range = Array.from({ length: Math.max(0, end - first) }, (_, i) => first + i)
  if (range.length <= plain) return range

  const kept: number[] = []
  const columnOf = (i: number) => Math.floor(((x[i] - from) / (to - from)) * columns)
  for (let start = 0; start < range.length; ) {
    let stop = start + 1
    while (stop < range.length && columnOf(range[stop]) === columnOf(range[start])) stop++
    kept.push(...extremes(y, range[start], range[stop - 1]))
    start = stop
  }
  return kept
}

/** First, least, greatest and last of y over [first, last], ascending, each once. */
function extremes(y: ArrayLike<number>, first: number, last: number): number[] {
  let least = first
  let greatest = first
  for (let i = first; i <= last; i++) {
    if (y[i] < y[least]) least = i
    if (y[i] > y[greatest]) greatest = i
  }
  return [...new Set([first, Math.min(least, greatest), Math.max(least, greatest), last])]
}

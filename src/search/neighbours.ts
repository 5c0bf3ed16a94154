import type { SearchPlace, SearchProblem } from './types.js'

/**
 * The stacks around one, feasible ones only: those that differ in one place, then in two, then in three. Ordered places move as far as
 * `most` stacks of each kind allow, so that few places are searched wide and many near; three at once only where they find room. Of
 * unordered lists every other choice.
 */
export function* neighbours(
  { places, feasible }: SearchProblem,
  stack: Int32Array,
  most: number,
): Iterable<Int32Array> {
  const moved = Int32Array.from(stack)
  for (const together of [1, 2, 3]) {
    const reach = reachOf(places.length, together, most)
    const near = places.map((place, i) => choicesNear(place, stack[i], reach))
    if (reach > 0) yield* moves(0, together, near)
  }

  function* moves(from: number, left: number, near: readonly number[][]): Iterable<Int32Array> {
    for (let i = from; i <= places.length - left; i++) {
      for (const choice of near[i]) {
        moved[i] = choice
        if (left > 1) yield* moves(i + 1, left - 1, near)
        else if (feasible(moved)) yield Int32Array.from(moved)
      }
      moved[i] = stack[i]
    }
  }
}

/** The largest r with (places over together) (2 r)^together <= most; pairs always have their next choices. */
export function reachOf(places: number, together: number, most: number): number {
  let ways = 1
  for (let k = 0; k < together; k++) ways = (ways * (places - k)) / (k + 1)
  if (ways === 0) return 0
  let reach = 0
  for (;;) {
    const span = 2 * (reach + 1)
    if (ways * (together === 1 ? span : together === 2 ? span * span : span * span * span) > most) break
    reach++
  }
  return together === 3 ? reach : Math.max(reach, 1)
}

/** Choices of a place around one, at most `reach` away where they are ordered; the nearest first. */
export function choicesNear({ choices, ordered }: SearchPlace, at: number, reach: number): number[] {
  const near: number[] = []
  for (let by = 1; by < choices && (by <= reach || !ordered); by++) {
    if (at + by < choices) near.push(at + by)
    if (at - by >= 0) near.push(at - by)
  }
  return near
}

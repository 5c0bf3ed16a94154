import type { SearchProblem } from './types.js'

/**
 * The stacks one move away: one place up to two choices further, or to any other choice of an unordered list; and two places
 * together, the ordered ones by one choice. Feasible ones only; single moves first.
 */
export function* neighbours({ places, feasible }: SearchProblem, stack: Int32Array): Iterable<Int32Array> {
  const moved = Int32Array.from(stack)
  for (let a = 0; a < places.length; a++) {
    for (const choice of choicesNear(places[a], stack[a], 2)) {
      moved[a] = choice
      if (feasible(moved)) yield Int32Array.from(moved)
    }
    moved[a] = stack[a]
  }
  for (let a = 0; a < places.length; a++) {
    for (const one of choicesNear(places[a], stack[a], 1)) {
      moved[a] = one
      for (let b = a + 1; b < places.length; b++) {
        for (const other of choicesNear(places[b], stack[b], 1)) {
          moved[b] = other
          if (feasible(moved)) yield Int32Array.from(moved)
        }
        moved[b] = stack[b]
      }
    }
    moved[a] = stack[a]
  }
}

function choicesNear({ choices, ordered }: SearchProblem['places'][number], at: number, reach: number): number[] {
  const near: number[] = []
  if (!ordered) {
    for (let choice = 0; choice < choices; choice++) if (choice !== at) near.push(choice)
    return near
  }
  for (let by = 1; by <= reach; by++) {
    if (at + by < choices) near.push(at + by)
    if (at - by >= 0) near.push(at - by)
  }
  return near
}

import type { SearchProblem } from '../types.js'

/** How many assignments the places have, feasible or not. */
export function assignmentsOf({ places }: Pick<SearchProblem, 'places'>): number {
  return places.reduce((product, { choices }) => product * choices, 1)
}

/**
 * The feasible assignments numbered from `from` to below `to`, the last place fastest; one array, reused. Numbers count infeasible
 * assignments too, so that any stretch can be had without those before it.
 */
export function* everyStack(
  { places, feasible }: Pick<SearchProblem, 'places' | 'feasible'>,
  from: number,
  to: number,
): Iterable<Int32Array> {
  const assignment = new Int32Array(places.length)
  let rest = from
  for (let place = places.length - 1; place >= 0; place--) {
    const { choices } = places[place]
    assignment[place] = rest % choices
    rest = Math.floor(rest / choices)
  }
  for (let number = from; number < to; number++) {
    if (feasible(assignment)) yield assignment
    let place = places.length - 1
    while (place >= 0 && ++assignment[place] === places[place].choices) assignment[place--] = 0
  }
}

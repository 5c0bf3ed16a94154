/**
 * An order of points by how much they discriminate, from what each adds to each of some stacks: every next point is the one that takes
 * most off what is missing until the stacks left are cut. When none is left all start again, so that the order goes on.
 *
 * `added[s * points + p]`; `missing`: sums above it are cut. At most `most` points, none that adds nothing.
 */
export function discriminating(added: Float64Array, points: number, missing: number, most: number): number[] {
  const stacks = added.length / points
  const left = new Float64Array(stacks).fill(missing)
  const order: number[] = []
  const chosen = new Uint8Array(points)
  while (order.length < Math.min(most, points)) {
    let best = -1
    let most = 0
    for (let p = 0; p < points; p++) {
      if (chosen[p] === 1) continue
      let gain = 0
      for (let s = 0; s < stacks; s++) if (left[s] > 0) gain += Math.min(left[s], added[s * points + p])
      if (gain > most) {
        most = gain
        best = p
      }
    }
    if (best < 0) {
      if (left.every((rest) => rest === missing)) break
      left.fill(missing)
      continue
    }
    chosen[best] = 1
    order.push(best)
    for (let s = 0; s < stacks; s++) left[s] -= added[s * points + best]
  }
  return order
}

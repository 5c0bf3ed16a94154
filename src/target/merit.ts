/** Merit = sqrt(sum weight rms² / sum weight) from the mean square and the weight of each demand (design 3). */
export function merit(squares: ArrayLike<number>, weights: ArrayLike<number>): number {
  let sum = 0
  let total = 0
  for (let i = 0; i < squares.length; i++) {
    sum += weights[i] * squares[i]
    total += weights[i]
  }
  return Math.sqrt(sum / total)
}

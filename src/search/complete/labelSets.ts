import type { HalfList } from './HalfVectors.js'

/** Whether the halves of a pair have at most so many labels together: entry (set of a) * (sets of b) + (set of b). */
export function compatible(A: HalfList, B: HalfList, most: number): Uint8Array {
  const fits = new Uint8Array(A.labelSets.length * B.labelSets.length)
  A.labelSets.forEach((one, i) => {
    B.labelSets.forEach((other, j) => {
      const both = one.length + other.filter((label) => !one.includes(label)).length
      fits[i * B.labelSets.length + j] = both <= most ? 1 : 0
    })
  })
  return fits
}

/** How many pairs are compatible. */
export function compatiblePairs(A: HalfList, B: HalfList, fits: Uint8Array): number {
  const [a, b] = [A, B].map(({ labelSets, labelSet }) => {
    const counts = new Float64Array(labelSets.length)
    for (const set of labelSet) counts[set]++
    return counts
  })
  let pairs = 0
  for (let i = 0; i < a.length; i++) for (let j = 0; j < b.length; j++) pairs += fits[i * b.length + j] * a[i] * b[j]
  return pairs
}

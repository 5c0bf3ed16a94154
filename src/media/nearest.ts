/**
 * The known names that a mistyped one may mean, the nearest first: the same letters in another case or order (GaAlAs for
 * AlGaAs), else at most one wrong letter in three. Ties keep the order of `known`.
 */
export function nearest(name: string, known: readonly string[]): string[] {
  const typed = name.toLowerCase()
  return known
    .map((candidate) => ({ candidate, distance: distance(typed, candidate.toLowerCase()) }))
    .filter(({ candidate, distance }) => distance <= candidate.length / 3)
    .sort((a, b) => a.distance - b.distance)
    .slice(0, 3)
    .map(({ candidate }) => candidate)
}

function distance(a: string, b: string): number {
  if (a === b) return 0
  if (sorted(a) === sorted(b)) return 0.5
  return edits(a, b)
}

function sorted(text: string): string {
  return [...text].sort().join('')
}

/** Levenshtein distance, one row at a time. */
function edits(a: string, b: string): number {
  let row = Array.from({ length: b.length + 1 }, (_, j) => j)
  for (let i = 1; i <= a.length; i++) {
    const next = [i]
    for (let j = 1; j <= b.length; j++) {
      const replaced = row[j - 1] + (a[i - 1] === b[j - 1] ? 0 : 1)
      next.push(Math.min(replaced, row[j] + 1, next[j - 1] + 1))
    }
    row = next
  }
  return row[b.length]
}

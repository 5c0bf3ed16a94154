/** A count as a person reads it: exact up to fifteen digits, a power of ten beyond. */
export function countText(count: number): string {
  return count < 1e15 ? count.toLocaleString('en-US').replaceAll(',', ' ') : count.toPrecision(3)
}

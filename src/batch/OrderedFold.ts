import type { UnitResult } from '../search/index.js'

/** Hands unit results on in the order of their numbers, whatever the order in which they come; each number once. */
export class OrderedFold {
  private readonly waiting = new Map<number, UnitResult>()
  private next = 0

  constructor(private readonly add: (result: UnitResult) => void) {}

  offer(result: UnitResult): void {
    if (this.has(result.unit)) return
    this.waiting.set(result.unit, result)
    for (let ready = this.waiting.get(this.next); ready; ready = this.waiting.get(this.next)) {
      this.waiting.delete(this.next)
      this.next++
      this.add(ready)
    }
  }

  has(unit: number): boolean {
    return unit < this.next || this.waiting.has(unit)
  }

  /** How many were offered. */
  get count(): number {
    return this.next + this.waiting.size
  }

  /** The numbers below `total` that were not offered, ascending. */
  *missing(total: number): Iterable<number> {
    for (let unit = this.next; unit < total; unit++) if (!this.has(unit)) yield unit
  }
}

import type { ComplexSweep } from './complexSweep.js'
import { hardWall } from './types.js'

/** Energies strictly inside (low, high) where a lead opens or closes. */
export function leadEdges(sweep: ComplexSweep, low: number, high: number): number[] {
  const { entry, exit } = sweep.system.stack
  const edges: number[] = []
  for (const m of exit === hardWall || exit === entry ? [entry] : [entry, exit]) {
    let a = low
    let b = high
    sweep.prepare(a, 0)
    const before = sweep.at.qRe[m] > 0
    sweep.prepare(b, 0)
    if (sweep.at.qRe[m] > 0 === before) continue
    for (;;) {
      const middle = 0.5 * (a + b)
      if (middle <= a || middle >= b || b - a < 1e-17 * high) break
      sweep.prepare(middle, 0)
      if (sweep.at.qRe[m] > 0 === before) a = middle
      else b = middle
    }
    if (a > low) edges.push(b)
  }
  return edges.sort((a, b) => a - b)
}

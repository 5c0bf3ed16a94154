import type { RandomStream } from '../growth/index.js'
import type { Examiner } from './Examiner.js'
import type { LowDiscrepancy } from './lowDiscrepancy.js'

/**
 * A short global phase: differential evolution (Storn and Price, J. Global Optim. 11, 341, 1997: rand/1/bin, from memory) on the
 * bound, over the places' numbers as coordinates in the unit cube, from a stretch of the low-discrepancy sequence that is the unit's
 * own. Returns the best stack. Costs size * (1 + generations) bounds.
 */
export function evolve(
  examiner: Examiner,
  sequence: LowDiscrepancy,
  unit: number,
  stream: RandomStream,
  size: number,
  generations: number,
): Int32Array {
  const { problem } = examiner
  const members = Array.from({ length: size }, (_, i) => memberAt(sequence.point(unit * size + i)))
  for (let generation = 0; generation < generations; generation++) {
    for (let i = 0; i < size; i++) {
      const [a, b, c] = others(size, i, stream).map((k) => members[k].at)
      const forced = stream.integer(sequence.dimensions)
      const at = members[i].at.map((value, d) => {
        const crossed = stream.uniform() < crossover || d === forced
        return crossed ? reflected(a[d] + weight * (b[d] - c[d])) : value
      })
      const trial = memberAt(at)
      if (trial.bound <= members[i].bound) members[i] = trial
    }
  }
  return members.reduce((best, member) => (member.bound < best.bound ? member : best)).stack

  function memberAt(at: Float64Array): Member {
    const choices = Int32Array.from(at, (value, d) => Math.floor(value * problem.places[d].choices))
    const stack = problem.repair(choices)
    return { at, stack, bound: examiner.bound(stack) }
  }
}

const weight = 0.6
const crossover = 0.7

interface Member {
  readonly at: Float64Array
  readonly stack: Int32Array
  readonly bound: number
}

/** Back into [0, 1) at the walls. */
function reflected(value: number): number {
  const inside = value < 0 ? -value : value >= 1 ? 2 - value : value
  return Math.min(Math.max(inside, 0), 1 - Number.EPSILON)
}

function others(size: number, i: number, stream: RandomStream): number[] {
  const chosen: number[] = []
  while (chosen.length < 3) {
    const k = stream.integer(size)
    if (k !== i && !chosen.includes(k)) chosen.push(k)
  }
  return chosen
}

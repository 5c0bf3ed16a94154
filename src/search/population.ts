import type { RandomStream } from '../growth/index.js'
import type { Examiner } from './Examiner.js'
import type { LowDiscrepancy } from './lowDiscrepancy.js'

/**
 * A short global phase: differential evolution (Storn and Price, J. Global Optim. 11, 341, 1997: rand/1/bin, from memory) over the
 * places' numbers as coordinates in the unit cube. It starts from the best of a stretch of the low-discrepancy sequence that is the
 * unit's own. Every other unit lets places of a family agree (a periodic structure: two numbers find the band of a long filter), of
 * the others one nearly so, one not at all. Returns the members, the best first. Costs draws + size * generations looks.
 */
export function evolve(examiner: Examiner, sequence: LowDiscrepancy, unit: number, stream: RandomStream): Int32Array[] {
  const { problem } = examiner
  const { draws, size, generations } = problem.boundGuides ? byBound : byMerit
  const own = freedom[unit % freedom.length]
  const drawn = Array.from({ length: draws }, (_, i) => memberAt(likened(sequence.point(unit * draws + i))))
  const members = drawn.sort((a, b) => a.guide - b.guide).slice(0, size)
  for (let generation = 0; generation < generations; generation++) {
    for (let i = 0; i < size; i++) {
      const [a, b, c] = others(size, i, stream).map((k) => members[k].at)
      const forced = stream.integer(sequence.dimensions)
      const at = members[i].at.map((value, d) => {
        const crossed = stream.uniform() < crossover || d === forced
        return crossed ? reflected(a[d] + weight * (b[d] - c[d])) : value
      })
      const trial = memberAt(at)
      if (trial.guide <= members[i].guide) members[i] = trial
    }
  }
  return members.sort((a, b) => a.guide - b.guide).map(({ stack }) => stack)

  function likened(point: Float64Array): Float64Array {
    const first = new Map<number, number>()
    return point.map((value, d) => {
      const { family } = problem.places[d]
      if (!first.has(family)) first.set(family, value)
      return (1 - own) * first.get(family)! + own * value
    })
  }

  function memberAt(at: Float64Array): Member {
    const choices = Int32Array.from(at, (value, d) => Math.floor(value * problem.places[d].choices))
    const stack = problem.repair(choices)
    return { at, stack, guide: examiner.guide(stack) }
  }
}

const byBound = { draws: 96, size: 48, generations: 12 }
/** Whole merits cost several bounds each. */
const byMerit = { draws: 48, size: 16, generations: 6 }

/** Share of a member's own coordinate against its family's. */
const freedom = [0, 0.1, 0, 1]

const weight = 0.6
const crossover = 0.7

interface Member {
  readonly at: Float64Array
  readonly stack: Int32Array
  readonly guide: number
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

import type { Job } from '../job/index.js'
import { buildSystem } from '../model/index.js'
import type { WaveSystem } from '../wave/index.js'
import { chainOf } from './chainOf.js'
import { countStacks, countsUpperBound } from './countStacks.js'
import { Lattice, type Stretch } from './Lattice.js'
import { canonicalOf } from './mirror.js'
import { needlesOf } from './needles.js'
import { notesOf } from './notesOf.js'
import { relaxed } from './relax.js'
import { repaired } from './repair.js'
import { stackId, stackText } from './stackName.js'
import type { Design, GrownLayer } from './types.js'

/**
 * The makeable stacks of a job: its structure unfolded, its free choices as numbered places. Throws DesignError where no stack is
 * makeable, and StackError or MaterialError where a medium of the job has no numbers at its conditions.
 */
export function designOf(job: Job): Design {
  const lattice = new Lattice(job)
  const { places, situations } = lattice
  return {
    places,
    situations,
    notes: [...notesOf(lattice), ...(countsUpperBound(lattice) ? [upperBoundNote] : [])],
    stackCount: () => countStacks(lattice),
    assignments: () => lattice.assignments(),
    feasible: (assignment) => lattice.feasible(assignment),
    repair: (assignment) => repaired(lattice, assignment),
    canonical: (assignment) => canonicalOf(lattice, assignment),
    layers: (assignment) => lattice.stretches(assignment).map(grownLayer),
    systems: (assignment) => systemsOf(lattice, lattice.stretches(assignment)),
    totalNm: (assignment) => lattice.stretches(assignment).reduce((sum, stretch) => sum + widthNm(stretch), 0),
    id: (assignment) => stackId(lattice, lattice.stretches(assignment)),
    text: (assignment) => stackText(lattice, lattice.stretches(assignment)),
    chain: () => chainOf(lattice),
    needles: (assignment) => needlesOf(lattice, assignment),
    relax: (assignment) => relaxed(lattice, assignment),
  }
}

const upperBoundNote =
  'The number of stacks is an upper bound: layers that could merge with a neighbour of the same medium or have no width count as apart, and so do widths that fall where they may not, and mirror images under counts of repetitions.'

function grownLayer(stretch: Stretch): GrownLayer {
  const { id, medium, count, slices, biased } = stretch
  const { choice, resolved, widths } = medium
  return { id, choice, resolved, count, stepNm: widths.stepNm, widthNm: widthNm(stretch), slices, biased }
}

function systemsOf({ situations }: Lattice, stretches: readonly Stretch[]): WaveSystem[] {
  const rows = stretches.map((stretch) => {
    const { medium, slices, biased } = stretch
    return { choice: medium.choice, widthNm: widthNm(stretch), slices, biased }
  })
  return situations.map((situation) => buildSystem(situation, rows))
}

function widthNm({ medium, count }: Stretch): number {
  return count * medium.widths.stepNm
}

import type { MediumChoice } from '../model/index.js'
import type { Lattice, Stretch } from './Lattice.js'

/**
 * The one of a stack and its mirror image that is listed (design 5): at the first place where the two differ, the thicker layer; same
 * widths: the larger x. The argument itself where reversal changes something, where it is the listed one, and where its mirror image
 * is not on the lattice.
 */
export function canonicalOf(lattice: Lattice, assignment: Int32Array): Int32Array {
  if (!lattice.reversible || !isBehind(lattice.stretches(assignment))) return assignment
  return mirrored(lattice, assignment) ?? assignment
}

/** The described layers that take a layer's place when the stack is reversed, one entry a slot. */
export function partners(lattice: Lattice, assignment: Int32Array): number[][] {
  const slots = lattice.slots(assignment)
  const found: number[][] = lattice.layers.map(() => [])
  slots.forEach(({ layer }, i) => {
    found[layer].push(slots[slots.length - 1 - i].layer)
  })
  return found
}

/** What two layers share may keep one of them from taking its place in the image. */
function isReversed(lattice: Lattice, assignment: Int32Array, image: Int32Array): boolean {
  const [ours, theirs] = [lattice.stretches(assignment), lattice.stretches(image).reverse()]
  return (
    ours.length === theirs.length &&
    ours.every(({ medium, count }, i) => {
      const other = theirs[i]
      return (
        medium.key === other.medium.key && count === other.count && medium.widths.stepNm === other.medium.widths.stepNm
      )
    })
  )
}

/** Whether the reversed stack is listed before this one. */
function isBehind(stretches: readonly Stretch[]): boolean {
  for (let i = 0, j = stretches.length - 1; j >= 0; i++, j--) {
    const [ours, theirs] = [stretches[i], stretches[j]]
    const thicker = ours.count * ours.medium.widths.stepNm - theirs.count * theirs.medium.widths.stepNm
    if (Math.abs(thicker) > sameNm) return thicker < 0
    const [a, b] = [ours.medium, theirs.medium]
    if (a.key === b.key) continue
    const [x, y] = [a, b].map(({ choice }) => rankOf(choice))
    return x === y ? a.key < b.key : x < y
  }
  return false
}

function rankOf(choice: MediumChoice): number {
  switch (choice.kind) {
    case 'material':
      return choice.x ?? 0
    case 'numbers':
      return choice.potentialEv
    case 'index':
      return choice.index
    case 'table':
      return 0
  }
}

const sameNm = 1e-9

function mirrored(lattice: Lattice, assignment: Int32Array): Int32Array | null {
  const cells = lattice.cells(assignment)
  // The counts of repetitions stay.
  const out = Int32Array.from(assignment)
  for (const [i, from] of partners(lattice, assignment).entries()) {
    if (from.length === 0) continue
    const layer = lattice.layers[i]
    const { medium, count } = cells[from[0]]
    const agree = from.every((other) => {
      const cell = cells[other]
      return (
        cell.medium.key === medium.key && cell.count === count && cell.medium.widths.stepNm === medium.widths.stepNm
      )
    })
    const own = agree ? layer.equalOf(medium) : null
    if (own === null || !layer.allows(own, count)) return null
    layer.writeMedium(own, out)
    layer.writeCount(own, count, out)
  }
  return lattice.feasible(out) && isReversed(lattice, assignment, out) ? out : null
}

import type { MediumChoice } from '../model/index.js'
import type { Lattice, Stretch } from './Lattice.js'
import type { Candidate, Cell } from './LayerLattice.js'

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

/**
 * An assignment of the reversed stack. Counts of repetitions may have to change places, and layers of no width may have to stand elsewhere:
 * every combination of counts is tried, as they stand first, and the reversed stretches are laid along its layers.
 */
function mirrored(lattice: Lattice, assignment: Int32Array): Int32Array | null {
  const wanted = lattice.stretches(assignment).reverse()
  for (const out of withCounts(lattice, assignment)) {
    const found = laid(lattice, wanted, out, (image) => isReversed(lattice, assignment, image))
    if (found !== null) return found
  }
  return null
}

/** More steps than this are not taken to lay a stack along its layers. */
const mostSteps = 20_000

/**
 * The first makeable assignment along whose layers these stretches stand, layers of no width between them, a stretch split among
 * neighbours of its medium where it must be; null where there is none, or none was found.
 */
function laid(
  lattice: Lattice,
  wanted: readonly Stretch[],
  start: Int32Array,
  accepted: (assignment: Int32Array) => boolean,
): Int32Array | null {
  const slots = lattice.slots(start)
  const given = new Map<number, Cell>()
  let steps = 0
  return place(0, 0, wanted[0]?.count ?? 0)

  /** The layers from `slot` on have to take `left` steps of stretch `next` and all behind it. */
  function place(slot: number, next: number, left: number): Int32Array | null {
    if (next < wanted.length && left === 0) return place(slot, next + 1, wanted[next + 1]?.count ?? 0)
    if (steps++ > mostSteps) return null
    if (slot === slots.length) return next === wanted.length ? finished() : null
    const { layer: i } = slots[slot]
    const known = given.get(i)
    if (known) {
      if (known.count === 0) return place(slot + 1, next, left)
      const fits = next < wanted.length && sameMedium(known.medium, wanted[next].medium) && known.count <= left
      return fits ? place(slot + 1, next, left - known.count) : null
    }
    const layer = lattice.layers[i]
    const own = next < wanted.length ? layer.equalOf(wanted[next].medium) : null
    if (own !== null) {
      // Whole first, so that nothing is split that need not be.
      for (let count = left; count > 0 && count >= own.widths.first; count--) {
        if (!layer.allows(own, count)) continue
        given.set(i, { medium: own, count })
        const found = place(slot + 1, next, left - count)
        if (found !== null) return found
      }
    }
    const here = layer.leastCount === 0 ? layer.medium(start) : null
    if (here !== null && layer.allows(here, 0)) {
      given.set(i, { medium: here, count: 0 })
      const found = place(slot + 1, next, left)
      if (found !== null) return found
    }
    given.delete(i)
    return null
  }

  function finished(): Int32Array | null {
    const out = Int32Array.from(start)
    for (const [i, { medium, count }] of given) {
      const layer = lattice.layers[i]
      layer.writeMedium(medium, out)
      layer.writeCount(medium, count, out)
    }
    return lattice.feasible(out) && accepted(out) ? out : null
  }
}

function sameMedium(a: Candidate, b: Candidate): boolean {
  return a.key === b.key && a.widths.stepNm === b.widths.stepNm
}

/** More combinations than this are not looked through: the counts stay. */
const mostCounts = 256

/** Copies of an assignment, its own counts of repetitions first. */
function* withCounts({ places, repeats }: Lattice, assignment: Int32Array): Iterable<Int32Array> {
  yield Int32Array.from(assignment)
  const first = places.length - repeats.length
  const all = repeats.reduce((product, { from, to }) => product * (to - from + 1), 1)
  if (repeats.length < 2 || all > mostCounts) return
  for (let n = 0; n < all; n++) {
    const out = Int32Array.from(assignment)
    let rest = n
    for (let r = 0; r < repeats.length; r++) {
      const choices = places[first + r].choices
      out[first + r] = rest % choices
      rest = Math.floor(rest / choices)
    }
    yield out
  }
}

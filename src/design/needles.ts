import { buildSystem } from '../model/index.js'
import type { WaveSystem } from '../wave/index.js'
import type { Lattice } from './Lattice.js'
import type { Candidate, Cell } from './LayerLattice.js'
import type { Needles } from './types.js'

/** Where a layer is cut by a needle: shares of its width in front of it. */
const cuts = [0.15, 0.3, 0.5, 0.7, 0.85]

/** A needle is as thin as can be made, else so thick (nm). */
const needleNm = 2

/** So many of the thinnest layers are tried to be left out. */
const mostRemoved = 4

/**
 * Every makeable way to put a thin layer into a stack, or to take a thin one out: stacks of another number of layers beside this one. A
 * needle of a neighbour's medium cuts a layer in two, and the layers between it and two neighbours of no width move up to make room.
 * With it comes the stack itself with needles of no width at all those places at once, so that one adjoint sweep has the slopes of all
 * (the needle variation of Tikhonravov, Trubetskov and DeBell, Appl. Opt. 35, 5493 (1996), from memory). Null where layers stand
 * several times or follow one another, where none may vanish, and under a bias.
 */
export function needlesOf(lattice: Lattice, assignment: Int32Array): Needles | null {
  const slots = lattice.slots(assignment)
  const once = slots.length === lattice.layers.length && slots.every(({ layer }, i) => layer === i)
  if (lattice.layers.some(({ tied }) => tied)) return null
  if (!once || lattice.layers.every(({ leastCount }) => leastCount > 0)) return null
  if (lattice.situations.some((situation) => situation.kind === 'electron' && situation.biasV !== 0)) return null
  const cells = lattice.cells(assignment)
  const rows: { readonly medium: Candidate; readonly widthNm: number }[] = []
  const needles: { readonly row: number; readonly assignment: Int32Array }[] = []
  cells.forEach(({ medium, count }, j) => {
    let from = 0
    const cut = (to: number) => {
      if (to > from) rows.push({ medium, widthNm: (to - from) * medium.widths.stepNm })
      from = to
    }
    for (const share of cuts) {
      const front = Math.round(share * count)
      if (front <= from || front >= count) continue
      for (const { medium: needle } of [cells[j - 1], cells[j + 1]].filter((cell) => cell !== undefined)) {
        const moved = needle.key === medium.key ? null : inserted(lattice, assignment, cells, j, front, needle)
        if (moved === null) continue
        cut(front)
        needles.push({ row: rows.push({ medium: needle, widthNm: 0 }) - 1, assignment: moved })
      }
    }
    cut(count)
  })
  const layers = rows.map(({ medium, widthNm }) => ({ choice: medium.choice, widthNm, slices: 1, biased: false }))
  const systems = lattice.situations.map((situation) => buildSystem(situation, layers))
  return {
    systems,
    directions: systems.map((system) => directionsOf(system, rows.length, needles)),
    inserted: needles.map((needle) => needle.assignment),
    removed: removals(lattice, assignment, cells),
  }
}

/** One variable a needle: its width. */
function directionsOf({ media }: WaveSystem, rows: number, needles: readonly { readonly row: number }[]): Float64Array {
  const stride = 1 + media.parameters
  const out = new Float64Array(needles.length * rows * stride)
  needles.forEach(({ row }, v) => {
    out[(v * rows + row) * stride] = 1
  })
  return out
}

/** The stack with layer j cut behind `front` steps; null where no two neighbours of no width make room, or a layer can't take its new medium or width. */
function inserted(
  lattice: Lattice,
  assignment: Int32Array,
  cells: readonly Cell[],
  j: number,
  front: number,
  needle: Candidate,
): Int32Array | null {
  const room = roomNear(cells, j)
  if (room === null) return null
  const { medium, count } = cells[j]
  const { gap, stepNm } = needle.widths
  const thin = gap > 0 ? gap : Math.max(1, Math.round(needleNm / stepNm))
  const cutUp: Cell[] = [
    { medium, count: front },
    { medium: needle, count: thin },
    { medium, count: count - front },
  ]
  const sequence = cells.flatMap((cell, i) => (i === room || i === room + 1 ? [] : i === j ? cutUp : [cell]))
  return written(lattice, assignment, sequence)
}

/** The first of the two neighbours of no width that are nearest to layer j; null without any. */
function roomNear(cells: readonly Cell[], j: number): number | null {
  let best: number | null = null
  for (let p = 0; p + 1 < cells.length; p++) {
    if (cells[p].count !== 0 || cells[p + 1].count !== 0 || p === j || p + 1 === j) continue
    if (best === null || Math.abs(p - j) < Math.abs(best - j)) best = p
  }
  return best
}

function removals(lattice: Lattice, assignment: Int32Array, cells: readonly Cell[]): Int32Array[] {
  const width = (i: number) => cells[i].count * cells[i].medium.widths.stepNm
  const thinnest = cells.map((_, i) => i).filter((i) => cells[i].count > 0)
  thinnest.sort((a, b) => width(a) - width(b) || a - b)
  return thinnest.slice(0, mostRemoved).flatMap((i) => {
    const sequence = cells.map((cell, k) => (k === i ? { ...cell, count: 0 } : cell))
    return written(lattice, assignment, sequence) ?? []
  })
}

function written(lattice: Lattice, assignment: Int32Array, sequence: readonly Cell[]): Int32Array | null {
  const out = Int32Array.from(assignment)
  for (const [i, { medium, count }] of sequence.entries()) {
    const layer = lattice.layers[i]
    const own = layer.equalOf(medium)
    if (own === null || !layer.allows(own, count)) return null
    layer.writeMedium(own, out)
    layer.writeCount(own, count, out)
  }
  return lattice.feasible(out) ? out : null
}

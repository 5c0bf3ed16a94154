import { buildSystem } from '../model/index.js'
import { hardWall } from '../wave/index.js'
import type { Lattice } from './Lattice.js'
import type { Cell, LayerLattice } from './LayerLattice.js'
import type { Chain } from './types.js'

/**
 * The lattice as a chain of independent layers. Null where layers depend on more than their own places (a bias falls over all of
 * them, a width or composition is that of another, a count of repetitions moves them, widths rise along them, their sum or strain is limited), where a medium absorbs or a stack is more
 * than one wave, and where they are too many to tabulate.
 */
export function chainOf(lattice: Lattice): Chain | null {
  const { layers, situations, repeats } = lattice
  if (layers.some(({ tied }) => tied)) return null
  if (repeats.length > 0 || lattice.limitsWholes) return null
  if (situations.some((situation) => situation.kind === 'electron' && situation.biasV !== 0)) return null
  if (layers.some((layer) => combinations(layer) > mostCells)) return null
  const cells: Cell[] = []
  const numbers = new Map<string, number>()
  const tables = layers.map((layer) => cellsOf(layer, lattice.places.length))
  const numbered = tables.map((table) => Int32Array.from(table, (cell) => (cell === null ? -1 : numberOf(cell))))
  if (cells.length > mostCells) return null
  const alloys = new Map<string, number>()
  const labels = Int32Array.from(cells, (cell) => {
    const alloy = lattice.compositions === null ? null : lattice.countedAlloy(cell)
    if (alloy === null) return -1
    if (!alloys.has(alloy)) alloys.set(alloy, alloys.size)
    return alloys.get(alloy)!
  })
  const rows = cells.map(({ medium, count }) => ({
    choice: medium.choice,
    widthNm: count * medium.widths.stepNm,
    slices: 1,
    biased: false,
  }))
  const systems = situations.map((situation) => buildSystem(situation, rows))
  const single = systems.every(
    ({ media, stack, beside, behind }) =>
      media.lossless && stack.exit !== hardWall && beside === undefined && behind === undefined,
  )
  if (!single) return null
  const links = lattice
    .slots(new Int32Array(lattice.places.length))
    .map(({ layer }) => ({ places: placesOf(layers[layer]), cells: numbered[layer] }))
  return { links, systems, labels, mostLabels: lattice.compositions ?? Number.POSITIVE_INFINITY }

  function numberOf(cell: Cell): number {
    const key = `${cell.medium.key} ${cell.count * cell.medium.widths.stepNm}`
    if (!numbers.has(key)) numbers.set(key, cells.push(cell) - 1)
    return numbers.get(key)!
  }
}

/** Cells of one layer, and of all. */
const mostCells = 20_000

function placesOf(layer: LayerLattice): Int32Array {
  return Int32Array.from(layer.places, (_, i) => layer.offset + i)
}

function combinations({ places }: LayerLattice): number {
  return places.reduce((product, { choices }) => product * choices, 1)
}

/** The cell of every combination of a layer's own choices, the last place fastest; null where it is none. */
function cellsOf(layer: LayerLattice, places: number): (Cell | null)[] {
  const assignment = new Int32Array(places)
  return Array.from({ length: combinations(layer) }, (_, n) => {
    let rest = n
    for (let i = layer.places.length - 1; i >= 0; i--) {
      const { choices } = layer.places[i]
      assignment[layer.offset + i] = rest % choices
      rest = Math.floor(rest / choices)
    }
    return layer.cell(assignment)
  })
}

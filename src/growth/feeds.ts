import type { Source } from '../job/index.js'
import type { MediumChoice } from '../model/index.js'

/** A cell that feeds a layer. */
export interface Feed {
  /** Its name; an element, or a medium by its numbers, where the job lists no cell for it. */
  readonly source: string
  /** Of the layer's width. */
  readonly share: number
  readonly rateMlPerS: number | null
}

/**
 * The cells that grow a medium, the first-named element first. An alloy of x is grown by those, one for each of its group III
 * elements, whose rates come nearest to x; a binary by the first cell of its element. Shares are x and 1 - x, whatever the rates.
 */
export function feedsOf(choice: MediumChoice, sources: readonly Source[]): readonly Feed[] {
  if (choice.kind === 'numbers') {
    const { potentialEv, massRel, alphaPerEv } = choice
    return [{ source: `medium ${potentialEv} ${massRel} ${alphaPerEv}`, share: 1, rateMlPerS: null }]
  }
  const [first, second] = groupThree(choice.material)
  const { x } = choice
  if (x === null) return [feed(cellsOf(first, sources)[0], 1)]
  let best: readonly [Cell, Cell] | null = null
  for (const a of cellsOf(first, sources)) {
    for (const b of cellsOf(second, sources)) {
      if (!best || distance(a, b, x) < distance(...best, x)) best = [a, b]
    }
  }
  return [feed(best![0], x), feed(best![1], 1 - x)]
}

/** Seconds per monolayer of a medium: the inverse of its cells' summed rate; null where the job does not give the rates. */
export function secondsPerMl(feeds: readonly Feed[]): number | null {
  let rate = 0
  for (const { rateMlPerS } of feeds) {
    if (rateMlPerS === null) return null
    rate += rateMlPerS
  }
  return 1 / rate
}

/** The first-named first; every material of the library has one, an alloy two. */
function groupThree(material: string): readonly string[] {
  return material.match(/Al|Ga|In/g)!
}

type Cell = { readonly name: string; readonly rateMlPerS: number | null }

/** The listed cells of an element, else one that has its name and no rate. */
function cellsOf(element: string, sources: readonly Source[]): readonly Cell[] {
  const listed = sources.filter((source) => source.element === element)
  return listed.length > 0 ? listed : [{ name: element, rateMlPerS: null }]
}

function distance(a: Cell, b: Cell, x: number): number {
  if (a.rateMlPerS === null || b.rateMlPerS === null) return 0
  return Math.abs(a.rateMlPerS / (a.rateMlPerS + b.rateMlPerS) - x)
}

function feed({ name, rateMlPerS }: Cell, share: number): Feed {
  return { source: name, share, rateMlPerS }
}

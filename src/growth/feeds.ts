import type { Kind, Source } from '../job/index.js'
import type { MediumChoice } from '../model/index.js'

/** A cell that feeds a layer. */
export interface Feed {
  /** Its name; an element, or a medium by its numbers, where the job lists no cell for it. */
  readonly source: string
  /** Of the layer's width. */
  readonly share: number
  /** ML/s; for light nm/s. Null where the job does not give it. */
  readonly rate: number | null
}

/**
 * The cells that grow a medium, the first-named element first. An alloy of x is grown by those, one for each of its group III
 * elements, whose rates come nearest to x; a binary by the first cell of its element. Shares are x and 1 - x, whatever the rates. A film
 * comes whole from the source of its name.
 */
export function feedsOf(choice: MediumChoice, kind: Kind, sources: readonly Source[]): readonly Feed[] {
  if (kind === 'light') return [filmFeed(choice, sources)]
  if (choice.kind === 'numbers') {
    const { potentialEv, massRel, alphaPerEv } = choice
    return [{ source: `medium ${potentialEv} ${massRel} ${alphaPerEv}`, share: 1, rate: null }]
  }
  if (choice.kind !== 'material') throw new TypeError(`A medium of light (${choice.kind}) is not grown of cells.`)
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

function filmFeed(choice: MediumChoice, sources: readonly Source[]): Feed {
  const listed = (name: string) => sources.find(({ element }) => element === name)
  const own = choice.kind === 'material' ? choice.own?.name : undefined
  const name =
    choice.kind === 'material'
      ? own !== undefined && listed(own)
        ? own
        : choice.material
      : (choice.name ?? (choice.kind === 'index' ? `medium ${choice.index} ${choice.extinction}` : 'medium'))
  return { source: name, share: 1, rate: listed(name)?.rate ?? null }
}

/** Seconds per monolayer (films: nm) of a medium: the inverse of its sources' summed rate; null where the job does not give the rates. */
export function secondsPerUnit(feeds: readonly Feed[]): number | null {
  let sum = 0
  for (const { rate } of feeds) {
    if (rate === null) return null
    sum += rate
  }
  return 1 / sum
}

/** The first-named first; every material of the library has one, an alloy two. */
function groupThree(material: string): readonly string[] {
  return material.match(/Al|Ga|In/g)!
}

type Cell = { readonly name: string; readonly rate: number | null }

/** The listed cells of an element, else one that has its name and no rate. */
function cellsOf(element: string, sources: readonly Source[]): readonly Cell[] {
  const listed = sources.filter((source) => source.element === element)
  return listed.length > 0 ? listed : [{ name: element, rate: null }]
}

function distance(a: Cell, b: Cell, x: number): number {
  if (a.rate === null || b.rate === null) return 0
  return Math.abs(a.rate / (a.rate + b.rate) - x)
}

function feed({ name, rate }: Cell, share: number): Feed {
  return { source: name, share, rate }
}

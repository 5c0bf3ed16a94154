import type { SearchChain, SearchPlace } from '../types.js'

/** One side of a cut: its links from the end to the cut, and the places that it alone depends on. */
export interface Half {
  readonly side: 'near' | 'far'
  readonly links: SearchChain['links']
  readonly places: readonly number[]
  /** Combinations of the choices of its places. */
  readonly size: number
}

/** A cut through the chain. Every stack is a choice of the common places and a pair of halves. */
export interface Split {
  /** Places on which both halves depend, and the combinations of their choices. */
  readonly common: readonly number[]
  readonly commons: number
  /** The half that slices divide, and the one that each of them holds whole. */
  readonly sliced: Half
  readonly held: Half
}

/**
 * The cut that costs least: tables of both halves for every choice of the common places, and the pairs. Null where a place decides
 * nothing in the chain, for then its choices are no halves' business, and where no held half is small enough.
 */
export function splitChain({ links }: SearchChain, places: readonly SearchPlace[]): Split | null {
  const used = new Set(links.flatMap(({ places: own }) => [...own]))
  if (places.some(({ choices }, place) => choices > 1 && !used.has(place))) return null
  let best: Split | null = null
  let least = Number.POSITIVE_INFINITY
  for (let cut = 0; cut <= links.length; cut++) {
    const near = new Set(links.slice(0, cut).flatMap(({ places: own }) => [...own]))
    const far = new Set(links.slice(cut).flatMap(({ places: own }) => [...own]))
    const common = [...near].filter((place) => far.has(place)).sort((a, b) => a - b)
    const nearHalf = half('near', links.slice(0, cut), near, far)
    const farHalf = half('far', links.slice(cut).reverse(), far, near)
    const commons = sizeOf(common)
    const tables = nearHalf.size * nearHalf.links.length + farHalf.size * farHalf.links.length
    const cost = commons * (tables * costOfLink + nearHalf.size * farHalf.size)
    const [sliced, held] = nearHalf.size >= farHalf.size ? [nearHalf, farHalf] : [farHalf, nearHalf]
    if (cost >= least || held.size > mostHeld) continue
    least = cost
    best = { common, commons, sliced, held }
  }
  return best

  function half(side: Half['side'], own: SearchChain['links'], mine: Set<number>, other: Set<number>): Half {
    const alone = [...mine].filter((place) => !other.has(place)).sort((a, b) => a - b)
    return { side, links: own, places: alone, size: sizeOf(alone) }
  }

  function sizeOf(list: readonly number[]): number {
    return list.reduce((product, place) => product * places[place].choices, 1)
  }
}

/** Halves whose tables fit into memory: some hundred megabytes. */
const mostHeld = 262_144

/** A link of a half in pairs. */
const costOfLink = 8

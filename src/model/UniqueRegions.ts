import type { Region } from './types.js'

/** Numbers regions so that equal ones share a number: few media make a fast spectrum. */
export class UniqueRegions {
  readonly regions: Required<Region>[] = []

  /** The number of a region that equals this one, adding it when it is new. */
  numberOf({ potentialEv, massRel, alphaPerEv = 0 }: Region): number {
    const { regions } = this
    for (let i = 0; i < regions.length; i++) {
      const known = regions[i]
      if (known.potentialEv === potentialEv && known.massRel === massRel && known.alphaPerEv === alphaPerEv) return i
    }
    return regions.push({ potentialEv, massRel, alphaPerEv }) - 1
  }
}

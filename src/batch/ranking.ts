import type { Design } from '../design/index.js'
import type { Yield } from '../growth/index.js'
import type { Found } from '../search/index.js'
import type { Score } from '../target/index.js'

/** A stack with what the list goes by. */
export interface Ranked {
  readonly found: Found
  readonly yield: Yield | null
}

export interface Listed extends Ranked {
  readonly rank: number
  readonly listedAs: 'best' | 'family'
}

/** At most so many best; and a list has up to half as many more of other families. */
export const mostListed = 256

/** How many first stacks of the order are grown on paper. */
export function grownFirst(effort: string): number {
  return effort === 'brief' ? 64 : 256
}

/** Trials of one stack: those of the job, but no more than 256 where the limits are unmet anyway or the run is brief. */
export function trialsOf(score: Score, trials: number, effort: string): number {
  return score.met && effort !== 'brief' ? trials : Math.min(trials, 256)
}

/** What a stack is like: layer count, and its media with their compositions. */
export function familyOf(design: Design, assignment: readonly number[]): string {
  const layers = design.layers(Int32Array.from(assignment))
  const media = layers.map(({ choice }) => JSON.stringify(choice))
  return JSON.stringify([layers.length, [...new Set(media)].sort()])
}

/** The best of each family after the first `candidates`, of families that those have not, up to half as many. */
export function familyHeads(design: Design, ordered: readonly Found[], candidates: number): Found[] {
  const known = new Set<string>()
  const heads: Found[] = []
  ordered.forEach((found, i) => {
    const family = familyOf(design, found.assignment)
    if (i >= candidates && !known.has(family)) heads.push(found)
    known.add(family)
  })
  return heads.slice(0, Math.floor(candidates / 2))
}

/**
 * The list (design 5): met before unmet, then yield where it counts, then the order, in which `ranked` comes. The first
 * `candidates`, then up to half as many best of other families.
 */
export function listOf(ranked: readonly Ranked[], design: Design, candidates: number, byYield: boolean): Listed[] {
  const sorted = ranked
    .map((one, order) => ({ ...one, order }))
    .sort(
      (a, b) =>
        Number(b.found.score.met) - Number(a.found.score.met) || (byYield ? yieldOrder(a, b) : 0) || a.order - b.order,
    )
  const families = new Set<string>()
  const best = sorted.slice(0, candidates)
  for (const { found } of best) families.add(familyOf(design, found.assignment))
  const others: Ranked[] = []
  for (const one of sorted.slice(candidates)) {
    if (others.length === Math.floor(candidates / 2)) break
    const family = familyOf(design, one.found.assignment)
    if (!families.has(family)) others.push(one)
    families.add(family)
  }
  return [
    ...best.map((one, i) => listed(one, i + 1, 'best' as const)),
    ...others.map((one, i) => listed(one, best.length + i + 1, 'family' as const)),
  ]
}

function listed({ found, yield: grown }: Ranked, rank: number, listedAs: 'best' | 'family'): Listed {
  return { found, yield: grown, rank, listedAs }
}

/** Greater share first, none last; as whole numbers, so that no rounding decides. */
function yieldOrder(a: Ranked, b: Ranked): number {
  if (a.yield === null || b.yield === null) return Number(a.yield === null) - Number(b.yield === null)
  return b.yield.passed * a.yield.trials - a.yield.passed * b.yield.trials
}

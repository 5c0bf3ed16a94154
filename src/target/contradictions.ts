import {
  type BlockDemand,
  type Demand,
  energiesAround,
  type Job,
  type PassDemand,
  type PeakDemand,
} from '../job/index.js'
import { hcEvNm } from '../media/index.js'

/** Demands that can't be met together. */
export interface Contradiction {
  /** Ids of the demands. */
  readonly demands: readonly string[]
  /** False where it rests on the shape that such a line usually has. */
  readonly certain: boolean
  /** What contradicts what, with the numbers, and what to change. */
  readonly sentence: string
}

/** Finds demands that contradict one another before a night is spent on them. What it does not find may still contradict. */
export function contradictions({
  kind,
  demands,
  resolutionEv,
}: Pick<Job, 'kind' | 'demands' | 'resolutionEv'>): Contradiction[] {
  const words = kind === 'electron' ? energies : wavelengths
  const peaks = demands.filter((demand): demand is PeakDemand => demand.kind === 'peak').map(lineOf)
  const passes = demands.filter((demand): demand is PassDemand => demand.kind === 'pass')
  const blocks = demands.filter((demand): demand is BlockDemand => demand.kind === 'block')
  return [
    ...passes.flatMap((pass) => blocks.filter(together(pass)).flatMap((block) => passInBlock(pass, block, words))),
    ...peaks.flatMap((peak) => passes.filter(together(peak.demand)).flatMap((pass) => lineInPass(peak, pass, words))),
    ...peaks.flatMap((peak) => lineAndBlocks(peak, blocks.filter(together(peak.demand)), resolutionEv ?? 0, words)),
    ...peaks.flatMap((peak, i) =>
      peaks
        .slice(i + 1)
        .filter(({ demand }) => together(peak.demand)(demand))
        .flatMap((other) => crowdedLines(peak, other, words)),
    ),
  ]
}

/** A peak in energies: where it may lie, and how wide it may be there (to first order for light). */
interface Line {
  readonly demand: PeakDemand
  readonly window: Range
  readonly fwhm: Range | null
}

function lineOf(demand: PeakDemand): Line {
  const { axis, centre, within, fwhm } = demand
  const window = energiesAround(demand, within)
  const scale = axis === 'eV' ? 1 : hcEvNm / (centre * centre)
  return { demand, window, fwhm: fwhm && [fwhm[0] * scale, fwhm[1] * scale] }
}

/** There is a condition at which both hold, of the same share. */
function together(one: Demand): (other: Demand) => boolean {
  return (other) => one.quantity === other.quantity && (one.at === null || other.at === null || one.at === other.at)
}

/** How places and widths are told. */
interface Words {
  place(ev: number): string
  range(range: Range): string
  /** A distance at an energy. */
  length(ev: number, at: number): string
}

const energies: Words = {
  place: (ev) => `${meV(ev)} meV`,
  range: ([low, high]) => `${meV(low)}..${meV(high)} meV`,
  length: (ev) => `${meV(ev)} meV`,
}

const wavelengths: Words = {
  place: (ev) => `${nm(ev)} nm`,
  range: ([low, high]) => `${nm(high)}..${nm(low)} nm`,
  length: (ev, at) => `${Number(((ev * hcEvNm) / (at * at)).toPrecision(3))} nm`,
}

/** Ranges are closed: a common end is a common energy. */
function passInBlock(pass: PassDemand, block: BlockDemand, words: Words): Contradiction[] {
  const low = Math.max(rangeOf(pass)[0], rangeOf(block)[0])
  const high = Math.min(rangeOf(pass)[1], rangeOf(block)[1])
  if (low > high || pass.above <= block.below) return []
  const where = low === high ? `At ${words.place(low)}` : `Over ${words.range([low, high])}`
  return [
    found(
      [pass, block],
      true,
      `${where} ${pass.quantity} can't be at least ${pass.above} and at most ${block.below}. Let the ranges end apart.`,
    ),
  ]
}

/** T is at most 1 at the peak, hence at most 1/2 at its half height, which is at most b away on either side. */
function lineInPass({ demand: peak, window, fwhm }: Line, pass: PassDemand, words: Words): Contradiction[] {
  if (fwhm === null || pass.above <= 0.5) return []
  const widest = fwhm[1]
  const [low, high] = rangeOf(pass)
  if (!(window[0] - widest >= low && window[1] + widest <= high)) return []
  return [
    found(
      [peak, pass],
      true,
      `A line at most ${words.length(widest, middle(window))} wide falls to half inside ${words.range([low, high])}, where ${pass.quantity} must be at least ` +
        `${pass.above}. Widen fwhm, or narrow the range.`,
    ),
  ]
}

/**
 * A Lorentzian of height h and full width a has T = h/(1 + (2 d/a)²) at a distance d, so a block at t keeps it
 * d >= (a/2) sqrt(h/t - 1) away. What all blocks leave of the peak's window is compared with nothing.
 */
function lineAndBlocks(
  { demand: peak, window, fwhm }: Line,
  blocks: readonly BlockDemand[],
  resolutionEv: number,
  words: Words,
): Contradiction[] {
  const { height } = peak
  if (height === null) return []
  const narrowest = fwhm?.[0] ?? 0
  const against = blocks.filter(({ below }) => below < height)

  // A line narrower than the resolution may stand in a block.
  const [covering] = against.filter((block) => rangeOf(block)[0] <= window[0] && rangeOf(block)[1] >= window[1])
  if (covering) {
    return [
      found(
        [peak, covering],
        narrowest > resolutionEv,
        `The peak lies within ${words.range(rangeOf(covering))}, where ${peak.quantity} must be at most ${covering.below}, but its height must be at ` +
          `least ${height}. Leave a gap of the block around the peak.`,
      ),
    ]
  }
  const distance = (below: number) => 0.5 * narrowest * Math.sqrt(height / below - 1)
  const zones = against.map((block): Range => {
    const [low, high] = rangeOf(block)
    return [low - distance(block.below), high + distance(block.below)]
  })
  if (leftOf(window, zones) > 0) return []
  const touching = against.filter((_, i) => zones[i][0] < window[1] && zones[i][1] > window[0])
  const needed = Math.max(...touching.map(({ below }) => distance(below)))
  return [
    found(
      [peak, ...touching],
      false,
      `A line at least ${height} high and ${words.length(narrowest, middle(window))} wide has tails (a Lorentzian's) that keep it ${words.length(needed, middle(window))} ` +
        `from a block at T = ${Math.min(...touching.map(({ below }) => below))}; no place within ${words.range(window)} ` +
        'is so far from the blocks. Allow a narrower line, move the ends of the blocks away, or block less.',
    ),
  ]
}

function crowdedLines(one: Line, two: Line, words: Words): Contradiction[] {
  const [low, high] = one.window[0] <= two.window[0] ? [one, two] : [two, one]
  const furthest = high.window[1] - low.window[0]
  const widths = 0.5 * ((one.fwhm?.[0] ?? 0) + (two.fwhm?.[0] ?? 0))
  // One maximum may serve both where their windows meet.
  if (high.window[0] <= low.window[1] || furthest >= widths) return []
  const at = middle([low.window[0], high.window[1]])
  return [
    found(
      [one.demand, two.demand],
      false,
      `The two peaks lie at most ${words.length(furthest, at)} apart, but lines so wide merge below ${words.length(widths, at)}. Allow narrower lines, ` +
        'or set the peaks further apart.',
    ),
  ]
}

function middle([low, high]: Range): number {
  return 0.5 * (low + high)
}

type Range = readonly [number, number]

function rangeOf({ pointsEv }: PassDemand | BlockDemand): Range {
  return [pointsEv[0], pointsEv[pointsEv.length - 1]]
}

/** The length of a window that no zone covers. */
function leftOf([low, high]: Range, zones: readonly Range[]): number {
  let left = 0
  let from = low
  for (const [start, end] of [...zones].sort((a, b) => a[0] - b[0])) {
    if (start > from) left += Math.min(start, high) - from
    from = Math.max(from, end)
    if (from >= high) return left
  }
  return left + high - from
}

function found(demands: readonly Demand[], certain: boolean, sentence: string): Contradiction {
  const ids = demands.map(({ id }) => id)
  const both = `${ids.slice(0, -1).join(', ')} and ${ids[ids.length - 1]}`
  return {
    demands: ids,
    certain,
    sentence: `${both} ${certain ? 'contradict' : 'seem to contradict'} one another. ${sentence}`,
  }
}

function meV(ev: number): string {
  return String(Number((1000 * ev).toPrecision(4)))
}

function nm(ev: number): string {
  return String(Number((hcEvNm / ev).toPrecision(4)))
}

import type { BlockDemand, Demand, Job, PassDemand, PeakDemand } from '../job/index.js'

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
export function contradictions({ demands, resolutionEv }: Pick<Job, 'demands' | 'resolutionEv'>): Contradiction[] {
  const peaks = demands.filter((demand): demand is PeakDemand => demand.kind === 'peak')
  const passes = demands.filter((demand): demand is PassDemand => demand.kind === 'pass')
  const blocks = demands.filter((demand): demand is BlockDemand => demand.kind === 'block')
  return [
    ...passes.flatMap((pass) => blocks.filter(together(pass)).flatMap((block) => passInBlock(pass, block))),
    ...peaks.flatMap((peak) => passes.filter(together(peak)).flatMap((pass) => lineInPass(peak, pass))),
    ...peaks.flatMap((peak) => lineAndBlocks(peak, blocks.filter(together(peak)), resolutionEv ?? 0)),
    ...peaks.flatMap((peak, i) =>
      peaks
        .slice(i + 1)
        .filter(together(peak))
        .flatMap((other) => crowdedLines(peak, other)),
    ),
  ]
}

/** There is a condition at which both hold. */
function together(one: Demand): (other: Demand) => boolean {
  return (other) => one.at === null || other.at === null || one.at === other.at
}

/** Ranges are closed: a common end is a common energy. */
function passInBlock(pass: PassDemand, block: BlockDemand): Contradiction[] {
  const low = Math.max(rangeOf(pass)[0], rangeOf(block)[0])
  const high = Math.min(rangeOf(pass)[1], rangeOf(block)[1])
  if (low > high || pass.above <= block.below) return []
  const where = low === high ? `At ${meV(low)} meV` : `From ${meV(low)} to ${meV(high)} meV`
  return [
    found(
      [pass, block],
      true,
      `${where} T can't be at least ${pass.above} and at most ${block.below}. Let the ranges end apart.`,
    ),
  ]
}

/** T is at most 1 at the peak, hence at most 1/2 at its half height, which is at most b away on either side. */
function lineInPass(peak: PeakDemand, pass: PassDemand): Contradiction[] {
  if (peak.fwhmEv === null || pass.above <= 0.5) return []
  const widest = peak.fwhmEv[1]
  const [low, high] = rangeOf(pass)
  const inside = peak.energyEv - peak.withinEv - widest >= low && peak.energyEv + peak.withinEv + widest <= high
  if (!inside) return []
  return [
    found(
      [peak, pass],
      true,
      `A line at most ${meV(widest)} meV wide falls to half inside ${meV(low)}..${meV(high)} meV, where T must be at least ` +
        `${pass.above}. Widen fwhm, or narrow the range.`,
    ),
  ]
}

/**
 * A Lorentzian of height h and full width a has T = h/(1 + (2 d/a)²) at a distance d, so a block at t keeps it
 * d >= (a/2) sqrt(h/t - 1) away. What all blocks leave of the peak's window is compared with nothing.
 */
function lineAndBlocks(peak: PeakDemand, blocks: readonly BlockDemand[], resolutionEv: number): Contradiction[] {
  const { height } = peak
  if (height === null) return []
  const narrowest = peak.fwhmEv?.[0] ?? 0
  const window: Range = [peak.energyEv - peak.withinEv, peak.energyEv + peak.withinEv]
  const against = blocks.filter(({ below }) => below < height)

  // A line narrower than the resolution may stand in a block.
  const [covering] = against.filter((block) => rangeOf(block)[0] <= window[0] && rangeOf(block)[1] >= window[1])
  if (covering) {
    const [low, high] = rangeOf(covering)
    return [
      found(
        [peak, covering],
        narrowest > resolutionEv,
        `The peak lies within ${meV(low)}..${meV(high)} meV, where T must be at most ${covering.below}, but its height must be at ` +
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
      `A line at least ${height} high and ${meV(narrowest)} meV wide has tails (a Lorentzian's) that keep it ${meV(needed)} meV ` +
        `from a block at T = ${Math.min(...touching.map(({ below }) => below))}; no place within ${meV(window[0])}..${meV(window[1])} meV ` +
        'is so far from the blocks. Allow a narrower line, move the ends of the blocks away, or block less.',
    ),
  ]
}

function crowdedLines(peak: PeakDemand, other: PeakDemand): Contradiction[] {
  const apart = Math.abs(peak.energyEv - other.energyEv)
  const windows = peak.withinEv + other.withinEv
  const widths = 0.5 * ((peak.fwhmEv?.[0] ?? 0) + (other.fwhmEv?.[0] ?? 0))
  // One maximum may serve both where their windows meet.
  if (apart <= windows || apart + windows >= widths) return []
  return [
    found(
      [peak, other],
      false,
      `The two peaks lie at most ${meV(apart + windows)} meV apart, but lines so wide merge below ${meV(widths)} meV. Allow narrower lines, ` +
        'or set the peaks further apart.',
    ),
  ]
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

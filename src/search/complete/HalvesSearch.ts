import type { Score } from '../../target/index.js'
import { discriminating } from '../discriminating.js'
import type { ChainMatrices, SearchChain, SearchProblem } from '../types.js'
import { AngleIndex } from './AngleIndex.js'
import { type Forced, forcedTransmission } from './forcedTransmission.js'
import { HalfList, rangeOf, type VectorTable, vectorTable, writeChoices } from './HalfVectors.js'
import { type PointTables, pointTables } from './PointTables.js'
import { type PairSample, samplePairs } from './samplePairs.js'
import type { Half, Split } from './splitChain.js'

/** The half that all slices of a common choice hold: its tables at the tabulated points, and at those of the cover, sorted for search. */
export interface HeldHalf {
  readonly common: number
  readonly list: HalfList
  readonly tables: readonly VectorTable[]
  readonly cover: readonly { readonly cosh: number; readonly table: VectorTable; readonly index: AngleIndex }[]
}

/**
 * What all slices of a search by halves share: the points that are tabulated, in the order in which they cut most, what they add, the
 * tables of the held half, and the cover that the start bound forces. A function of problem and start bound.
 */
export class HalvesSearch {
  /** What the bound adds for every stack: points without transmission. */
  readonly base: number
  readonly tables: readonly PointTables[]
  readonly matrices: ChainMatrices
  readonly coverMatrices: ChainMatrices
  /** For each point of the cover the greatest cosh(distance): stacks beyond it transmit less than the cover asks for. */
  readonly coverCosh: readonly number[]
  private lastHeld: HeldHalf | null = null

  constructor(
    readonly problem: SearchProblem,
    readonly chain: SearchChain,
    readonly split: Split,
    startBound: Score | null,
  ) {
    const { points } = chain
    const all = chain.matrices(points)
    const open = points.flatMap((_, p) => (all.far[p] > 0 ? [p] : []))
    this.base = points.reduce((sum, point, p) => sum + (all.far[p] > 0 ? 0 : point.square(0)), 0)
    const reach = startBound === null ? Number.POSITIVE_INFINITY : problem.reach(startBound)
    const missing = reach * reach - this.base
    const sample = samplePairs(chain, split, problem.places, sampledHalves)
    const cover = this.chooseCover(open, missing, all)
    const order = this.orderOf(sample, open, missing, all, cover)
    this.tables = order.map((p) => pointTables(points[p]))
    this.matrices = chain.matrices(order.map((p) => points[p]))
    this.coverMatrices = chain.matrices(cover.map(({ point }) => points[point]))
    this.coverCosh = cover.map(({ least }) => 2 / least - 1)
  }

  /** The held half for a choice of the common places, with its tables; the last one is kept. */
  heldHalf(common: number): HeldHalf {
    if (this.lastHeld?.common !== common) {
      const list = this.list(this.split.held, common, 0, this.split.held.size)
      const tables = this.tables.map((_, k) => filledTable(list, this.matrices, k))
      const cover = this.coverCosh.map((cosh, k) => {
        const table = filledTable(list, this.coverMatrices, k)
        return { cosh, table, index: new AngleIndex(table, list.count) }
      })
      this.lastHeld = { common, list, tables, cover }
    }
    return this.lastHeld
  }

  /** Combinations of a half from `from` to below `to`, for a choice of the common places. */
  list(half: Half, common: number, from: number, to: number): HalfList {
    const { places } = this.problem
    const choice = new Int32Array(places.length)
    writeChoices(common, this.split.common, places, choice)
    return new HalfList(half, places, this.chain.labels, choice, rangeOf(from, to))
  }

  /** The cover whose pairs, with the searches for them, cost least by a sample; none where looking at every pair costs less. */
  private chooseCover(open: readonly number[], missing: number, all: ChainMatrices): readonly Forced[] {
    const { chain, split, problem } = this
    const covers = forcedTransmission(chain.points, open, missing)
    const sample = samplePairs(chain, split, problem.places, coverHalves)[0]
    const sampled = sample.sliced.count * sample.held.count
    const coshes = new Map<number, Float64Array>()
    let best: readonly Forced[] = []
    let least = split.held.size
    if (split.sliced.size * split.held.size < worthSearching) return best
    for (const cover of covers) {
      let pairs = 0
      for (const { point, least: T } of cover) {
        if (!coshes.has(point)) coshes.set(point, coshesOf(sample, all, point))
        for (const cosh of coshes.get(point)!) if (cosh <= 2 / T - 1) pairs++
      }
      const cost = cover.length * costOfSearch + ((costOfPair * pairs) / sampled) * split.held.size
      if (cost < least) {
        least = cost
        best = cover
      }
    }
    return best
  }

  private orderOf(
    sample: readonly PairSample[],
    open: readonly number[],
    missing: number,
    all: ChainMatrices,
    cover: readonly Forced[],
  ): number[] {
    const rows: Float64Array[] = []
    const { points } = this.chain
    for (const pairs of sample) {
      const count = pairs.sliced.count * pairs.held.count
      const keep = new Uint8Array(count).fill(cover.length > 0 ? 0 : 1)
      for (const { point, least } of cover) {
        coshesOf(pairs, all, point).forEach((cosh, i) => {
          if (cosh <= 2 / least - 1) keep[i] = 1
        })
      }
      const kept = [...keep.keys()].filter((i) => keep[i] === 1)
      const stride = Math.max(1, Math.ceil((kept.length * sample.length) / orderPairs))
      const chosen = kept.filter((_, i) => i % stride === 0)
      const first = rows.length
      for (const _ of chosen) rows.push(new Float64Array(open.length))
      open.forEach((p, k) => {
        const [A, B] = [filledTable(pairs.sliced, all, p), filledTable(pairs.held, all, p)]
        chosen.forEach((i, s) => {
          const b = i % pairs.held.count
          const T = 2 / (1 + coshOf(A, (i - b) / pairs.held.count, B, b))
          rows[first + s][k] = points[p].square(T) + points[p].extreme(T)
        })
      })
    }
    const added = new Float64Array(rows.length * open.length)
    rows.forEach((row, s) => void added.set(row, s * open.length))
    const sums = rows.map((row) => row.reduce((sum, value) => sum + value, 0)).sort((a, b) => a - b)
    const wanted = Number.isFinite(missing) ? missing : (sums[Math.floor(sums.length / 50)] ?? 0)
    return discriminating(added, open.length, wanted, mostPoints).map((k) => open[k])
  }
}

/** Halves of either side in the samples for the order of points, and for the choice of a cover. */
const sampledHalves = 512
const coverHalves = 256

/** Pairs that the order of points goes by. */
const orderPairs = 768

/** Points that are tabulated. */
const mostPoints = 24

/** Pairs below which no range search is worth its index. */
export const worthSearching = 100_000

/** In pairs of the plain loop: a range search for one half, and a pair that one finds. */
const costOfSearch = 200
const costOfPair = 4

export function filledTable(list: HalfList, matrices: ChainMatrices, k: number): VectorTable {
  const table = vectorTable(list.count)
  list.fill(matrices, k, table)
  return table
}

/** Entry a * held + b: of every pair of a sample at a point; rounding aside. */
function coshesOf({ sliced, held }: PairSample, matrices: ChainMatrices, p: number): Float64Array {
  const [A, B] = [filledTable(sliced, matrices, p), filledTable(held, matrices, p)]
  const out = new Float64Array(sliced.count * held.count)
  for (let a = 0; a < sliced.count; a++) {
    for (let b = 0; b < held.count; b++) out[a * held.count + b] = coshOf(A, a, B, b)
  }
  return out
}

function coshOf(A: VectorTable, a: number, B: VectorTable, b: number): number {
  return Math.max(1, A.low[a] * B.low[b] + A.d[a] * B.d[b] + A.e[a] * B.e[b])
}

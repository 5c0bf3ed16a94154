import type { Score } from '../../target/index.js'
import { isNoisy } from './AngleIndex.js'
import { BestStacks } from './BestStacks.js'
import { type HalfList, type VectorTable, writeChoices } from './HalfVectors.js'
import { filledTable, type HalvesSearch, type HeldHalf, worthSearching } from './HalvesSearch.js'
import { compatible, compatiblePairs } from './labelSets.js'
import { PairTest } from './PairTest.js'
import { RemainingPairs } from './RemainingPairs.js'
import { mostMet, TooManyMet } from './TooManyMet.js'
import type { CompletePlan, SliceResult } from './types.js'

/** One slice of a search by halves; see runSlice. */
export class HalvesSlice {
  private readonly best: BestStacks
  private examined = 0
  private met = 0
  /** Makeable stacks, and those of them whose points were looked at. */
  private makeable = 0
  private compared = 0
  private readonly choice: Int32Array

  constructor(
    private readonly search: HalvesSearch,
    startBound: Score | null,
  ) {
    this.best = new BestStacks(search.problem, startBound)
    this.choice = new Int32Array(search.problem.places.length)
  }

  run(plan: CompletePlan, slice: number): SliceResult {
    const { split, coverCosh } = this.search
    const { size } = split.sliced
    // A row is a choice of the common places and one sliced half.
    const rows = split.commons * size
    const end = slice + 1 === plan.slices ? rows : Math.floor((rows / plan.slices) * (slice + 1))
    for (let row = Math.floor((rows / plan.slices) * slice); row < end; ) {
      const common = Math.floor(row / size)
      const next = Math.min(end, (common + 1) * size)
      const list = this.search.list(split.sliced, common, row - common * size, next - common * size)
      if (list.count * split.held.size < worthSearching) this.pointByPoint(common, list)
      else this.pairByPair(list, this.search.heldHalf(common))
      row = next
    }
    const pointTerms = this.compared - this.examined
    const cut: Record<string, number> =
      coverCosh.length > 0
        ? { 'transmission forced': this.makeable - this.compared, 'point terms': pointTerms }
        : { 'point terms': pointTerms }
    return { slice, found: this.best.found, examined: this.examined, cut }
  }

  /** Many pairs: tables at all points, and for each pair the points until it is cut. */
  private pairByPair(list: HalfList, held: HeldHalf): void {
    const { chain, matrices, coverMatrices, tables } = this.search
    const sliced = tables.map((_, k) => filledTable(list, matrices, k))
    const test = new PairTest(tables, sliced, held.tables)
    const fits = compatible(list, held.list, chain.mostLabels)
    this.makeable += compatiblePairs(list, held.list, fits)
    this.tighten(test)
    const common = held.common
    if (held.cover.length === 0) {
      this.compared += compatiblePairs(list, held.list, fits)
      test.everyPair(list, held.list, fits, (a, b) => this.examine(common, list, a, held.list, b, test))
      return
    }
    const covered = held.cover.map((_, k) => filledTable(list, coverMatrices, k))
    for (let k = 0; k < covered.length; k++) this.pairsAround(k, list, covered, held, test, fits)
  }

  /** The pairs that transmit at the k-th point of the cover and at none before it. */
  private pairsAround(
    k: number,
    list: HalfList,
    covered: readonly VectorTable[],
    { common, list: heldList, cover }: HeldHalf,
    test: PairTest,
    fits: Uint8Array,
  ): void {
    const { index, cosh, table } = cover[k]
    const { order, low, d, e, stretches, noisy } = index
    const sets = heldList.labelSets.length
    const { low: lowA, high: highA, d: dA, e: eA } = covered[k]
    const look = (a: number, b: number): void => {
      if (fits[list.labelSet[a] * sets + heldList.labelSet[b]] === 0) return
      for (let earlier = 0; earlier < k; earlier++) {
        if (lowerCosh(covered[earlier], a, cover[earlier].table, b) <= cover[earlier].cosh) return
      }
      this.compared++
      if (test.within(a, b, 0, 0, 0)) this.examine(common, list, a, heldList, b, test)
    }
    for (let a = 0; a < list.count; a++) {
      if (isNoisy(covered[k], a)) {
        for (let b = 0; b < heldList.count; b++) if (lowerCosh(covered[k], a, table, b) <= cosh) look(a, b)
        continue
      }
      const size = lowA[a]
      const x = dA[a]
      const y = eA[a]
      const used = index.search(0.5 * (size + highA[a]), x, y, cosh)
      for (let s = 0; s < used; s += 2) {
        for (let i = stretches[s]; i < stretches[s + 1]; i++) {
          if (size * low[i] + x * d[i] + y * e[i] <= cosh) look(a, order[i])
        }
      }
      for (let i = 0; i < noisy.length; i++) if (lowerCosh(covered[k], a, table, noisy[i]) <= cosh) look(a, noisy[i])
    }
  }

  /** Few pairs: each point for all of them, so that only points that are needed are tabulated. */
  private pointByPoint(common: number, A: HalfList): void {
    const { split, chain, matrices, tables } = this.search
    const B = this.search.list(split.held, common, 0, split.held.size)
    const fits = compatible(A, B, chain.mostLabels)
    const pairs = new RemainingPairs(A, B, fits)
    this.makeable += pairs.count
    this.compared += pairs.count
    for (let k = 0; k < tables.length && pairs.count > 0; k++) {
      const limit = this.limit
      pairs.add(tables[k], filledTable(A, matrices, k), filledTable(B, matrices, k), limit)
    }
    for (let i = 0; i < pairs.count; i++) this.examine(common, A, pairs.a[i], B, pairs.b[i], null)
  }

  /** The whole bound of a pair that the tabulated points leave, and the score where it is within reach. */
  private examine(common: number, A: HalfList, a: number, B: HalfList, b: number, test: PairTest | null): void {
    const { problem, split } = this.search
    const { choice, best } = this
    writeChoices(common, split.common, problem.places, choice)
    writeChoices(A.numbers[a], split.sliced.places, problem.places, choice)
    writeChoices(B.numbers[b], split.held.places, problem.places, choice)
    if (problem.bound(choice) > best.reach || problem.canonical(choice) !== choice) return
    const score = problem.score(choice)
    this.examined++
    if (score.met && ++this.met > mostMet) throw new TooManyMet(this.met)
    best.offer(choice, score)
    if (test) this.tighten(test)
  }

  private tighten(test: PairTest): void {
    test.limit = this.limit
  }

  private get limit(): number {
    const { reach } = this.best
    return reach * reach - this.search.base
  }
}

function lowerCosh(A: VectorTable, a: number, B: VectorTable, b: number): number {
  return A.low[a] * B.low[b] + A.d[a] * B.d[b] + A.e[a] * B.e[b]
}

import { discriminating } from './discriminating.js'
import { choicesNear, reachOf } from './neighbours.js'
import type { ChainPoint, SearchChain, SearchPlace, SearchProblem } from './types.js'

/** The chain that moves of a problem are priced by; null where its bound is read of none, or tells too little of the merit. */
export function pricedChain(problem: SearchProblem): SearchChain | null {
  const chain = problem.boundGuides ? problem.chain() : null
  return chain !== null && chain.labels.length * chain.points.length <= mostEntries ? chain : null
}

/** Matrices that are tabulated: some ten megabytes. */
const mostEntries = 1_000_000

/** A stack some places away, and what the points add to its merit squared at least. */
export interface PricedMove {
  readonly stack: Int32Array
  readonly square: number
}

/**
 * Prices the neighbours of a stack whose bound is read of a chain. Kept are the products left and right of every link, so that a
 * neighbour costs the links that move and those between, and only at so many points as it takes to exceed a limit, the most
 * discriminating first: thousands of neighbours for what some bounds cost.
 */
export class PricedMoves {
  /** So far, each of one neighbour at one point. */
  prices = 0
  /** In the order in which they are looked at. */
  private readonly points: readonly ChainPoint[]
  private readonly far: Float64Array
  /** Entry c * points + k: matrix c at the k-th point. */
  private readonly same: Float64Array
  private readonly down: Float64Array
  private readonly up: Float64Array
  /** Entry (link * points + k) * 4: the row before a link, the column from it on; real and imaginary part of either component. */
  private readonly rows: Float64Array
  private readonly columns: Float64Array
  /** For each link the row before it at the first points, of the neighbour in hand. */
  private readonly branches: readonly Float64Array[]
  /** Links that each place decides, ascending. */
  private readonly linksOf: readonly (readonly number[])[]
  /** Choices and matrices of the neighbour in hand; of the stack itself between calls. */
  private readonly choices: Int32Array
  private readonly cells: Int32Array
  /** 1 for the places that a price still chooses. */
  private readonly open: Uint8Array

  /** `around`: a stack whose neighbours tell which points discriminate. */
  constructor(
    private readonly chain: SearchChain,
    private readonly places: readonly SearchPlace[],
    around: Int32Array,
  ) {
    const { links, labels } = chain
    const count = chain.points.length
    this.far = new Float64Array(count)
    this.same = new Float64Array(labels.length * count)
    this.down = new Float64Array(labels.length * count)
    this.up = new Float64Array(labels.length * count)
    this.rows = new Float64Array(4 * (links.length + 1) * count)
    this.columns = new Float64Array(4 * (links.length + 1) * count)
    this.branches = Array.from({ length: links.length + 1 }, () => new Float64Array(4 * firstPoints))
    this.linksOf = places.map((_, place) => links.flatMap(({ places: own }, k) => (own.includes(place) ? [k] : [])))
    this.choices = new Int32Array(places.length)
    this.cells = new Int32Array(links.length)
    this.open = new Uint8Array(places.length)
    this.points = chain.points
    this.tabulate(chain.points.map((_, p) => p))
    const order = this.mostDiscriminating(around)
    this.points = order.map((p) => chain.points[p])
    this.tabulate(order)
  }

  /** The stacks with `together` places moved that add at most `limit`, at most `most` of them, the best first. */
  below(stack: Int32Array, together: number, limit: number, most: number): PricedMove[] {
    const { places } = this
    this.moveTo(stack)
    const reach = reachOf(places.length, together, mostOfKind[together - 1])
    const near = places.map((place, i) => choicesNear(place, stack[i], reach))
    const best = new BestMoves(limit, most)
    const moved: number[] = []
    const choose = (from: number): void => {
      if (moved.length === together) this.price(moved, near, best)
      else
        for (let place = from; place <= places.length - (together - moved.length); place++) {
          moved.push(place)
          choose(place + 1)
          moved.pop()
        }
    }
    if (reach > 0) choose(0)
    return best.moves
  }

  /** Prices every choice of the `moved` places among those `near`; all other places stay. */
  private price(moved: readonly number[], near: readonly number[][], best: BestMoves): void {
    const { branches, choices, cells, open, linksOf, far, points, columns } = this
    const links = moved.flatMap((place) => linksOf[place])
    if (links.length === 0) return
    const first = Math.min(...links)
    const last = Math.max(...links)
    const screened = Math.min(firstPoints, far.length)
    const walk = (link: number, row: Float64Array, from: number): void => {
      const next = link > last ? -1 : this.openPlace(link)
      if (next >= 0) {
        open[next] = 0
        const was = choices[next]
        for (const choice of near[next]) {
          choices[next] = choice
          walk(link, row, from)
        }
        choices[next] = was
        open[next] = 1
      } else if (link > last) {
        leaf(row, from)
      } else {
        const was = cells[link]
        cells[link] = this.cellOf(link)
        if (cells[link] >= 0) {
          this.pass(cells[link], row, from, branches[link + 1], 0, screened)
          walk(link + 1, branches[link + 1], 0)
        }
        cells[link] = was
      }
    }
    const leaf = (row: Float64Array, from: number): void => {
      let sum = 0
      let worst = 0
      const column = (last + 1) * far.length * 4
      for (let k = 0; k < far.length; k++) {
        const T =
          k < screened
            ? transmission(row, from + 4 * k, columns, column + 4 * k, far[k])
            : this.transmissionAt(first, last, k)
        sum += points[k].square(T)
        worst = Math.max(worst, points[k].extreme(T))
        if (sum + worst > best.limit) {
          this.prices += k + 1
          return
        }
      }
      this.prices += far.length
      best.add({ stack: Int32Array.from(choices), square: sum + worst })
    }
    for (const place of moved) open[place] = 1
    walk(first, this.rows, first * far.length * 4)
    for (const place of moved) open[place] = 0
  }

  /** A place that decides a link and is still to choose; -1 where there is none. */
  private openPlace(link: number): number {
    const { places } = this.chain.links[link]
    for (let i = 0; i < places.length; i++) if (this.open[places[i]] === 1) return places[i]
    return -1
  }

  /** With the matrices in hand from link `first` to link `last`, and those of the stack elsewhere. */
  private transmissionAt(first: number, last: number, k: number): number {
    const { rows, columns, cells, same, down, up, far } = this
    const count = far.length
    const from = 4 * (first * count + k)
    let a = rows[from]
    let f = rows[from + 1]
    let b = rows[from + 2]
    let g = rows[from + 3]
    for (let link = first; link <= last; link++) {
      const cell = cells[link] * count + k
      const c = same[cell]
      const right = down[cell]
      const left = up[cell]
      const a1 = c * a + left * b
      b = right * a + c * b
      a = a1
      const f1 = c * f + left * g
      g = right * f + c * g
      f = f1
    }
    const to = 4 * ((last + 1) * count + k)
    const real = a * columns[to] - f * columns[to + 1] + b * columns[to + 2] - g * columns[to + 3]
    const imaginary = a * columns[to + 1] + f * columns[to] + b * columns[to + 3] + g * columns[to + 2]
    return (4 * far[k]) / (real * real + imaginary * imaginary)
  }

  /** A row through a matrix, at the first `count` points. */
  private pass(matrix: number, row: Float64Array, from: number, out: Float64Array, to: number, count: number): void {
    const { same, down, up, far } = this
    let cell = matrix * far.length
    for (let k = 0; k < count; k++) {
      const c = same[cell]
      const right = down[cell]
      const left = up[cell]
      const a = row[from]
      const f = row[from + 1]
      const b = row[from + 2]
      const g = row[from + 3]
      out[to] = c * a + left * b
      out[to + 1] = c * f + left * g
      out[to + 2] = right * a + c * b
      out[to + 3] = right * f + c * g
      cell++
      from += 4
      to += 4
    }
  }

  /** Writes the products left and right of every link of a stack. */
  private moveTo(stack: Int32Array): void {
    const { chain, rows, columns, cells, far, same, down, up } = this
    const count = far.length
    const links = chain.links.length
    this.choices.set(stack)
    for (let k = 0; k < count; k++) {
      rows.set([1, 0, 0, -1], 4 * k)
      columns.set([1, 0, 0, far[k]], 4 * (links * count + k))
    }
    for (let link = 0; link < links; link++) {
      cells[link] = this.cellOf(link)
      this.pass(cells[link], rows, 4 * link * count, rows, 4 * (link + 1) * count, count)
    }
    for (let link = links - 1; link >= 0; link--) {
      let cell = cells[link] * count
      let from = 4 * (link + 1) * count
      let to = 4 * link * count
      for (let k = 0; k < count; k++) {
        const c = same[cell]
        const right = down[cell]
        const left = up[cell]
        columns[to] = c * columns[from] + right * columns[from + 2]
        columns[to + 1] = c * columns[from + 1] + right * columns[from + 3]
        columns[to + 2] = left * columns[from] + c * columns[from + 2]
        columns[to + 3] = left * columns[from + 1] + c * columns[from + 3]
        cell++
        from += 4
        to += 4
      }
    }
  }

  private cellOf(link: number): number {
    const { places, choices } = this
    const { places: own, cells } = this.chain.links[link]
    let index = 0
    for (let i = 0; i < own.length; i++) index = index * places[own[i]].choices + choices[own[i]]
    return cells[index]
  }

  /** Copies the matrices into an order of points. */
  private tabulate(order: readonly number[]): void {
    const { same, down, up, far } = this.chain.matrices(this.chain.points)
    const cells = this.chain.labels.length
    const count = order.length
    order.forEach((p, k) => {
      this.far[k] = far[p]
      for (let c = 0; c < cells; c++) {
        this.same[c * count + k] = same[p * cells + c]
        this.down[c * count + k] = down[p * cells + c]
        this.up[c * count + k] = up[p * cells + c]
      }
    })
  }

  /** All points, first those that tell the neighbours of a stack from it. */
  private mostDiscriminating(stack: Int32Array): number[] {
    const { places, choices, cells, linksOf, far, points } = this
    const count = far.length
    this.moveTo(stack)
    const at = (first: number, last: number) =>
      Float64Array.from(points, (point, k) => {
        const T = this.transmissionAt(first, last, k)
        return point.square(T) + point.extreme(T)
      })
    const missing = at(0, -1).reduce((sum, value) => sum + value, 0)
    const samples: Float64Array[] = []
    places.forEach((place, i) => {
      for (const choice of choicesNear(place, stack[i], sampledReach)) {
        choices[i] = choice
        for (const link of linksOf[i]) cells[link] = this.cellOf(link)
        if (linksOf[i].length > 0 && linksOf[i].every((link) => cells[link] >= 0)) {
          samples.push(at(linksOf[i][0], linksOf[i][linksOf[i].length - 1]))
        }
      }
      choices[i] = stack[i]
      for (const link of linksOf[i]) cells[link] = this.cellOf(link)
    })
    const added = new Float64Array(samples.length * count)
    samples.forEach((sample, s) => void added.set(sample, s * count))
    const order = discriminating(added, count, missing, orderedPoints)
    const chosen = new Set(order)
    return [...order, ...points.flatMap((_, p) => (chosen.has(p) ? [] : [p]))]
  }
}

/** The best of the moves within a limit, which tightens when there are enough of them. */
class BestMoves {
  moves: PricedMove[] = []

  constructor(
    public limit: number,
    private readonly most: number,
  ) {}

  add(move: PricedMove): void {
    const { moves, most } = this
    let at = moves.length
    while (at > 0 && moves[at - 1].square > move.square) at--
    moves.splice(at, 0, move)
    if (moves.length > most) moves.pop()
    if (moves.length === most) this.limit = Math.min(this.limit, moves[most - 1].square)
  }
}

function transmission(row: Float64Array, from: number, column: Float64Array, at: number, far: number): number {
  const a = row[from]
  const f = row[from + 1]
  const b = row[from + 2]
  const g = row[from + 3]
  const real = a * column[at] - f * column[at + 1] + b * column[at + 2] - g * column[at + 3]
  const imaginary = a * column[at + 1] + f * column[at] + b * column[at + 3] + g * column[at + 2]
  return (4 * far) / (real * real + imaginary * imaginary)
}

/** Points at which neighbours are looked at together, before those that are left are looked at one by one. */
const firstPoints = 4

/** Neighbours of each kind: those with one, two and three places moved. */
const mostOfKind = [1_000, 16_000, 48_000]

/** Points that are ordered by how much they discriminate. */
const orderedPoints = 24

/** Places move so far in the sample for the order of points. */
const sampledReach = 2

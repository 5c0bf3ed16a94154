import type { ChainMatrices, SearchPlace } from '../types.js'
import type { Half } from './splitChain.js'

/**
 * What a table of halves says at one abscissa: a point of the hyperbolic plane a half, as (size, d, e) with size² - d² - e² = 1 in
 * units of the near admittance. For a near half A and a far half B
 *
 *     cosh(distance) = size_A size_B + d_A d_B + e_A e_B        T = 2/(1 + cosh(distance)),
 *
 * the bilinear form of 1/T. `low` and `high` bound the size so that low_A low_B + ... and high_A high_B + ... enclose the exact value,
 * rounding of the matrices included: sizes grow like e^(2 kappa w), and between two opaque halves the form cancels.
 */
export interface VectorTable {
  readonly low: Float64Array
  readonly high: Float64Array
  readonly d: Float64Array
  readonly e: Float64Array
}

export function vectorTable(size: number): VectorTable {
  return {
    low: new Float64Array(size),
    high: new Float64Array(size),
    d: new Float64Array(size),
    e: new Float64Array(size),
  }
}

/** Some combinations of a half, as the numbers of their matrices; those without one are left out. */
export class HalfList {
  /** Numbers of the combinations that are left. */
  readonly numbers: Int32Array
  /** Entry i * links + k: the matrix of link k (from the end) of combination i of the list. */
  private readonly cells: Int32Array
  /** Distinct sets of labels in the list, ascending each, and the number of each combination's. */
  readonly labelSets: readonly (readonly number[])[]
  readonly labelSet: Int32Array

  /** `choice`: those of the common places are read; those of the half's own are written over. */
  constructor(
    private readonly half: Half,
    places: readonly SearchPlace[],
    labels: Int32Array,
    choice: Int32Array,
    combinations: Int32Array,
  ) {
    const links = half.links.length
    const numbers = new Int32Array(combinations.length)
    const cells = new Int32Array(combinations.length * links)
    const labelSet = new Int32Array(combinations.length)
    const sets = new Map<string, number>()
    const labelSets: number[][] = []
    let count = 0
    for (const number of combinations) {
      writeChoices(number, half.places, places, choice)
      const own = cells.subarray(count * links, (count + 1) * links)
      if (!writeCells(half, places, choice, own)) continue
      const found = labelsOf(own, labels)
      const key = found.join()
      if (!sets.has(key)) sets.set(key, labelSets.push(found) - 1)
      labelSet[count] = sets.get(key)!
      numbers[count++] = number
    }
    this.numbers = numbers.subarray(0, count)
    this.cells = cells.subarray(0, count * links)
    this.labelSet = labelSet.subarray(0, count)
    this.labelSets = labelSets
  }

  get count(): number {
    return this.numbers.length
  }

  /** Writes the table of this list at the p-th abscissa of `matrices`. */
  fill(matrices: ChainMatrices, p: number, out: VectorTable): void {
    const { same, down, up, far, angle } = matrices
    const { cells, count } = this
    const links = this.half.links.length
    const t = (p * same.length) / far.length
    // The near half is a row that meets its matrices from the left, the far half a column: up and down change their roles.
    const fromNear = this.half.side === 'near'
    const forward = fromNear ? down : up
    const back = fromNear ? up : down
    const start = fromNear ? -1 : far[p]
    const scale = fromNear ? 1 : 1 / far[p]
    const noise = ulp * (16 + 4 * angle[p])
    for (let i = 0; i < count; i++) {
      // First and second component of the real and of the imaginary vector, and a bound of their errors.
      let a = 1
      let b = 0
      let f = 0
      let g = start
      let error = 0
      for (let k = i * links; k < (i + 1) * links; k++) {
        const cell = t + cells[k]
        const c = same[cell]
        const right = forward[cell]
        const left = back[cell]
        const growth = Math.abs(c) + Math.max(Math.abs(right), Math.abs(left))
        error = growth * (error + noise * (Math.abs(a) + Math.abs(b) + Math.abs(f) + Math.abs(g)))
        const a1 = a * c + b * left
        b = a * right + b * c
        a = a1
        const f1 = f * c + g * left
        g = f * right + g * c
        f = f1
      }
      const first = (a * a + f * f) * scale
      const second = (b * b + g * g) * scale
      const N = 0.5 * (first + second)
      const sum = Math.abs(a) + Math.abs(b) + Math.abs(f) + Math.abs(g)
      // Three components, each off by the same, in both halves: see `low` and `high`; four leaves room for products of errors.
      const slack = 4 * (error * (2 * sum + error) * scale + 8 * ulp * N)
      if (slack > N / 32) {
        out.low[i] = 0
        out.high[i] = Number.POSITIVE_INFINITY
        out.d[i] = 0
        out.e[i] = 0
      } else {
        out.low[i] = N - slack
        out.high[i] = N + slack
        out.d[i] = 0.5 * (first - second)
        out.e[i] = (a * b + f * g) * scale
      }
    }
  }
}

const ulp = 1.2e-16

/** Writes the choices that a combination's number means into the places, the last place fastest. */
export function writeChoices(
  number: number,
  own: readonly number[],
  places: readonly SearchPlace[],
  out: Int32Array,
): void {
  let rest = number
  for (let i = own.length - 1; i >= 0; i--) {
    const { choices } = places[own[i]]
    out[own[i]] = rest % choices
    rest = Math.floor(rest / choices)
  }
}

/** False where a link has no matrix. */
function writeCells({ links }: Half, places: readonly SearchPlace[], choice: Int32Array, out: Int32Array): boolean {
  for (let k = 0; k < links.length; k++) {
    const { places: own, cells } = links[k]
    let index = 0
    for (let i = 0; i < own.length; i++) index = index * places[own[i]].choices + choice[own[i]]
    out[k] = cells[index]
    if (out[k] < 0) return false
  }
  return true
}

function labelsOf(cells: Int32Array, labels: Int32Array): number[] {
  const found: number[] = []
  for (const cell of cells) if (labels[cell] >= 0 && !found.includes(labels[cell])) found.push(labels[cell])
  return found.sort((a, b) => a - b)
}

export function rangeOf(from: number, to: number): Int32Array {
  return Int32Array.from({ length: to - from }, (_, i) => from + i)
}

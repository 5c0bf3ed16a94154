import type { VectorTable } from './HalfVectors.js'
import { exponentBand } from './PointTables.js'

/**
 * Points of the hyperbolic plane, sorted for range search: all that lie within a distance of a given point are among a few stretches
 * of the list. Bands of half an octave of cosh(rho), rho the distance from the origin; in each the points by their angle. By the law
 * of cosines two points within distance r differ in angle by at most delta,
 *
 *     sin²(delta/2) <= (cosh r - cosh(rho_a - rho_b)) / (2 sinh rho_a sinh rho_b),
 *
 * which stays exact where both are far out. Angles are counted as `diamond` numbers, 0 to 4.
 */
export class AngleIndex {
  /** Number of each point in the table, in the order of the list, and its lower size and direction. */
  readonly order: Int32Array
  readonly low: Float64Array
  readonly d: Float64Array
  readonly e: Float64Array
  /** Points whose rounding hides where they lie: within any distance of any point, for all one knows. */
  readonly noisy: Int32Array
  /** Stretches that the last `search` found: from, to, from, to, ... */
  readonly stretches: Int32Array
  private readonly angle: Float64Array
  private readonly bands: readonly Band[]

  constructor(table: VectorTable, count: number) {
    const points: { readonly i: number; readonly band: number; readonly angle: number; readonly size: number }[] = []
    const noisy: number[] = []
    for (let i = 0; i < count; i++) {
      const size = 0.5 * (table.low[i] + table.high[i])
      if (isNoisy(table, i)) noisy.push(i)
      else points.push({ i, band: exponentBand(size), angle: diamond(table.d[i], table.e[i]), size: Math.max(1, size) })
    }
    points.sort((a, b) => a.band - b.band || a.angle - b.angle || a.i - b.i)
    this.noisy = Int32Array.from(noisy)
    this.order = Int32Array.from(points, ({ i }) => i)
    this.low = Float64Array.from(points, ({ i }) => table.low[i])
    this.d = Float64Array.from(points, ({ i }) => table.d[i])
    this.e = Float64Array.from(points, ({ i }) => table.e[i])
    this.angle = Float64Array.from(points, ({ angle }) => angle)
    const bands: Band[] = []
    for (let from = 0; from < points.length; ) {
      let to = from
      let least = Number.POSITIVE_INFINITY
      let most = 1
      for (; to < points.length && points[to].band === points[from].band; to++) {
        least = Math.min(least, points[to].size)
        most = Math.max(most, points[to].size)
      }
      const sinh = Math.sqrt((least - 1) * (least + 1))
      bands.push({ from, to, size: most, sinh, inner: least + sinh, outer: most + Math.sqrt((most - 1) * (most + 1)) })
      from = to
    }
    this.bands = bands
    this.stretches = new Int32Array(4 * bands.length)
  }

  /**
   * Finds the stretches that hold every point within cosh(distance) <= `cosh` of a half (size, d, e) of the other side, whose direction
   * counts turned by half a turn. Returns how many numbers of `stretches` are used. The half must not be noisy.
   */
  search(size: number, d: number, e: number, cosh: number): number {
    const { stretches } = this
    const sinh = Math.sqrt(d * d + e * e)
    const far = size + sinh
    let used = 0
    for (const band of this.bands) {
      // Room for the rounding of points that are not noisy.
      const most = cosh * (1 + unsure) + unsure * size * band.size
      const ratio = far > band.outer ? far / band.outer : far < band.inner ? band.inner / far : 1
      const left = most - 0.5 * (ratio + 1 / ratio)
      if (left < 0) continue
      const square = left / (2 * sinh * band.sinh)
      if (!(square < 0.99)) {
        stretches[used++] = band.from
        stretches[used++] = band.to
        continue
      }
      const half = Math.sqrt(square)
      const cos = 1 - 2 * square
      const sin = 2 * half * Math.sqrt(1 - square)
      const x = -d / sinh
      const y = -e / sinh
      const from = turned(diamond(x * cos + y * sin, y * cos - x * sin) - padding)
      const to = turned(diamond(x * cos - y * sin, y * cos + x * sin) + padding)
      if (from <= to) used = this.add(band, from, to, used)
      else used = this.add(band, from, 4, this.add(band, 0, to, used))
    }
    return used
  }

  private add({ from, to }: Band, low: number, high: number, used: number): number {
    const { stretches } = this
    const first = this.firstFrom(from, to, low)
    const end = this.firstAbove(first, to, high)
    if (first === end) return used
    stretches[used] = first
    stretches[used + 1] = end
    return used + 2
  }

  /** The first of from..to whose angle is not below `angle`. */
  private firstFrom(from: number, to: number, angle: number): number {
    let low = from
    let high = to
    while (low < high) {
      const middle = (low + high) >> 1
      if (this.angle[middle] < angle) low = middle + 1
      else high = middle
    }
    return low
  }

  private firstAbove(from: number, to: number, angle: number): number {
    let low = from
    let high = to
    while (low < high) {
      const middle = (low + high) >> 1
      if (this.angle[middle] <= angle) low = middle + 1
      else high = middle
    }
    return low
  }
}

interface Band {
  readonly from: number
  readonly to: number
  /** Greatest cosh(rho), least sinh(rho), least and greatest e^rho. */
  readonly size: number
  readonly sinh: number
  readonly inner: number
  readonly outer: number
}

/** Relative rounding of a size below which a point is not noisy, times a few. */
const unsure = 1e-9
const padding = 1e-14

export function isNoisy({ low, high }: VectorTable, i: number): boolean {
  return !(high[i] - low[i] < 0.1 * unsure * high[i])
}

/** A monotone stand-in for the angle of (x, y): 0 to 4 in one turn; 0 at the origin. */
function diamond(x: number, y: number): number {
  const sum = Math.abs(x) + Math.abs(y)
  if (sum === 0) return 0
  if (y >= 0) return x >= 0 ? y / sum : 1 - x / sum
  return x < 0 ? 2 - y / sum : 3 + x / sum
}

function turned(angle: number): number {
  return angle < 0 ? angle + 4 : angle > 4 ? angle - 4 : angle
}

import type { ComplexSweep } from './complexSweep.js'
import { logSlope } from './logSlope.js'
import { mediaTable } from './mediaTable.js'
import { slopeInto } from './slope.js'
import type { Pole } from './types.js'

/** A maximum narrower than this (eV) is taken from its pole: energies as doubles can't resolve it. */
export const needleEv = 1e-11

/** A change of sign of g. */
export interface Turn {
  readonly energy: number
  readonly kind: 'maximum' | 'minimum'
  /** The pole of a maximum that is too narrow for doubles. */
  readonly needle: Pole | null
}

/** Width (eV) of the pieces that a stretch begins with, and how often one may be halved. */
const coarseEv = 0.04
const mostHalvings = 22
/** Of the five nodes of a piece, evenly spaced. */
const nodes = 5

/** A piece of b: its ends and b at five nodes. */
interface Piece {
  readonly start: number
  readonly end: number
  readonly b: readonly number[]
  readonly level: number
}

/**
 * The zeros of g = b + poles between two neighbouring lead edges. b is taken at five nodes a piece and interpolated by a polynomial of
 * fourth degree; how far one of second degree is off at the nodes between bounds its error. g is scanned at multiples of every pole's
 * width, at the price of the pole terms only. Wherever g turns back nearer to zero than that error a pair of zeros may hide, or be none:
 * such a piece is halved, and so is one whose error is not small, or whose zero does not come out of the true g when it is polished: the
 * interpolation is shifted by its error at the last point and solved again, which converges in two or three sweeps.
 */
export class Stretch {
  /** Leads that open at the lower end: T rises from it like (E - end)^(leads/2). */
  private readonly opening: number
  /** The ends, a little inwards where a lead opens or closes there and g is infinite. */
  readonly first: number
  readonly last: number

  constructor(
    private readonly sweep: ComplexSweep,
    private readonly poles: readonly Pole[],
    private readonly low: number,
    high: number,
  ) {
    this.opening = this.leadsAtEdge(low)
    this.first = this.opening > 0 ? low + 1e-9 * (high - low) : low
    this.last = this.leadsAtEdge(high) > 0 ? high - 1e-9 * (high - low) : high
  }

  /** Every turn, ascending. */
  turns(): Turn[] {
    const { first, last } = this
    const count = Math.max(1, Math.ceil((last - first) / coarseEv))
    const ends = Array.from({ length: count + 1 }, (_, i) =>
      i === count ? last : first + ((last - first) * i) / count,
    )
    const turns: Turn[] = []
    let open = this.pieces(ends.slice(1).map((end, i) => ({ start: ends[i], end, known: null, level: 0 })))
    while (open.length > 0) {
      const halves: Draft[] = []
      for (const piece of open) {
        const inside = this.turnsOf(piece)
        if (inside !== null) turns.push(...inside)
        else halves.push(...halvesOf(piece))
      }
      open = this.pieces(halves)
    }
    return turns.sort((a, b) => a.energy - b.energy)
  }

  /** How many leads have their edge at an end; g is infinite there. */
  private leadsAtEdge(end: number): number {
    const { sweep } = this
    const { entry, exit } = sweep.system.stack
    sweep.prepare(end, 0)
    const { qRe } = sweep.at
    return (qRe[entry] > 1e-12 ? 0 : 1) + (qRe[exit] > 1e-12 ? 0 : 1)
  }

  /** Fills in what is not known of b, all in one sweep. */
  private pieces(drafts: readonly Draft[]): Piece[] {
    const energies: number[] = []
    for (const { start, end, known } of drafts) {
      for (let i = 0; i < nodes; i++) if (known === null || i % 2 === 1) energies.push(nodeAt(start, end, i))
    }
    const values = this.slopes(energies)
    let next = 0
    return drafts.map(({ start, end, known, level }) => {
      const b = Array.from({ length: nodes }, (_, i) => {
        if (known !== null && i % 2 === 0) return known[i / 2]
        const value = values[next] - this.knownTerms(energies[next])
        next++
        return value
      })
      return { start, end, b, level }
    })
  }

  /** g at some energies. */
  private slopes(energies: readonly number[]): Float64Array {
    const points = energies.length
    const g = new Float64Array(points)
    if (points === 0) return g
    const { media, stack } = this.sweep.system
    const table = mediaTable(media, points)
    const slope = mediaTable(media, points)
    const at = Float64Array.from(energies)
    media.fill(at, table)
    media.fillSlope(at, slope)
    const T = new Float64Array(points)
    slopeInto(table, slope, stack, { T, dTdE: g })
    for (let e = 0; e < points; e++) g[e] = T[e] > 1e-290 ? g[e] / T[e] : logSlope(this.sweep, energies[e])
    return g
  }

  /** What the poles, and the leads that open at the lower end, put into g. */
  private knownTerms(x: number): number {
    let sum = this.opening > 0 ? (0.5 * this.opening) / (x - this.low) : 0
    for (const pole of this.poles) {
      const d = x - pole.energyEv
      const h = 0.5 * pole.widthEv
      sum -= (2 * d) / (d * d + h * h)
    }
    return sum
  }

  private model(x: number, piece: Piece): number {
    return interpolated(x, piece) + this.knownTerms(x)
  }

  /** The turns inside a piece; null where it is too coarse to tell. */
  private turnsOf(piece: Piece): Turn[] | null {
    const { start, end, b, level } = piece
    const length = end - start
    const error = Math.max(
      Math.abs(b[1] - 0.125 * (3 * b[0] + 6 * b[2] - b[4])),
      Math.abs(b[3] - 0.125 * (3 * b[4] + 6 * b[2] - b[0])),
    )
    const last = level >= mostHalvings
    if (!last && error * length > smoothness) return null
    const points = this.scanPoints(start, end)
    const g = points.map((x) => this.model(x, piece))
    if (!last && error * length > resolved && mayHide(points, g, error)) return null
    const turns: Turn[] = []
    for (let i = 1; i < points.length; i++) {
      if (g[i] < 0 === g[i - 1] < 0 || Math.max(Math.abs(g[i]), Math.abs(g[i - 1])) * length < flat) continue
      const kind = g[i - 1] > 0 ? 'maximum' : 'minimum'
      const needle = kind === 'maximum' ? this.needleIn(points[i - 1], points[i]) : null
      const polished = needle ? needle.energyEv : this.polish(points[i - 1], points[i], piece)
      if (polished === null && !last) return null
      const energy = polished ?? this.bisected(points[i - 1], points[i])
      if (energy !== null) turns.push({ energy, kind, needle })
    }
    return turns
  }

  private scanPoints(start: number, end: number): Float64Array {
    const points: number[] = []
    const length = end - start
    for (let i = 0; i <= evenly; i++) points.push(i === evenly ? end : start + (length * i) / evenly)
    for (const { energyEv, widthEv } of this.poles) {
      // A pole far off adds nothing that the even points do not show.
      const distance = Math.max(start - energyEv, energyEv - end, 0)
      if (distance > length) continue
      for (let d = Math.max(widthEv / 16, needleEv, 1e-14 * energyEv); d < length + distance; d *= 1.5) {
        if (d < distance) continue
        if (energyEv - d > start && energyEv - d < end) points.push(energyEv - d)
        if (energyEv + d > start && energyEv + d < end) points.push(energyEv + d)
      }
    }
    return Float64Array.from(points).sort()
  }

  private needleIn(x0: number, x1: number): Pole | null {
    for (const pole of this.poles) {
      if (pole.widthEv < needleEv && pole.energyEv >= x0 && pole.energyEv <= x1) return pole
    }
    return null
  }

  /** Zero of the true g from a bracket of the model's sign change; null where it is not there. */
  private polish(x0: number, x1: number, piece: Piece): number | null {
    let x = this.solve(x0, x1, piece, 0)!
    let before = Infinity
    for (let i = 0; i < 10; i++) {
      const error = logSlope(this.sweep, x) - this.model(x, piece)
      const next = this.solve(x0, x1, piece, error)
      if (next === null) return null
      const step = Math.abs(next - x)
      x = next
      if (step < 4e-16 * x || (step < 1e-12 * x && step > 0.25 * before)) return x
      before = step
    }
    return null
  }

  /** Zero of the true g by bisection; null where its ends have one sign. */
  private bisected(x0: number, x1: number): number | null {
    const falling = logSlope(this.sweep, x0) > 0
    if (logSlope(this.sweep, x1) > 0 === falling) return null
    let a = x0
    let b = x1
    for (;;) {
      const middle = 0.5 * (a + b)
      if (middle <= a || middle >= b) return middle
      if (logSlope(this.sweep, middle) > 0 === falling) a = middle
      else b = middle
    }
  }

  /** Zero of model + shift between x0 and x1, by bisection to the last bit; null where it has no change of sign. */
  private solve(x0: number, x1: number, piece: Piece, shift: number): number | null {
    let a = x0
    let b = x1
    const falling = this.model(a, piece) + shift > 0
    if (this.model(b, piece) + shift > 0 === falling) return null
    for (;;) {
      const middle = 0.5 * (a + b)
      if (middle <= a || middle >= b) return middle
      if (this.model(middle, piece) + shift > 0 === falling) a = middle
      else b = middle
    }
  }
}

/** A piece with b known at its ends and middle, or nowhere. */
interface Draft {
  readonly start: number
  readonly end: number
  readonly known: readonly [number, number, number] | null
  readonly level: number
}

/** Error of b times the length of a piece: what it could change ln T by. */
const smoothness = 0.05
/** Below this a pair of zeros changes ln T by nothing that is asked for; and below that g is rounding noise. */
const resolved = 1e-10
const flat = 1e-13
/** Even points of a scan. */
const evenly = 8
/** Where g turns back this many errors from zero, it does not reach it. */
const margin = 2

function halvesOf({ start, end, b, level }: Piece): Draft[] {
  const middle = nodeAt(start, end, 2)
  return [
    { start, end: middle, known: [b[0], b[1], b[2]], level: level + 1 },
    { start: middle, end, known: [b[2], b[3], b[4]], level: level + 1 },
  ]
}

function nodeAt(start: number, end: number, i: number): number {
  return i === nodes - 1 ? end : start + (end - start) * (i / (nodes - 1))
}

/** The polynomial of fourth degree through the five nodes (Newton's differences). */
function interpolated(x: number, { start, end, b }: Piece): number {
  const t = (4 * (x - start)) / (end - start)
  const d1 = b[1] - b[0]
  const d2 = b[2] - 2 * b[1] + b[0]
  const d3 = b[3] - 3 * b[2] + 3 * b[1] - b[0]
  const d4 = b[4] - 4 * b[3] + 6 * b[2] - 4 * b[1] + b[0]
  return b[0] + t * (d1 + ((t - 1) / 2) * (d2 + ((t - 2) / 3) * (d3 + ((t - 3) / 4) * d4)))
}

/** Whether g turns back so near to zero that a pair of its zeros may be hidden, or be none. */
function mayHide(x: Float64Array, g: Float64Array, error: number): boolean {
  for (let i = 1; i + 1 < g.length; i++) {
    const before = g[i] - g[i - 1]
    const after = g[i + 1] - g[i]
    if (before * after > 0) continue
    if (Math.abs(g[i]) <= margin * error) return true
    // The parabola through the three: its vertex may lie on the other side of zero.
    const h0 = x[i] - x[i - 1]
    const h1 = x[i + 1] - x[i]
    const curve = (after / h1 - before / h0) / (h0 + h1)
    if (curve === 0) continue
    const slope = (before / h0) * (h1 / (h0 + h1)) + (after / h1) * (h0 / (h0 + h1))
    const vertex = g[i] - (slope * slope) / (4 * curve)
    const towardsZero = g[i] > 0 === curve > 0
    if (towardsZero && (vertex > 0 !== g[i] > 0 || Math.abs(vertex) <= margin * error)) return true
  }
  return false
}

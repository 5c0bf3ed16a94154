import type { ComplexSweep, Continuation } from './complexSweep.js'
import { atan2 } from './elementary.js'

/** A rectangle of complex energies, eV. */
export interface Box {
  readonly left: number
  readonly right: number
  readonly bottom: number
  readonly top: number
}

/** Largest turn of F between neighbouring points, and how well it must agree with what F'/F says at both, radians. */
const widestTurn = 1.2
const agreement = 0.35
const mostSplits = 48

/**
 * No piece of the rim is longer than this share of the box's shorter side: between points farther apart two zeros just off the rim turn F
 * once around, which neither the turn nor the slopes at the ends show.
 */
const coarsest = 0.25

/**
 * The number of zeros of F inside a box by the argument principle: the turns of F around its rim over 2 pi. F must be analytic inside;
 * a lead's edge may lie on the rim. Each side is halved until F turns little between neighbouring points and F'/F at both agrees, so that
 * no whole turn can hide between them. Null where a zero lies on the rim as far as doubles can tell.
 */
export function windingNumber(
  sweep: ComplexSweep,
  branch: Continuation,
  { left, right, bottom, top }: Box,
): number | null {
  const rim = new Rim(sweep, branch, coarsest * Math.min(right - left, top - bottom))
  const corners = [
    [left, bottom],
    [right, bottom],
    [right, top],
    [left, top],
    [left, bottom],
  ]
  let turned = 0
  for (let i = 1; i < corners.length; i++) {
    const side = rim.turn(corners[i - 1], corners[i])
    if (side === null) return null
    turned += side
  }
  const count = turned / (2 * Math.PI)
  const whole = Math.round(count)
  return Math.abs(count - whole) < 0.05 ? whole : null
}

/** F at a point of the rim, and d ln F/dE. */
interface Point {
  readonly x: number
  readonly y: number
  readonly re: number
  readonly im: number
  readonly slopeRe: number
  readonly slopeIm: number
}

class Rim {
  constructor(
    private readonly sweep: ComplexSweep,
    private readonly branch: Continuation,
    private readonly longest: number,
  ) {}

  turn([x0, y0]: readonly number[], [x1, y1]: readonly number[]): number | null {
    return this.between(this.at(x0, y0), this.at(x1, y1), 0)
  }

  private between(a: Point | null, b: Point | null, splits: number): number | null {
    if (a === null || b === null) return null
    const dx = b.x - a.x
    const dy = b.y - a.y
    const turned = atan2(a.re * b.im - a.im * b.re, a.re * b.re + a.im * b.im)
    const before = a.slopeRe * dy + a.slopeIm * dx
    const after = b.slopeRe * dy + b.slopeIm * dx
    const safe =
      Math.abs(dx) + Math.abs(dy) < this.longest &&
      Math.abs(turned) < widestTurn &&
      Math.abs(before - turned) < agreement &&
      Math.abs(after - turned) < agreement
    if (safe) return turned
    // At a lead's edge the slope is infinite and F finite: a piece that short turns as its ends say.
    if (splits > mostSplits) return Math.abs(turned) < widestTurn ? turned : null
    const middle = this.at(a.x + 0.5 * dx, a.y + 0.5 * dy)
    const first = this.between(a, middle, splits + 1)
    const second = first === null ? null : this.between(middle, b, splits + 1)
    return first === null || second === null ? null : first + second
  }

  private at(x: number, y: number): Point | null {
    this.sweep.evaluate(x, y, this.branch)
    const [re, im, dRe, dIm] = this.sweep.out
    const size = re * re + im * im
    if (!(size > 0 && size < Infinity)) return null
    return { x, y, re, im, slopeRe: (dRe * re + dIm * im) / size, slopeIm: (dIm * re - dRe * im) / size }
  }
}

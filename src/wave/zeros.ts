import type { ComplexSweep, Continuation } from './complexSweep.js'

/** Zeros of F in one stretch between lead edges, found one by one: those already known are divided out of F. */
export class Zeros {
  readonly re: number[] = []
  readonly im: number[] = []

  /** A start is given up outside [lowest - margin, highest + margin] x [-3, 2] depth. */
  constructor(
    readonly sweep: ComplexSweep,
    readonly branch: Continuation,
    readonly lowest: number,
    readonly highest: number,
    readonly depth: number,
  ) {}

  /**
   * Newton on F/product(E - known), that is with 1/(F'/F - sum 1/(E - known)), from re + i im. Adds the zero that it
   * reaches and says whether it reached a new one.
   */
  search(re: number, im: number): boolean {
    const { sweep, branch, depth } = this
    const left = this.lowest - 2 * depth
    const right = this.highest + 2 * depth
    let x = re
    let y = im
    let before = Infinity
    for (let i = 0; i < 60; i++) {
      if (!this.step(sweep, branch, x, y)) return false
      let sx = this.stepRe
      let sy = this.stepIm
      const size = Math.sqrt(sx * sx + sy * sy)
      if (!(size < Infinity)) return false
      if (size > 2 * depth) {
        sx *= (2 * depth) / size
        sy *= (2 * depth) / size
      }
      x -= sx
      y -= sy
      const scale = Math.abs(x)
      // Quadratic convergence: the next step would be about size (size/before)². One step alone says nothing of that.
      const ratio = before < Infinity ? size / before : 1
      const rounding = 2e-16 * scale
      if (size <= rounding || (size < 1e-3 * depth && ratio < 0.1 && size * ratio * ratio < 0.1 * rounding)) {
        return this.add(x, y)
      }
      if (size < 1e-12 * scale && ratio > 0.3) return this.add(x, y)
      if (x < left || x > right || y < -3 * depth || y > 2 * depth) return false
      before = size
    }
    return false
  }

  /** Length of the Newton step from re + i im: about the distance of the nearest zero not yet known. */
  near(re: number, im: number): number {
    if (!this.step(this.sweep, this.branch, re, im)) return Infinity
    return Math.sqrt(this.stepRe * this.stepRe + this.stepIm * this.stepIm)
  }

  private stepRe = 0
  private stepIm = 0

  private step(sweep: ComplexSweep, branch: Continuation, x: number, y: number): boolean {
    sweep.evaluate(x, y, branch)
    const [fr, fi, dr, di] = sweep.out
    const ff = fr * fr + fi * fi
    if (ff === 0) {
      this.stepRe = 0
      this.stepIm = 0
      return true
    }
    let gr = (dr * fr + di * fi) / ff
    let gi = (di * fr - dr * fi) / ff
    for (let j = 0; j < this.re.length; j++) {
      const ar = x - this.re[j]
      const ai = y - this.im[j]
      const a = ar * ar + ai * ai
      if (a === 0) return false
      gr -= ar / a
      gi += ai / a
    }
    const gg = gr * gr + gi * gi
    this.stepRe = gr / gg
    this.stepIm = -gi / gg
    return true
  }

  private add(x: number, y: number): boolean {
    this.re.push(x)
    this.im.push(y)
    return true
  }
}

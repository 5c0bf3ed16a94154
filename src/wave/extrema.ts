import { ComplexSweep } from './complexSweep.js'
import { leadEdges } from './leadEdges.js'
import { logSlope } from './logSlope.js'
import { resonances } from './resonances.js'
import { transmissionAt } from './transmissionAt.js'
import { type Extremum, hardWall, type Pole, type WaveSystem } from './types.js'

/** A maximum narrower than this (eV) is taken from its pole: energies as doubles can't resolve it. */
export const needleEv = 1e-11

/** Poles are looked for as far outside the range (eV): they bend T inside it. */
const marginEv = 0.02

/**
 * Every interior local maximum and minimum of T(E) over the open range, ascending; none where a lead is closed.
 *
 * What is searched for zeros is g = d(ln T)/dE. The poles of t put -2 (E - E0)/|E - E0 + i Gamma/2|² into it, each, and a
 * lead that opens at the lower end 1/(2 (E - end)); what remains, b(E), is smooth, so b is sampled (adaptively, quadratics) and g = b + poles is scanned around every pole at
 * multiples of its width, at the price of the pole terms only. Each change of sign is then polished with the true g:
 * the model is shifted by its error at the last point and solved again, which converges in two or three sweeps.
 * A maximum narrower than `needleEv` is taken from its pole: E0 and the Breit-Wigner height.
 *
 * `poles`: those of the range and a little beyond, when the caller has them; found here otherwise.
 */
export function extrema(
  system: WaveSystem,
  rangeEv: readonly [number, number],
  poles: readonly Pole[] = nearbyPoles(system, rangeEv),
): Extremum[] {
  const [low, high] = rangeEv
  const sweep = new ComplexSweep(system)
  const { entry, exit } = system.stack
  const found: { energy: number; kind: 'maximum' | 'minimum'; needle: Pole | null }[] = []
  if (exit === hardWall) return []
  const ends = [low, ...leadEdges(sweep, low, high), high]
  for (let i = 1; i < ends.length; i++) {
    sweep.prepare(0.5 * (ends[i - 1] + ends[i]), 0)
    if (!(sweep.at.qRe[entry] > 0 && sweep.at.qRe[exit] > 0)) continue
    new Stretch(sweep, poles, ends[i - 1], ends[i]).collect(found)
  }
  const energies = Float64Array.from(found, ({ energy }) => energy)
  const T = transmissionAt(system, energies)
  return found.map(({ energy, kind, needle }, i) => {
    if (needle) return { energyEv: energy, T: needle.peakT, kind, poleWidthEv: needle.widthEv }
    return { energyEv: energy, T: T[i], kind, poleWidthEv: kind === 'maximum' ? poleWidthAt(poles, energy) : null }
  })
}

/** The poles of a range and of a margin around it, which is cut at the entry's edge. */
export function nearbyPoles(system: WaveSystem, [low, high]: readonly [number, number]): readonly Pole[] {
  const sweep = new ComplexSweep(system)
  const edges = leadEdges(sweep, low - marginEv, low)
  const from = edges.length > 0 ? edges[edges.length - 1] : low - marginEv
  return resonances(system, [Math.max(from, 1e-3 * low), high + marginEv]).poles
}

function poleWidthAt(poles: readonly Pole[], energy: number): number | null {
  let nearest: Pole | null = null
  for (const pole of poles) {
    const distance = Math.abs(pole.energyEv - energy)
    if (distance <= pole.widthEv && (!nearest || distance < Math.abs(nearest.energyEv - energy))) nearest = pole
  }
  return nearest ? nearest.widthEv : null
}

interface Found {
  energy: number
  kind: 'maximum' | 'minimum'
  needle: Pole | null
}

/** Between two neighbouring lead edges. */
class Stretch {
  /** Quadratic pieces of b: [start, end, b(start), b(middle), b(end)]. */
  private readonly pieces: number[] = []
  /** Leads that open at the lower end: T rises from it like (E - end)^(leads/2). */
  private opening = 0

  constructor(
    private readonly sweep: ComplexSweep,
    private readonly poles: readonly Pole[],
    private readonly low: number,
    private readonly high: number,
  ) {}

  collect(found: Found[]): void {
    const { low, high } = this
    this.opening = this.leadsAtEdge(low)
    const a = this.opening > 0 ? low + 1e-9 * (high - low) : low
    const b = this.leadsAtEdge(high) > 0 ? high - 1e-9 * (high - low) : high
    const coarse = Math.max(2, Math.ceil((b - a) / 0.01))
    let x0 = a
    let b0 = this.background(a)
    for (let i = 1; i <= coarse; i++) {
      const x1 = i === coarse ? b : a + ((b - a) * i) / coarse
      const b1 = this.background(x1)
      this.sample(x0, b0, x1, b1, 0)
      x0 = x1
      b0 = b1
    }
    const points = this.scanPoints()
    let p = 0
    let before = points[0]
    let sign = this.model(before, 0)
    for (let i = 1; i < points.length; i++) {
      const x = points[i]
      while (p + 5 < this.pieces.length && x > this.pieces[p + 1]) p += 5
      const g = this.model(x, p)
      if (g < 0 !== sign < 0) {
        const kind = sign > 0 ? 'maximum' : 'minimum'
        const needle = kind === 'maximum' ? this.needleIn(before, x) : null
        found.push({ energy: needle ? needle.energyEv : this.polish(before, x, p), kind, needle })
      }
      before = x
      sign = g
    }
  }

  /** How many leads have their edge at an end; g is infinite there. */
  private leadsAtEdge(end: number): number {
    const { sweep } = this
    const { entry, exit } = sweep.system.stack
    sweep.prepare(end, 0)
    const { qRe } = sweep.at
    return (qRe[entry] > 1e-12 ? 0 : 1) + (qRe[exit] > 1e-12 ? 0 : 1)
  }

  private background(x: number): number {
    return logSlope(this.sweep, x) - this.knownTerms(x)
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

  private sample(x0: number, b0: number, x1: number, b1: number, level: number): void {
    const middle = 0.5 * (x0 + x1)
    const bm = this.background(middle)
    const bend = Math.abs(bm - 0.5 * (b0 + b1))
    if (level < 16 && bend > 0.02 * Math.abs(bm) + 0.02 / (x1 - x0)) {
      this.sample(x0, b0, middle, bm, level + 1)
      this.sample(middle, bm, x1, b1, level + 1)
      return
    }
    this.pieces.push(x0, x1, b0, bm, b1)
  }

  private model(x: number, p: number): number {
    const { pieces } = this
    const t = (x - pieces[p]) / (pieces[p + 1] - pieces[p])
    const b0 = pieces[p + 2]
    const bm = pieces[p + 3]
    const b1 = pieces[p + 4]
    return b0 + t * (4 * bm - 3 * b0 - b1 + t * 2 * (b0 + b1 - 2 * bm)) + this.knownTerms(x)
  }

  private scanPoints(): Float64Array {
    const { pieces, poles } = this
    const points: number[] = []
    const a = pieces[0]
    const b = pieces[pieces.length - 4]
    const widest = (b - a) / 4
    for (let p = 0; p < pieces.length; p += 5) {
      for (let i = 0; i < 8; i++) points.push(pieces[p] + ((pieces[p + 1] - pieces[p]) * i) / 8)
    }
    points.push(b)
    for (const { energyEv, widthEv } of poles) {
      for (let d = Math.max(widthEv / 16, needleEv, 1e-14 * energyEv); d < widest; d *= 1.5) {
        if (energyEv - d > a && energyEv - d < b) points.push(energyEv - d)
        if (energyEv + d > a && energyEv + d < b) points.push(energyEv + d)
      }
    }
    return Float64Array.from(points).sort()
  }

  private needleIn(x0: number, x1: number): Pole | null {
    for (const pole of this.poles) {
      if (pole.widthEv < needleEv && pole.energyEv > x0 && pole.energyEv < x1) return pole
    }
    return null
  }

  /** Zero of the true g from a bracket of the model's sign change. */
  private polish(x0: number, x1: number, p: number): number {
    let x = this.solveModel(x0, x1, p, 0)
    let before = Infinity
    for (let i = 0; i < 8; i++) {
      const error = logSlope(this.sweep, x) - this.model(x, p)
      const next = this.solveModel(x0, x1, p, error)
      const step = Math.abs(next - x)
      x = next
      if (step < 1e-15 * x || step > 0.5 * before) break
      before = step
    }
    return x
  }

  /** Zero of model + shift between x0 and x1, by bisection to the last bit; an end where there is none. */
  private solveModel(x0: number, x1: number, p: number, shift: number): number {
    let a = x0
    let b = x1
    const falling = this.model(a, p) > 0
    for (;;) {
      const middle = 0.5 * (a + b)
      if (middle <= a || middle >= b) return middle
      if (this.model(middle, p) + shift > 0 === falling) a = middle
      else b = middle
    }
  }
}

import { ComplexSweep } from './complexSweep.js'
import { extrema } from './extrema.js'
import { needleEv } from './extremaStretch.js'
import { logSlope } from './logSlope.js'
import { openAt, transmissionAt } from './transmissionAt.js'
import type { Extremum, WaveSystem } from './types.js'

/** Where T falls to half of a maximum's own height on either side, and the width between (eV). */
export interface HalfWidth {
  readonly lowEv: number
  readonly highEv: number
  /** highEv - lowEv, or Gamma where that is too narrow for energies as doubles. */
  readonly fwhmEv: number
}

/**
 * The first crossings of half of the maximum's height, walking outwards; a side that does not cross inside the window is
 * cut at its end. T is monotone between neighbouring extrema, so each side walks from one to the next and finds the
 * crossing as a bracketed zero of ln(T/half) by Newton with d(ln T)/dE. A maximum narrower than `needleEv` has its
 * crossings at E0 -+ Gamma/2.
 *
 * `found`: the extrema of the window, when the caller has them; found here otherwise.
 */
export function halfWidth(
  system: WaveSystem,
  maximum: Extremum,
  windowEv: readonly [number, number],
  found?: readonly Extremum[],
): HalfWidth {
  const { energyEv, poleWidthEv } = maximum
  if (poleWidthEv !== null && poleWidthEv < needleEv) {
    const half = 0.5 * poleWidthEv
    return { lowEv: energyEv - half, highEv: energyEv + half, fwhmEv: poleWidthEv }
  }
  const walk = new Walk(system, maximum)
  const all = found ?? extrema(system, windowEv)
  const below = all.filter((e) => e.energyEv < energyEv).reverse()
  const above = all.filter((e) => e.energyEv > energyEv)
  const lowEv = walk.outwards(below, windowEv[0])
  const highEv = walk.outwards(above, windowEv[1])
  return { lowEv, highEv, fwhmEv: highEv - lowEv }
}

class Walk {
  private readonly sweep: ComplexSweep
  private readonly point = new Float64Array(1)
  private readonly half: number

  constructor(
    private readonly system: WaveSystem,
    private readonly maximum: Extremum,
  ) {
    this.sweep = new ComplexSweep(system)
    this.half = 0.5 * maximum.T
  }

  outwards(extremes: readonly Extremum[], end: number): number {
    let inner = this.maximum.energyEv
    for (const { energyEv, T } of extremes) {
      if (energyEv < end === inner > end) break
      if (T <= this.half) return this.crossing(inner, energyEv)
      inner = energyEv
    }
    return this.at(end) <= this.half ? this.crossing(inner, end) : end
  }

  /** T, 0 where a lead is closed. */
  private at(energy: number): number {
    if (!openAt(this.system, energy)) return 0
    this.point[0] = energy
    return transmissionAt(this.system, this.point)[0]
  }

  /** Between `inner`, where T is above half, and `outer`, where it is not. */
  private crossing(inner: number, outer: number): number {
    const { half, maximum } = this
    let a = inner
    let b = outer
    const out = outer > inner ? 1 : -1
    const guess = 0.5 * (maximum.poleWidthEv ?? Math.abs(outer - inner))
    let x = inner + out * Math.min(guess, 0.5 * Math.abs(outer - inner))
    for (let i = 0; i < 200; i++) {
      const T = this.at(x)
      if (T > half) a = x
      else b = x
      // Newton on 1/T, which is a parabola around a Lorentzian's peak.
      let next = x + (1 - T / half) / logSlope(this.sweep, x)
      const inside = out > 0 ? next > a && next < b : next < a && next > b
      if (!inside) next = 0.5 * (a + b)
      if (Math.abs(next - x) <= 2e-16 * Math.abs(x) || next === a || next === b) return next
      x = next
    }
    return x
  }
}

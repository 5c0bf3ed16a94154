import type { Extremum } from '../wave/index.js'
import type { Landscape } from './Landscape.js'
import { peakSlopes } from './peakSlopes.js'
import { gaussLegendre } from './quadrature.js'
import type { BandFigures } from './types.js'

/** Share of the width between the half-height points that counts as the top. */
const innerShare = 0.8

/** Of each piece between neighbouring extrema of the top; T is smooth there on the scale of the piece. */
const rule = gaussLegendre(16)

/** Narrower than this (eV) a line has no shape in doubles: it counts as a Lorentzian. */
const needleEv = 1e-9

/** arctan(0.8)/0.8: the mean of a Lorentzian of height 1 over its inner 80 %; and its fall from the middle to the end of that. */
const lorentzianTop = 0.843426177779441
const lorentzianDip = 1 - 1 / 1.64

/** Figures of the flat top that a maximum belongs to, with the places that they come from. */
export interface BandShape extends BandFigures {
  readonly innerEv: readonly [number, number]
  readonly greatestEv: number
  readonly leastEv: number
  readonly nodes: Nodes | null
}

interface Nodes {
  readonly energiesEv: readonly number[]
  /** Add up to the length of the inner range. */
  readonly weights: readonly number[]
}

export function bandShapeOf(landscape: Landscape, maximum: Extremum): BandShape {
  const peak = landscape.figuresOf(maximum)
  const { lowEv, highEv, fwhmEv, T } = peak
  const centreEv = 0.5 * (lowEv + highEv)
  const margin = 0.5 * (1 - innerShare) * fwhmEv
  const innerEv = [lowEv + margin, highEv - margin] as const
  if (fwhmEv < needleEv) {
    const [greatestEv, leastEv] = [peak.energyEv, peak.energyEv]
    return {
      centreEv,
      top: lorentzianTop * T,
      ripple: lorentzianDip * T,
      peak,
      innerEv,
      greatestEv,
      leastEv,
      nodes: null,
    }
  }
  const greatest = landscape.extremeOver(innerEv, 'greatest')
  const least = landscape.extremeOver(innerEv, 'least')
  const nodes = nodesOf(landscape, innerEv)
  const values = landscape.values(nodes.energiesEv)
  const top = nodes.weights.reduce((sum, weight, i) => sum + weight * values[i], 0) / (innerEv[1] - innerEv[0])
  const places = { innerEv, greatestEv: greatest.energyEv, leastEv: least.energyEv, nodes }
  return { centreEv, top, ripple: greatest.T - least.T, peak, ...places }
}

/** Slopes of the figures in the layer parameters. */
export interface BandSlopes {
  readonly low: Float64Array
  readonly high: Float64Array
  readonly fwhm: Float64Array
  readonly top: Float64Array
  readonly ripple: Float64Array
}

/**
 * From those of the half-height points; the mean M over [a, b] moves by (integral of T_p + T(b) b_p - T(a) a_p - M (b - a)_p)/(b - a),
 * an extreme by T_p at its own energy, and by T_E with the end of the range where it lies there.
 */
export function bandSlopes(landscape: Landscape, band: BandShape): BandSlopes {
  const { low, high, fwhm, height } = peakSlopes(landscape, band.peak)
  const n = landscape.layerParameters
  const { nodes, innerEv } = band
  if (nodes === null) {
    return {
      low,
      high,
      fwhm,
      top: height.map((one) => lorentzianTop * one),
      ripple: height.map((one) => lorentzianDip * one),
    }
  }
  const [a, b] = innerEv
  const { T, gradient } = landscape.gradient([a, b, band.greatestEv, band.leastEv, ...nodes.energiesEv])
  const [aSlope, bSlope] = landscape.slope([a, b])
  const top = new Float64Array(n)
  const ripple = new Float64Array(n)
  const edge = 0.5 * (1 - innerShare)
  for (let k = 0; k < n; k++) {
    const da = low[k] + edge * fwhm[k]
    const db = high[k] - edge * fwhm[k]
    let integral = 0
    for (let i = 0; i < nodes.weights.length; i++) integral += nodes.weights[i] * gradient[(4 + i) * n + k]
    top[k] = (integral + T[1] * db - T[0] * da - band.top * (db - da)) / (b - a)
    const moved = (energyEv: number) => (energyEv === a ? aSlope * da : energyEv === b ? bSlope * db : 0)
    ripple[k] = gradient[2 * n + k] + moved(band.greatestEv) - gradient[3 * n + k] - moved(band.leastEv)
  }
  return { low, high, fwhm, top, ripple }
}

function nodesOf({ extrema }: Landscape, [a, b]: readonly [number, number]): Nodes {
  const inside = extrema.map(({ energyEv }) => energyEv).filter((energyEv) => energyEv > a && energyEv < b)
  const ends = [a, ...inside, b]
  const energiesEv: number[] = []
  const weights: number[] = []
  for (let i = 1; i < ends.length; i++) {
    const middle = 0.5 * (ends[i] + ends[i - 1])
    const half = 0.5 * (ends[i] - ends[i - 1])
    for (let j = 0; j < rule.x.length; j++) {
      energiesEv.push(middle + half * rule.x[j])
      weights.push(half * rule.w[j])
    }
  }
  return { energiesEv, weights }
}

import type { Landscape } from './Landscape.js'
import type { PeakFigures } from './types.js'

/** Slopes of a maximum in the layer parameters, [width, then the medium's own] a layer. */
export interface PeakSlopes {
  /** dE/dp, d(T at the maximum)/dp, d(full width at half height)/dp and those of its two ends. */
  readonly energy: Float64Array
  readonly height: Float64Array
  readonly fwhm: Float64Array
  readonly low: Float64Array
  readonly high: Float64Array
}

/**
 * Implicit derivatives of a maximum E0 of T and of its half-height points E-, E+:
 *
 *     dE0/dp = -T_Ep/T_EE     dT(E0)/dp = T_p     dE±/dp = (T_p(E0)/2 - T_p(E±))/T_E(E±)
 *
 * Mixed and second derivatives are differences, in energy, of the slopes of ln T, whose odd parts around the maximum of a
 * Lorentzian have the ratio -dE0/dp at any distance: the step may be wider than a peak that doubles hardly resolve. It is a
 * thousandth of the width where that is wide enough (fourth order: 1e-10 there), else `stepEv`. A side that was cut at the window
 * does not move. Below `narrowestEv` the half points can't be told from the maximum: the height counts as fixed and ln(width)
 * moves by half of the even part of d(ln T)/dp, as for a symmetric resonance.
 */
export function peakSlopes(landscape: Landscape, peak: PeakFigures): PeakSlopes {
  const { energyEv, fwhmEv } = peak
  const [from, to] = landscape.windowEv
  const lowCut = peak.lowEv <= from
  const highCut = peak.highEv >= to
  // A side that is cut may end where a lead closes and T has no slope.
  const lowEv = lowCut ? energyEv : peak.lowEv
  const highEv = highCut ? energyEv : peak.highEv
  const n = landscape.layerParameters
  const side = Math.min(energyEv - peak.lowEv, peak.highEv - energyEv)
  const step = Math.min(Math.max(2e-3 * side, stepEv), (energyEv - from) / 4)
  const around = [-2, -1, 1, 2].map((k) => energyEv + k * step)
  const { T, gradient } = landscape.gradient([...around, energyEv, lowEv, highEv])
  const slope = landscape.slope([...around, lowEv, highEv])
  const second = differences.reduce((sum, d, e) => sum + (d * slope[e]) / T[e], 0)
  const narrow = fwhmEv < narrowestEv
  const low = lowCut ? 0 : 1 / slope[4]
  const high = highCut ? 0 : 1 / slope[5]
  const row = () => new Float64Array(n)
  const slopes = { energy: row(), height: row(), fwhm: row(), low: row(), high: row() }
  for (let k = 0; k < n; k++) {
    const mixed = differences.reduce((sum, d, e) => sum + (d * gradient[e * n + k]) / T[e], 0)
    slopes.energy[k] = -mixed / second
    if (narrow) {
      slopes.fwhm[k] = 0.25 * fwhmEv * (gradient[n + k] / T[1] + gradient[2 * n + k] / T[2])
      slopes.low[k] = slopes.energy[k] - 0.5 * slopes.fwhm[k]
      slopes.high[k] = slopes.energy[k] + 0.5 * slopes.fwhm[k]
      continue
    }
    const height = gradient[4 * n + k]
    slopes.height[k] = height
    slopes.low[k] = (0.5 * height - gradient[5 * n + k]) * low
    slopes.high[k] = (0.5 * height - gradient[6 * n + k]) * high
    slopes.fwhm[k] = slopes.high[k] - slopes.low[k]
  }
  return slopes
}

/** Weights of a first derivative of fourth order at -2, -1, 1, 2 steps, but for a common factor. */
const differences = [1, -8, 8, -1]

const stepEv = 1e-7
const narrowestEv = 1e-12

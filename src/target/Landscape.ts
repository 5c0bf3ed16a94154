import type { Quantity } from '../job/index.js'
import { type Extremum, extrema, extremeOver, halfWidth, type WaveSystem } from '../wave/index.js'
import { ResponseShape } from './ResponseShape.js'
import { ShareGradient } from './shareGradient.js'
import type { PeakFigures } from './types.js'

/** How extremes and widths of a share are found. */
export interface Shape {
  extrema(): readonly Extremum[]
  halfWidth(maximum: Extremum): { readonly lowEv: number; readonly highEv: number; readonly fwhmEv: number }
  extremeOver(
    rangeEv: readonly [number, number],
    which: 'greatest' | 'least',
    found: readonly Extremum[],
  ): { readonly energyEv: number; readonly T: number }
}

/**
 * T(E), or R or A, of one stack at one condition: what several demands ask of it is found once. Made for a `window` of maxima. What is
 * said of T here and by the judges holds for the share that is asked.
 */
export class Landscape {
  private found: readonly Extremum[] | null = null
  private readonly figures = new Map<Extremum, PeakFigures>()
  private readonly shape: Shape
  private readonly slopes: ShareGradient

  constructor(
    readonly system: WaveSystem,
    /** The share at all points of the target that ask for it. */
    readonly T: Float64Array,
    readonly windowEv: readonly [number, number],
    quantity: Quantity,
  ) {
    this.slopes = new ShareGradient(system, quantity)
    const single = quantity === 'T' && system.beside === undefined && system.behind === undefined
    this.shape = single ? transmissionShape(this) : new ResponseShape(system, quantity, windowEv)
  }

  /** Every local maximum and minimum inside the window, ascending. */
  get extrema(): readonly Extremum[] {
    this.found ??= this.shape.extrema()
    return this.found
  }

  figuresOf(maximum: Extremum): PeakFigures {
    const known = this.figures.get(maximum)
    if (known) return known
    const { lowEv, highEv, fwhmEv } = this.shape.halfWidth(maximum)
    const figures = { energyEv: maximum.energyEv, T: maximum.T, lowEv, highEv, fwhmEv }
    this.figures.set(maximum, figures)
    return figures
  }

  /** Greatest or least T over a closed range (eV), from `found` extrema instead of the window's own where they count otherwise. */
  extremeOver(
    rangeEv: readonly [number, number],
    which: 'greatest' | 'least',
    found: readonly Extremum[] = this.extrema,
  ): { readonly energyEv: number; readonly T: number } {
    return this.shape.extremeOver(rangeEv, which, found)
  }

  /** How many numbers describe the layers: [width, then the medium's own] a layer. */
  get layerParameters(): number {
    return this.slopes.layerParameters
  }

  /** T at each energy (eV). */
  values(energiesEv: readonly number[]): Float64Array {
    return this.slopes.values(Float64Array.from(energiesEv))
  }

  /** T and dT/d(layer parameter) at each energy (eV): entry e * layerParameters + k. */
  gradient(energiesEv: readonly number[]): { readonly T: Float64Array; readonly gradient: Float64Array } {
    return this.slopes.gradient(Float64Array.from(energiesEv))
  }

  /** dT/dE (1/eV) at each energy. */
  slope(energiesEv: readonly number[]): Float64Array {
    return this.slopes.slope(Float64Array.from(energiesEv))
  }
}

/** Of the transmission of a single wave, whose poles and phases the core knows. */
function transmissionShape(landscape: Landscape): Shape {
  const { system, windowEv } = landscape
  return {
    extrema: () => extrema(system, windowEv),
    halfWidth: (maximum) => halfWidth(system, maximum, windowEv, landscape.extrema),
    extremeOver: (rangeEv, which, found) => extremeOver(system, rangeEv, which, found),
  }
}

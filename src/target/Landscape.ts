import {
  type Extremum,
  extrema,
  halfWidth,
  mediaTable,
  parameterGradient,
  slopeInto,
  type WaveSystem,
} from '../wave/index.js'
import { PointSpectrum } from './PointSpectrum.js'
import type { PeakFigures } from './types.js'

/** T(E) of one stack at one condition: what several demands ask of it is found once. Made for a `window` of maxima. */
export class Landscape {
  private found: readonly Extremum[] | null = null
  private readonly figures = new Map<Extremum, PeakFigures>()

  constructor(
    readonly system: WaveSystem,
    /** T at all points of the target. */
    readonly T: Float64Array,
    readonly windowEv: readonly [number, number],
  ) {}

  /** Every local maximum and minimum inside the window, ascending. */
  get extrema(): readonly Extremum[] {
    this.found ??= extrema(this.system, this.windowEv)
    return this.found
  }

  figuresOf(maximum: Extremum): PeakFigures {
    const known = this.figures.get(maximum)
    if (known) return known
    const { lowEv, highEv, fwhmEv } = halfWidth(this.system, maximum, this.windowEv, this.extrema)
    const figures = { energyEv: maximum.energyEv, T: maximum.T, lowEv, highEv, fwhmEv }
    this.figures.set(maximum, figures)
    return figures
  }

  /** How many numbers describe the layers: [width, then the medium's own] a layer. */
  get layerParameters(): number {
    const { media, stack, rowMap } = this.system
    return (rowMap?.layers ?? stack.medium.length) * (1 + media.parameters)
  }

  /** T at each energy (eV). */
  transmission(energiesEv: readonly number[]): Float64Array {
    return new PointSpectrum(energiesEv).at(this.system)
  }

  /** T and dT/d(layer parameter) at each energy (eV): entry e * layerParameters + k. */
  gradient(energiesEv: readonly number[]): { readonly T: Float64Array; readonly gradient: Float64Array } {
    const energies = Float64Array.from(energiesEv)
    const T = new Float64Array(energies.length)
    const gradient = new Float64Array(energies.length * this.layerParameters)
    parameterGradient(this.system, energies, { T, gradient })
    return { T, gradient }
  }

  /** dT/dE (1/eV) at each energy. */
  slope(energiesEv: readonly number[]): Float64Array {
    const { media, stack } = this.system
    const energies = Float64Array.from(energiesEv)
    const table = mediaTable(media, energies.length)
    const slope = mediaTable(media, energies.length)
    media.fill(energies, table)
    media.fillSlope(energies, slope)
    const dTdE = new Float64Array(energies.length)
    slopeInto(table, slope, stack, { T: new Float64Array(energies.length), dTdE })
    return dTdE
  }
}

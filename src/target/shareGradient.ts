import type { Quantity } from '../job/index.js'
import { Response } from '../model/index.js'
import {
  type MediaTable,
  mediaTable,
  parameterGradient,
  slopeInto,
  type WaveMedia,
  type WaveSystem,
} from '../wave/index.js'

/** A share of the flux of one system, with its slopes in energy and in the layer parameters. */
export class ShareGradient {
  constructor(
    private readonly system: WaveSystem,
    private readonly quantity: Quantity,
  ) {}

  /** How many numbers describe the layers: [width, then the medium's own] a layer. */
  get layerParameters(): number {
    const { media, stack, rowMap } = this.system
    return (rowMap?.layers ?? stack.medium.length) * (1 + media.parameters)
  }

  values(energies: Float64Array): Float64Array {
    return new Response(energies).at(this.system)[this.quantity]
  }

  /** The share and its slopes by width (1/nm) and by what describes the medium, at each energy: entry e * layerParameters + k. */
  gradient(energies: Float64Array): { readonly T: Float64Array; readonly gradient: Float64Array } {
    const { system, quantity } = this
    const waves = system.beside ? [system, system.beside] : [system]
    if (quantity !== 'A' && system.behind === undefined && (quantity === 'T' || system.media.lossless)) {
      // R = 1 - T where nothing absorbs.
      const sign = quantity === 'T' ? 1 : -1
      const size = energies.length * this.layerParameters
      const parts = waves.map((wave) => {
        const out = { T: new Float64Array(energies.length), gradient: new Float64Array(size) }
        parameterGradient(wave, energies, out)
        return out
      })
      if (sign === 1 && parts.length === 1) return parts[0]
      const mean = (of: (part: (typeof parts)[number]) => Float64Array) =>
        of(parts[0]).map((value, i) => (sign * (value + of(parts[parts.length - 1])[i])) / 2)
      return { T: this.values(energies), gradient: mean((part) => part.gradient) }
    }
    return this.byDifferences(energies)
  }

  /** d(share)/dE (1/eV). */
  slope(energies: Float64Array): Float64Array {
    const { system, quantity } = this
    if (quantity === 'T' && system.beside === undefined && system.behind === undefined) {
      return transmissionSlope(system, energies)
    }
    const points = energies.length
    const shifted = (sign: number) => energies.map((energy) => energy * (1 + sign * energyStep))
    const both = new Response(Float64Array.from([...shifted(-2), ...shifted(-1), ...shifted(1), ...shifted(2)]))
    const value = both.at(system)[quantity]
    return energies.map((energy, e) => {
      const near = value[2 * points + e] - value[points + e]
      const far = value[3 * points + e] - value[e]
      return (8 * near - far) / (12 * energyStep * energy)
    })
  }

  /**
   * Differences of fourth order, for what no adjoint knows: what absorbs or is reflected, and stacks before a plate. The index of
   * one layer is moved in a medium of its own.
   */
  private byDifferences(energies: Float64Array): { readonly T: Float64Array; readonly gradient: Float64Array } {
    const { system, quantity, layerParameters } = this
    const { stack } = system
    const points = energies.length
    const stride = layerParameters / stack.medium.length
    const response = new Response(energies)
    const gradient = new Float64Array(points * layerParameters)
    const add = (
      k: number,
      step: number,
      weights: readonly (readonly [number, number])[],
      moved: (by: number) => WaveSystem,
    ) => {
      for (const [times, weight] of weights) {
        const value = response.at(moved(times * step))[quantity]
        for (let e = 0; e < points; e++) gradient[e * layerParameters + k] += (weight * value[e]) / (12 * step)
      }
    }
    for (let j = 0; j < stack.medium.length; j++) {
      const weights = stack.width[j] < 2 * widthStepNm ? forward : central
      add(stride * j, widthStepNm, weights, (by) => withWidth(system, j, by))
      if (stride > 1) add(stride * j + 1, indexStep, central, (by) => withIndex(system, j, by))
    }
    return { T: response.at(system)[quantity].slice(), gradient }
  }
}

/** Steps and weights over 12 steps of a first derivative of fourth order; the second where there is nothing below. */
const central = [
  [-2, 1],
  [-1, -8],
  [1, 8],
  [2, -1],
] as const
const forward = [
  [0, -25],
  [1, 48],
  [2, -36],
  [3, 16],
  [4, -3],
] as const

/** Relative; and in nm, and of an index. Rounding over the step stays below 1e-10 of what changes T by its own size. */
const energyStep = 1e-7
const widthStepNm = 1e-3
const indexStep = 1e-5

function transmissionSlope({ media, stack }: WaveSystem, energies: Float64Array): Float64Array {
  const table = mediaTable(media, energies.length)
  const slope = mediaTable(media, energies.length)
  media.fill(energies, table)
  media.fillSlope(energies, slope)
  const dTdE = new Float64Array(energies.length)
  slopeInto(table, slope, stack, { T: new Float64Array(energies.length), dTdE })
  return dTdE
}

function withWidth(system: WaveSystem, j: number, by: number): WaveSystem {
  const width = Float64Array.from(system.stack.width)
  width[j] += by
  const beside = system.beside && withWidth(system.beside, j, by)
  return { ...system, stack: { ...system.stack, width }, ...(beside ? { beside } : {}) }
}

function withIndex(system: WaveSystem, j: number, by: number): WaveSystem {
  const { media, stack } = system
  const medium = Int32Array.from(stack.medium)
  medium[j] = media.count
  const beside = system.beside && withIndex(system.beside, j, by)
  return {
    ...system,
    media: new OneMore(media, stack.medium[j], by),
    stack: { ...stack, medium },
    ...(beside ? { beside } : {}),
  }
}

/** Media and one more, that differs from one of them by a change of its first parameter (first order in q and mu). */
class OneMore implements WaveMedia {
  readonly count: number
  readonly lossless: boolean
  readonly parameters: number

  constructor(
    private readonly media: WaveMedia,
    private readonly of: number,
    private readonly by: number,
  ) {
    this.count = media.count + 1
    this.lossless = media.lossless
    this.parameters = media.parameters
  }

  fill(energies: Float64Array, table: MediaTable): void {
    const { points, q, mu, qIm, muIm } = table
    this.media.fill(energies, table)
    const partials = new Float64Array(4 * this.parameters)
    const [from, to] = [this.of * points, (this.count - 1) * points]
    for (let e = 0; e < points; e++) {
      this.media.partials(energies[e], this.of, partials)
      q[to + e] = q[from + e] + this.by * partials[0]
      mu[to + e] = mu[from + e] + this.by * partials[1]
      if (qIm) qIm[to + e] = qIm[from + e]
      if (muIm) muIm[to + e] = muIm[from + e]
    }
  }

  fillSlope(): void {
    throw new Error('not needed for differences')
  }

  at(): void {
    throw new Error('not needed for differences')
  }

  partials(energy: number, m: number, out: Float64Array): void {
    this.media.partials(energy, m, out)
  }
}

import type { Quantity } from '../job/index.js'
import { Response } from '../model/index.js'
import { mediaTable, parameterGradient, type Share, slopeInto, type WaveSystem } from '../wave/index.js'

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
    return new Response(energies, this.quantity === 'A').at(this.system)[this.quantity]
  }

  /** The share and its slopes by width (1/nm) and by what describes the medium, at each energy: entry e * layerParameters + k. */
  gradient(energies: Float64Array): { readonly T: Float64Array; readonly gradient: Float64Array } {
    const { system, quantity } = this
    const { beside, behind } = system
    if (quantity === 'T' && beside === undefined && behind === undefined) return this.of(system, energies, 'T')
    const waves = beside ? [system, beside] : [system]
    const parts = waves.map((wave) => this.shareOf(wave, energies))
    const gradient = parts[0].map((slope, i) => (slope + parts[parts.length - 1][i]) / 2)
    return { T: this.values(energies), gradient }
  }

  /** d(share)/dE (1/eV). */
  slope(energies: Float64Array): Float64Array {
    const { system, quantity } = this
    if (quantity === 'T' && system.beside === undefined && system.behind === undefined) {
      return transmissionSlope(system, energies)
    }
    const points = energies.length
    const shifted = (steps: number) => energies.map((energy) => energy * (1 + steps * energyStep))
    const both = new Response(
      Float64Array.from([...shifted(-2), ...shifted(-1), ...shifted(1), ...shifted(2)]),
      quantity === 'A',
    )
    const value = both.at(system)[quantity]
    return energies.map((energy, e) => {
      const near = value[2 * points + e] - value[points + e]
      const far = value[3 * points + e] - value[e]
      return (8 * near - far) / (12 * energyStep * energy)
    })
  }

  /** The slopes of the share of one wave; A = 1 - T - R. */
  private shareOf(wave: WaveSystem, energies: Float64Array): Float64Array {
    const { quantity } = this
    if (quantity !== 'A') return this.oneOf(wave, energies, quantity)
    const [T, R] = [this.oneOf(wave, energies, 'T'), this.oneOf(wave, energies, 'R')]
    return T.map((slope, i) => -slope - R[i])
  }

  /**
   * With a plate behind (`incoherentBack`), D = 1 - R1' R2:
   *
   *     dT = T2/D dT1 + T1 T2 R2/D² dR1'     dR = dR1 + 2 T1 R2/D dT1 + (T1 R2/D)² dR1'
   */
  private oneOf(wave: WaveSystem, energies: Float64Array, share: Share): Float64Array {
    if (wave.behind === undefined) return this.of(wave, energies, share).gradient
    const { media, stack, behind } = wave
    const front: WaveSystem = { media, stack }
    const none = { medium: new Int32Array(0), width: new Float64Array(0) }
    const rear = new Response(energies, false).at({ media, stack: { entry: stack.exit, exit: behind, ...none } })
    const T1 = this.of(front, energies, 'T')
    const inside = this.of(front, energies, 'R', 'exit')
    const R1 = share === 'R' ? this.of(front, energies, 'R') : null
    const out = new Float64Array(T1.gradient.length)
    const size = out.length / energies.length
    for (let e = 0; e < energies.length; e++) {
      const [T2, R2] = [rear.T[e], rear.R[e]]
      const D = 1 - inside.T[e] * R2
      const often = (T1.T[e] * R2) / D
      const byT1 = share === 'T' ? T2 / D : 2 * often
      const byInside = share === 'T' ? (often * T2) / D : often * often
      for (let k = e * size; k < (e + 1) * size; k++) {
        out[k] = byT1 * T1.gradient[k] + byInside * inside.gradient[k] + (R1 ? R1.gradient[k] : 0)
      }
    }
    return out
  }

  private of(system: WaveSystem, energies: Float64Array, share: Share, from: 'entry' | 'exit' = 'entry') {
    const out = {
      T: new Float64Array(energies.length),
      gradient: new Float64Array(energies.length * this.layerParameters),
    }
    parameterGradient(system, energies, out, share, from)
    return out
  }
}

/** Relative. */
const energyStep = 1e-7

function transmissionSlope({ media, stack }: WaveSystem, energies: Float64Array): Float64Array {
  const table = mediaTable(media, energies.length)
  const slope = mediaTable(media, energies.length)
  media.fill(energies, table)
  media.fillSlope(energies, slope)
  const dTdE = new Float64Array(energies.length)
  slopeInto(table, slope, stack, { T: new Float64Array(energies.length), dTdE })
  return dTdE
}

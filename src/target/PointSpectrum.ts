import type { Quantity } from '../job/index.js'
import { Response } from '../model/index.js'
import type { WaveSystem } from '../wave/index.js'

/** T, R or A at a fixed list of energies (eV) of one system after the other. */
export class PointSpectrum {
  private readonly response: Response
  private readonly values: Float64Array
  private readonly onlyT: boolean

  constructor(
    energiesEv: readonly number[],
    /** What is asked for at each. */
    private readonly quantities: readonly Quantity[],
  ) {
    this.response = new Response(Float64Array.from(energiesEv), quantities.includes('A'))
    this.values = new Float64Array(energiesEv.length)
    this.onlyT = quantities.every((quantity) => quantity === 'T')
  }

  /** The array is reused by the next call. */
  at(system: WaveSystem): Float64Array {
    const shares = this.response.at(system)
    if (this.onlyT) return shares.T
    for (let e = 0; e < this.values.length; e++) this.values[e] = shares[this.quantities[e]][e]
    return this.values
  }
}

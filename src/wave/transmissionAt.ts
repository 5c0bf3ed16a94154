import { mediaTable } from './mediaTable.js'
import { spectrumInto } from './spectrum.js'
import { hardWall, type WaveSystem } from './types.js'

/** T at each energy (eV), ascending or not. */
export function transmissionAt(system: WaveSystem, energies: Float64Array): Float64Array {
  const { media, stack } = system
  const points = energies.length
  const table = mediaTable(media, points)
  media.fill(energies, table)
  const T = new Float64Array(points)
  spectrumInto(table, stack, { T, R: new Float64Array(points) })
  return T
}

/** Both leads carry a propagating wave at this energy (eV); elsewhere T = 0. */
export function openAt({ media, stack }: WaveSystem, energy: number): boolean {
  if (stack.exit === hardWall) return false
  const table = mediaTable(media, 1)
  media.fill(Float64Array.of(energy), table)
  return table.q[stack.entry] > 0 && table.q[stack.exit] > 0
}

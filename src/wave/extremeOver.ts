import { extrema } from './extrema.js'
import { openAt, transmissionAt } from './transmissionAt.js'
import type { Extremum, WaveSystem } from './types.js'

/**
 * Greatest or least T over the closed range (eV) and an energy where T has it: at an end, or at one of the extrema
 * inside. `found`: extrema of a range that holds this one, when the caller has them.
 */
export function extremeOver(
  system: WaveSystem,
  rangeEv: readonly [number, number],
  which: 'greatest' | 'least',
  found: readonly Extremum[] = extrema(system, rangeEv),
): { energyEv: number; T: number } {
  const [low, high] = rangeEv
  let best = { energyEv: low, T: tAt(system, low) }
  const consider = (energyEv: number, T: number) => {
    if (which === 'greatest' ? T > best.T : T < best.T) best = { energyEv, T }
  }
  for (const { energyEv, T } of found) if (energyEv > low && energyEv < high) consider(energyEv, T)
  consider(high, tAt(system, high))
  return best
}

function tAt(system: WaveSystem, energy: number): number {
  return openAt(system, energy) ? transmissionAt(system, Float64Array.of(energy))[0] : 0
}

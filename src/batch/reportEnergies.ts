import type { Job } from '../job/index.js'
import { hcEvNm } from '../media/index.js'
import type { PeakFigures } from '../target/index.js'
import type { Pole } from '../wave/index.js'

const evenPoints = 1001
const bend = [0.125, 0.25, 0.375, 0.5, 0.625, 0.75, 1, 1.25, 1.5, 2, 3, 4, 6, 8, 12, 16, 24, 32]

/**
 * Energies (eV) at which a reported spectrum is computed, ascending: 1001 evenly over the scan (of light in wavelength), and thickly around every line, so
 * that a picture drawn through them shows each at its height, and the peak's own figures.
 */
export function reportEnergies(
  { kind, scanEv: [low, high] }: Pick<Job, 'kind' | 'scanEv'>,
  poles: readonly Pole[],
  peak: PeakFigures | null,
): Float64Array {
  const energies = new Set<number>()
  for (let i = 0; i < evenPoints; i++) {
    const share = i / (evenPoints - 1)
    const inside =
      kind === 'electron'
        ? low + (high - low) * share
        : hcEvNm / (hcEvNm / low + (hcEvNm / high - hcEvNm / low) * share)
    energies.add(i === 0 ? low : i === evenPoints - 1 ? high : inside)
  }
  for (const { energyEv, widthEv } of poles) {
    energies.add(energyEv)
    for (const part of bend) for (const sign of [-1, 1]) energies.add(energyEv + sign * part * widthEv)
  }
  if (peak) for (const energy of [peak.lowEv, peak.energyEv, peak.highEv]) energies.add(energy)
  return Float64Array.from([...energies].filter((energy) => energy >= low && energy <= high)).sort()
}

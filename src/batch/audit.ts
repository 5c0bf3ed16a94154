import { scatteringT, type WaveSystem } from '../wave/index.js'
import { spectrumOf } from './spectrumOf.js'

/** Energies at which the independent path is taken, spread over the scan. */
const checked = 8

/** Worse than this, a number is contradicted by its own check. */
export const worstFluxError = 1e-9
export const worstPathError = 1e-6

/**
 * The largest relative difference of T from that of an independent scattering recursion, at 8 energies spread over the scan and at
 * `peakEv` (null: left out, as for lines that doubles can't resolve). Of both waves where there are two; without the plate behind.
 */
export function pathError(
  { media, stack, beside }: WaveSystem,
  scanEv: readonly [number, number],
  peakEv: number | null,
): number {
  const [low, high] = scanEv
  const energies = Array.from({ length: checked }, (_, i) => low + ((high - low) * (i + 0.5)) / checked)
  if (peakEv !== null) energies.push(peakEv)
  const system = { media, stack }
  const { T } = spectrumOf(system, Float64Array.from(energies))
  const other = beside ? pathError(beside, scanEv, peakEv) : 0
  return energies.reduce((worst, energy, i) => Math.max(worst, difference(T[i], scatteringT(system, energy))), other)
}

function difference(a: number, b: number): number {
  return a === b ? 0 : Math.abs(a - b) / Math.max(a, b)
}

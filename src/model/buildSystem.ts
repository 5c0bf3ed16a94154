import type { WaveSystem } from '../wave/index.js'
import { systemOfRegions } from './electronSystem.js'
import { resolveMedium } from './resolveMedium.js'
import type { MediumChoice, Situation } from './types.js'

/**
 * Layers of a job, from entry to exit, as the wave core reads them; row i of the stack is layer i, zero widths kept.
 * Throws as resolveMedium does.
 */
export function buildSystem(
  situation: Situation,
  layers: readonly { readonly choice: MediumChoice; readonly widthNm: number }[],
): WaveSystem {
  const { entry, exit, inPlaneKPerNm } = situation
  const widths = new Float64Array(layers.length)
  for (let i = 0; i < widths.length; i++) widths[i] = layers[i].widthNm
  return systemOfRegions(
    resolveMedium(entry, situation).region,
    layers.map(({ choice }) => resolveMedium(choice, situation).region),
    widths,
    exit === 'hard wall' ? exit : resolveMedium(exit, situation).region,
    inPlaneKPerNm,
  )
}

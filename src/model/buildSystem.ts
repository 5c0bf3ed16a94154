import type { WaveSystem } from '../wave/index.js'
import { electronSystem } from './electronSystem.js'
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
  return electronSystem({
    entry: resolveMedium(entry, situation).region,
    layers: layers.map(({ choice, widthNm }) => ({ ...resolveMedium(choice, situation).region, widthNm })),
    exit: exit === 'hard wall' ? exit : resolveMedium(exit, situation).region,
    inPlaneKPerNm,
  })
}

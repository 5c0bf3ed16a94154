import type { WaveSystem } from '../wave/index.js'
import { systemOfRegions } from './electronSystem.js'
import { opticalSystem } from './opticalSystem.js'
import { resolveRegion } from './resolveMedium.js'
import { slicedLayers } from './slicedLayers.js'
import type { ElectronSituation, ModelLayer, Region, Situation } from './types.js'

/**
 * Layers of a job, from entry to exit, as the wave core reads them, zero widths kept. Without a bias row i of the stack is layer i, else
 * each layer is cut into its slices, and the system maps the slopes of the rows back to the layers. Throws as resolveMedium does.
 */
export function buildSystem(situation: Situation, layers: readonly ModelLayer[]): WaveSystem {
  if (situation.kind === 'light') return opticalSystem(situation, layers)
  const { regions, width, rowMap } = slicedLayers(situation, layers)
  const { entry, inPlaneKPerNm } = situation
  const system = systemOfRegions(
    resolveRegion(entry, situation).region,
    regions,
    width,
    exitRegion(situation),
    inPlaneKPerNm,
  )
  return rowMap ? { ...system, rowMap } : system
}

/** The exit, lowered by the bias. */
export function exitRegion(situation: ElectronSituation): Required<Region> | 'hard wall' {
  const { exit, biasV } = situation
  if (exit === 'hard wall') return exit
  const { region } = resolveRegion(exit, situation)
  return { ...region, potentialEv: region.potentialEv - biasV }
}

import { hardWall, type WaveSystem } from '../wave/index.js'
import { electronMedia } from './electronMedia.js'
import type { ElectronStack, Region } from './types.js'
import { UniqueRegions } from './UniqueRegions.js'

/** What the wave core reads of a stack; equal regions share a medium. Checks nothing: systemOf does. */
export function electronSystem({ entry, layers, exit, inPlaneKPerNm }: Omit<ElectronStack, 'kind'>): WaveSystem {
  const widths = new Float64Array(layers.length)
  for (let i = 0; i < widths.length; i++) widths[i] = layers[i].widthNm
  return systemOfRegions(entry, layers, widths, exit, inPlaneKPerNm)
}

/** The same from regions and widths apart. Searches call it once a candidate, hence the plain loops. */
export function systemOfRegions(
  entry: Region,
  layers: readonly Region[],
  width: Float64Array,
  exit: Region | 'hard wall',
  inPlaneKPerNm?: number,
): WaveSystem {
  const unique = new UniqueRegions()
  const entryNumber = unique.numberOf(entry)
  const exitNumber = exit === 'hard wall' ? hardWall : unique.numberOf(exit)
  const medium = new Int32Array(layers.length)
  for (let i = 0; i < medium.length; i++) medium[i] = unique.numberOf(layers[i])
  return {
    stack: { entry: entryNumber, exit: exitNumber, medium, width },
    media: electronMedia(unique.regions, inPlaneKPerNm),
  }
}

import { hardWall, type WaveSystem } from '../wave/index.js'
import { electronMedia } from './electronMedia.js'
import type { ElectronStack } from './types.js'
import { UniqueRegions } from './UniqueRegions.js'

/** What the wave core reads of a stack; equal regions share a medium. Checks nothing: systemOf does. */
export function electronSystem({ entry, layers, exit, inPlaneKPerNm }: Omit<ElectronStack, 'kind'>): WaveSystem {
  const unique = new UniqueRegions()
  const stack = {
    entry: unique.numberOf(entry),
    exit: exit === 'hard wall' ? hardWall : unique.numberOf(exit),
    medium: Int32Array.from(layers, (layer) => unique.numberOf(layer)),
    width: Float64Array.from(layers, (layer) => layer.widthNm),
  }
  return { stack, media: electronMedia(unique.regions, inPlaneKPerNm) }
}

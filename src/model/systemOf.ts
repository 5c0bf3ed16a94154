import type { Side, WaveSystem } from '../wave/index.js'
import { checkStack } from './checkStack.js'
import { electronSystem } from './electronSystem.js'
import { lightMedia } from './lightMedia.js'
import type { ElectronStack, LightStack, Medium } from './types.js'

/**
 * A stack of the library as the wave core reads it, for waves that come from `from`; equal media share a number. Throws
 * StackError, naming the number, for a stack that has no spectrum: see checkStack.
 */
export function systemOf(stack: ElectronStack | LightStack, from: Side = 'entry'): WaveSystem {
  checkStack(stack, from)
  return stack.kind === 'electron' ? electronSystem(stack) : lightSystem(stack, from)
}

function lightSystem({ entry, layers, exit, angleDeg = 0, polarisation = 's' }: LightStack, from: Side): WaveSystem {
  const media: Medium[] = []
  const numberOf = ({ index, extinction = 0 }: Medium): number => {
    const known = media.findIndex((medium) => medium.index === index && medium.extinction === extinction)
    return known >= 0 ? known : media.push({ index, extinction }) - 1
  }
  const stack = {
    entry: numberOf(entry),
    exit: numberOf(exit),
    medium: Int32Array.from(layers, numberOf),
    width: Float64Array.from(layers, (layer) => layer.widthNm),
  }
  return { stack, media: lightMedia(media, { medium: stack[from], angleDeg, polarisation }) }
}

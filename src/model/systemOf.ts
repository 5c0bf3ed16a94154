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

/** A stack with a back face: its front, and the number of the medium behind the plate. Throws as systemOf. */
export function platedSystem(stack: LightStack, from: Side): { readonly system: WaveSystem; readonly back: number } {
  checkStack(stack, from)
  // The medium behind comes last and stands for a layer of no width, so that it is among the media.
  const { back, layers, ...front } = stack
  const behind = { ...back!.exit, widthNm: 0 }
  const { media, stack: waves } = lightSystem(
    { ...front, layers: [...layers, behind] },
    from,
    from === 'exit' ? layers.length : null,
  )
  const last = layers.length
  const system = { media, stack: { ...waves, medium: waves.medium.slice(0, last), width: waves.width.slice(0, last) } }
  return { system, back: waves.medium[last] }
}

function lightSystem(
  { entry, layers, exit, angleDeg = 0, polarisation = 's' }: LightStack,
  from: Side,
  fromLayer: number | null = null,
): WaveSystem {
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
  return {
    stack,
    media: lightMedia(media, {
      medium: fromLayer === null ? stack[from] : stack.medium[fromLayer],
      angleDeg,
      polarisation,
    }),
  }
}

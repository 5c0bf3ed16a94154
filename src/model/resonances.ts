import { type Pole, resonances as polesOf } from '../wave/index.js'
import { StackError } from './StackError.js'
import { systemOf } from './systemOf.js'
import type { ElectronStack, LightStack } from './types.js'

/** Poles in ascending order, and whether an independent count found as many. */
export interface ResonanceList extends Array<Pole> {
  complete: boolean
  counted: number | null
}

/**
 * Every resonance of a stack with its energy in `rangeEv` and Gamma/2 below `depthEv` (0.02), ascending; photon energies for
 * light. The list also says `complete`: false where the count by winding disagrees with it. Throws StackError as spectrum does for
 * the stack, and for a range or a depth that is empty, not finite or, for light, not above 0.
 */
export function resonances(
  stack: ElectronStack | LightStack,
  rangeEv: readonly [number, number],
  { depthEv = 0.02 }: { readonly depthEv?: number } = {},
): ResonanceList {
  const system = systemOf(stack)
  const [low, high] = rangeEv
  if (!(Number.isFinite(low) && Number.isFinite(high) && low < high)) {
    throw new StackError(`The range is ${low}..${high} eV. Give two finite numbers, the lower first.`)
  }
  if (stack.kind === 'light' && !(low > 0)) {
    throw new StackError(`The range starts at ${low} eV. Photon energies are above 0.`)
  }
  if (!(depthEv > 0 && depthEv < Number.POSITIVE_INFINITY)) {
    throw new StackError(`The depth is ${depthEv} eV. Give a finite number above 0.`)
  }
  const { poles, complete, counted } = polesOf(system, rangeEv, { depthEv, count: true })
  return Object.assign([...poles], { complete, counted })
}

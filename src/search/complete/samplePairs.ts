import { randomStream } from '../../growth/index.js'
import type { SearchChain, SearchPlace } from '../types.js'
import { HalfList, rangeOf, writeChoices } from './HalfVectors.js'
import type { Half, Split } from './splitChain.js'

/** Some choices of the common places, each with a sample of both halves: every pair of them is a sample of the stacks. */
export interface PairSample {
  readonly common: number
  readonly sliced: HalfList
  readonly held: HalfList
}

/** `each`: so many halves of either side in all. The same for the same arguments. */
export function samplePairs(
  chain: SearchChain,
  split: Split,
  places: readonly SearchPlace[],
  each: number,
): PairSample[] {
  const stream = randomStream('pairs')
  const blocks = Math.min(split.commons, 16)
  const size = Math.ceil(each / blocks)
  return Array.from({ length: blocks }, () => {
    const choice = new Int32Array(places.length)
    const common = Math.floor(stream.uniform() * split.commons)
    writeChoices(common, split.common, places, choice)
    const list = (half: Half) => new HalfList(half, places, chain.labels, choice, drawn(half.size))
    return { common, sliced: list(split.sliced), held: list(split.held) }
  })

  function drawn(count: number): Int32Array {
    if (count <= size) return rangeOf(0, count)
    return Int32Array.from({ length: size }, () => stream.integer(count))
  }
}

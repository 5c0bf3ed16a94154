import { nearest } from '../media/index.js'
import type { Loose } from './checkShape.js'
import { shortened } from './problemAt.js'
import type { Reader } from './Reader.js'
import type { PlacedLayer } from './readStack.js'
import type { JobAsWritten } from './schema.js'

/** The first and last layer that the bias falls over, by their ids; the stack spans all when nothing is written. */
export function readBiasOver(
  written: Loose<JobAsWritten>['bias over'],
  layers: readonly PlacedLayer[],
  reader: Reader,
): readonly [string, string] | null {
  if (written === undefined) return null
  const { problems } = reader
  const path = ['bias over']
  const known = layers.flatMap(({ writtenId }) => writtenId ?? [])
  const places = written.map((id) => known.indexOf(id ?? ''))
  if (written.length !== 2) {
    problems.addAtKey(
      path,
      '"bias over" takes two ids, the first and the last layer.',
      'Write "bias over: [first, last]".',
    )
  } else if (places.includes(-1)) {
    const wrong = places.indexOf(-1)
    const near = nearest(written[wrong] ?? '', known)
    const remedy = near.length > 0 ? `Did you mean "${near[0]}"?` : 'Give the layer an id.'
    problems.add([...path, wrong], `There is no layer with the id "${shortened(written[wrong] ?? '')}".`, remedy)
  } else if (places[0] > places[1]) {
    problems.addAtKey(
      path,
      'The first layer stands behind the last.',
      `Write "bias over: [${written[1]}, ${written[0]}]".`,
    )
  } else return [written[0]!, written[1]!]
  return null
}

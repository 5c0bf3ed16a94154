import { nearest } from '../media/index.js'
import type { LayerSpec } from './job.js'
import { shortened } from './problemAt.js'
import type { Reader } from './Reader.js'
import type { PlacedLayer } from './readStack.js'
import type { Path } from './YamlSource.js'

/**
 * Gives every layer its id (`L1`, `L2`, ... in the order of the file where none is written) and leads each `like` to the
 * layer that is described in full, however many ties lie between. Reports ids that stand twice, ties to nothing, to a
 * period, to itself and in a circle.
 */
export function tieLayers(
  layers: readonly PlacedLayer[],
  periods: ReadonlyMap<string, Path>,
  reader: Reader,
): ReadonlyMap<LayerSpec, LayerSpec> {
  const { problems } = reader
  const byId = new Map<string, PlacedLayer>()
  const taken = new Set(periods.keys())
  for (const layer of layers) {
    if (layer.writtenId === null) continue
    if (taken.has(layer.writtenId)) duplicate(layer.writtenId, layer.path)
    taken.add(layer.writtenId)
    if (!byId.has(layer.writtenId)) byId.set(layer.writtenId, layer)
  }
  const circled = new Set<PlacedLayer>()
  const tied = new Map<LayerSpec, LayerSpec>()
  layers.forEach((layer, i) => {
    const like = layer.spec.like === null ? null : rootOf(layer)
    tied.set(layer.spec, { ...layer.spec, id: layer.writtenId ?? freeId(i + 1), like })
  })
  return tied

  function rootOf(layer: PlacedLayer): string | null {
    const path = [...layer.path, 'like']
    const first = layer.spec.like!
    if (first === layer.writtenId) {
      problems.add(
        path,
        `The layer "${shortened(first)}" is tied to itself.`,
        'Tie it to another layer, or describe it.',
      )
      return null
    }
    const seen = new Set<PlacedLayer>([layer])
    let id = first
    for (;;) {
      const next = byId.get(id)
      if (!next) {
        if (id === first) unknown(id, path)
        return null
      }
      if (next.spec.like === null) return id
      if (seen.has(next)) {
        if (circled.has(next)) return null
        for (const one of seen) circled.add(one)
        const circle = [...seen].map((one) => one.writtenId ?? 'this one').join(', ')
        problems.add(path, `The ties run in a circle: ${circle}.`, 'Describe one of these layers in full.')
        return null
      }
      seen.add(next)
      id = next.spec.like
    }
  }

  function unknown(id: string, path: Path): void {
    if (periods.has(id)) {
      problems.add(path, `"${shortened(id)}" is a period; "like" ties single layers.`, 'Name a layer inside it.')
      return
    }
    const near = nearest(id, [...byId.keys()])
    const known = [...byId.keys()].slice(0, 20).join(', ')
    const remedy =
      near.length > 0
        ? `Did you mean "${near[0]}"?`
        : known
          ? `Ids here: ${known}.`
          : 'Give the layer that is meant an id.'
    problems.add(path, `There is no layer with the id "${shortened(id)}".`, remedy)
  }

  function duplicate(id: string, path: Path): void {
    problems.add(
      [...path, 'id'],
      `The id "${shortened(id)}" stands twice.`,
      'Give each layer an id of its own; "like" repeats a layer.',
    )
  }

  /** A written id may look like one of ours. */
  function freeId(number: number): string {
    let id = `L${number}`
    while (taken.has(id)) id += 'a'
    return id
  }
}

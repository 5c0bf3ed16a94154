import { nearest } from '../media/index.js'
import type { LayerSpec } from './job.js'
import { shortened } from './problemAt.js'
import type { Reader } from './Reader.js'
import type { PlacedLayer } from './readStack.js'
import type { Path } from './YamlSource.js'

/**
 * Gives every layer its id (`L1`, `L2`, ... in the order of the file where none is written) and leads each `like` to the
 * layer that is described in full, however many ties lie between; a width or a composition that is tied alone to the one that it follows. Reports ids that stand twice, ties to nothing, to a
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
    const like = layer.spec.like === null ? null : rootOf(layer, layer.spec.like, [...layer.path, 'like'])
    const own = { ...layer.spec, id: layer.writtenId ?? freeId(i + 1), like }
    tied.set(layer.spec, withWidth(withComposition(own, layer), layer))
  })
  return tied

  /** The width that a tied one follows, so many times. */
  function withWidth(spec: LayerSpec, layer: PlacedLayer): LayerSpec {
    if (!spec.widthLike) return spec
    const path = [...layer.path, 'width', 'like']
    const found = described(layer, spec.widthLike.like, path, ({ spec: one }) => one.widthLike?.like ?? one.like)
    if (found === null) return spec
    let { times } = spec.widthLike
    for (let at = byId.get(spec.widthLike.like)!; at.spec.widthLike; at = byId.get(at.spec.widthLike.like)!)
      times *= at.spec.widthLike.times
    const { width } = found.spec
    if (width === null) return spec
    const scaled = { ...width, from: times * width.from, to: times * width.to, step: width.step && times * width.step }
    if (width.unit === 'ML') {
      if (spec.media?.some(({ kind }) => kind !== 'material')) {
        const rule = `"${shortened(found.writtenId!)}" counts monolayers, which a medium given by numbers does not have.`
        problems.add(path, rule, 'Give this layer a width of its own, in nm.')
        return spec
      }
      const step = width.step ?? 1
      if (![scaled.from, scaled.to, times * step].every(Number.isInteger)) {
        const rule = `${times} times "${width.from}..${width.to} ML" are not whole monolayers.`
        problems.add([...layer.path, 'width'], rule, 'Write a whole number of times, or a step that makes them whole.')
        return spec
      }
      scaled.step = times * step
    }
    return { ...spec, width: scaled, widthLike: { like: found.writtenId!, times } }
  }

  /** The compositions that a tied one follows. */
  function withComposition(spec: LayerSpec, layer: PlacedLayer): LayerSpec {
    if (spec.xLike === undefined) return spec
    const path = [...layer.path, 'x', 'like']
    const found = described(layer, spec.xLike, path, ({ spec: one }) => one.xLike ?? one.like)
    if (found === null) return spec
    const [theirs] = found.spec.media ?? []
    const [mine] = spec.media ?? []
    const single = spec.media?.length === 1 && found.spec.media?.length === 1
    if (!single || mine?.kind !== 'material' || theirs?.kind !== 'material' || theirs.x === null) {
      if (spec.media && found.spec.media) {
        const rule = `"${shortened(found.writtenId!)}" has no composition of one alloy that could be followed.`
        problems.add(path, rule, 'Name a layer of one alloy, or write "x: 0.3".')
      }
      return spec
    }
    return { ...spec, media: [{ ...mine, x: theirs.x }], xLike: found.writtenId! }
  }

  /** The layer at the end of a chain of ties. */
  function described(
    layer: PlacedLayer,
    first: string,
    path: Path,
    next: (layer: PlacedLayer) => string | null,
  ): PlacedLayer | null {
    const id = rootOf(layer, first, path, next)
    return id === null ? null : (byId.get(id) ?? null)
  }

  function rootOf(
    layer: PlacedLayer,
    first: string,
    path: Path,
    follow: (layer: PlacedLayer) => string | null = ({ spec }) => spec.like,
  ): string | null {
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
      const further = follow(next)
      if (further === null) return id
      if (seen.has(next)) {
        if (circled.has(next)) return null
        for (const one of seen) circled.add(one)
        const circle = [...seen].map((one) => one.writtenId ?? 'this one').join(', ')
        problems.add(path, `The ties run in a circle: ${circle}.`, 'Describe one of these layers in full.')
        return null
      }
      seen.add(next)
      id = further
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

import { isMaterial, needsX } from '../media/index.js'
import { elementsOf, reachableX } from './cells.js'
import type { Loose } from './checkShape.js'
import type { GrowthSpec, Source } from './job.js'
import { shortened } from './problemAt.js'
import type { Reader } from './Reader.js'
import type { PlacedLayer } from './readStack.js'
import type { JobAsWritten } from './schema.js'

/** The elements whose cells set the rate; the group V comes in excess. */
const elements = ['Al', 'Ga', 'In'] as const

/** A composition that the cells miss by more than this is not the layer that was asked for. */
const reach = 0.01

const defaultSpread = { rate: 0.01, layer: { value: 0.5, unit: 'ML' }, x: 0.005 } as const

type Growth = Loose<JobAsWritten>['growth']

/** What the machine can grow; the layers are held against its cells. */
export function readGrowth(
  growth: Growth,
  stepNm: number | null,
  layers: readonly PlacedLayer[],
  sources: readonly (Source | null)[],
  reader: Reader,
): GrowthSpec {
  const { problems } = reader
  const path = ['growth']
  if (growth?.sources !== undefined && sources.every((source) => source !== null)) {
    const cells = sources as readonly Source[]
    for (const layer of layers) checkCells(layer, cells, reader)
  }
  const compositions =
    growth?.compositions === undefined ? null : reader.whole(growth.compositions, [...path, 'compositions'], 1, 1000)
  const trials =
    growth?.trials === undefined ? 2048 : (reader.whole(growth.trials, [...path, 'trials'], 1, 1_000_000) ?? 2048)
  return {
    startsAt: growth?.['starts at'] ?? 'exit',
    sources: sources.filter((source): source is Source => source !== null),
    compositions,
    stepNm,
    spread: readSpread(growth?.spread, reader),
    assumed: !problems.source.has(['growth', 'spread']),
    trials,
  }
}

/** growth.step, which the widths need before the rest of the growth is read. */
export function readStep(growth: Growth, reader: Reader): number | null {
  const path = ['growth', 'step']
  const step = reader.single(growth?.step, path, 'length')
  if (step === null || (step >= 1e-4 && step <= 1000)) return step
  reader.complain(path, 'is outside 0.0001..1000 nm', 'Write a step like "0.1 nm".')
  return null
}

function readSpread(spread: NonNullable<Growth>['spread'], reader: Reader): GrowthSpec['spread'] {
  const path = ['growth', 'spread']
  const rate = limited(reader.single(spread?.rate, [...path, 'rate'], 'percent'), 'rate', 0.5, '0..50 %')
  const x = limited(reader.single(spread?.x, [...path, 'x'], 'plain'), 'x', 0.5, '0..0.5')
  const layer = reader.quantity(spread?.layer, [...path, 'layer'], 'layerError')
  if (layer?.range) reader.complain([...path, 'layer'], 'is a range, where one number is expected', 'Write "0.5 ML".')
  const value = limited(layer?.to ?? null, 'layer', 100, '0..100')
  return {
    rate: rate ?? defaultSpread.rate,
    layer: layer && value !== null ? { value, unit: layer.unit === 'ML' ? 'ML' : 'nm' } : defaultSpread.layer,
    x: x ?? defaultSpread.x,
  }

  function limited(value: number | null, key: string, most: number, limits: string): number | null {
    if (value === null || (value >= 0 && value <= most)) return value
    reader.complain([...path, key], `is outside ${limits}`, 'Write one standard deviation.')
    return null
  }
}

/** growth.sources, from which compositions may be taken; null for one that is not in order. */
export function readSources(sources: NonNullable<Growth>['sources'], reader: Reader): (Source | null)[] {
  const { problems } = reader
  return Object.entries(sources ?? {}).map(([name, value]) => {
    const path = ['growth', 'sources', name]
    const element = elements.find((one) => name === one || name.startsWith(`${one}-`))
    if (element === undefined || !/^[A-Z][a-z](-[A-Za-z0-9]{1,20})?$/.test(name)) {
      const rule = `"${shortened(name)}" names no cell.`
      problems.addAtKey(path, rule, `Write an element (${elements.join(', ')}), or an element and a cell, like "Al-1".`)
      return null
    }
    const rateMlPerS = reader.single(value, path, 'rate')
    if (rateMlPerS === null) return null
    if (!(rateMlPerS > 0 && rateMlPerS <= 1000)) {
      reader.complain(path, 'is no rate', 'Write monolayers a second, like "0.70 ML/s".')
      return null
    }
    return { name, element, rateMlPerS }
  })
}

/** Every material of a layer needs a cell for each of its elements, and every composition has to be within their reach. */
function checkCells(layer: PlacedLayer, cells: readonly Source[], reader: Reader): void {
  const { problems } = reader
  for (const option of layer.spec.media ?? []) {
    if (option.kind !== 'material' || !isMaterial(option.material)) continue
    const { material, x } = option
    const needed = elementsOf(material)
    const missing = needed.filter((element) => cells.every((cell) => cell.element !== element))
    if (missing.length > 0) {
      const remedy = `Add "${missing[0]}: 0.70 ML/s" under growth.sources, or choose another material.`
      problems.add(
        [...layer.path, 'material'],
        `${material} needs ${missing.join(' and ')}, and there is no such cell.`,
        remedy,
      )
      continue
    }
    if (x === null || !needsX(material)) continue
    const reachable = reachableX(needed, cells)
    const off = x.filter((value) => reachable.every((near) => Math.abs(near - value) > reach + 1e-12))
    if (off.length === 0) continue
    const list = reachable.map((value) => Number(value.toFixed(4)))
    const first = off.slice(0, 3).join(', ')
    problems.add(
      [...layer.path, 'x'],
      `The cells can't grow ${material} of x = ${first}${off.length > 3 ? ', ...' : ''} to within ${reach}.`,
      `They reach x = ${list.join(', ')}: choose of these, or change growth.sources.`,
    )
  }
}

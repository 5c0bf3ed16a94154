import { isMaterial, isOptical, nearest, needsX, opticalNames } from '../media/index.js'
import { elementsOf, reachableX } from './cells.js'
import type { Loose } from './checkShape.js'
import type { GrowthSpec, Kind, MediumOption, Source, Spread } from './job.js'
import { shortened } from './problemAt.js'
import type { Reader } from './Reader.js'
import type { KnownMedia } from './readMedia.js'
import type { PlacedLayer } from './readStack.js'
import type { JobAsWritten } from './schema.js'
import type { Path } from './YamlSource.js'

/** The elements whose cells set the rate; the group V comes in excess. */
const elements = ['Al', 'Ga', 'In'] as const

/** A composition that the cells miss by more than this is not the layer that was asked for. */
const reach = 0.01

const defaultSpread: Readonly<Record<Kind, Spread>> = {
  electron: { rate: 0.01, layer: { value: 0.5, unit: 'ML' }, x: 0.005, index: 0 },
  light: { rate: 0.005, layer: { value: 0.2, unit: 'nm' }, x: 0, index: 0 },
}

type Growth = Loose<JobAsWritten>['growth']

/** What the machine can grow; the layers are held against its cells. */
export function readGrowth(
  growth: Growth,
  stepNm: number | null,
  layers: readonly PlacedLayer[],
  sources: readonly (Source | null)[],
  kind: Kind,
  reader: Reader,
): GrowthSpec {
  const { problems } = reader
  const path = ['growth']
  if (growth?.sources !== undefined && sources.every((source) => source !== null)) {
    const cells = sources as readonly Source[]
    for (const layer of layers) {
      if (kind === 'electron') checkCells(layer, cells, reader)
      else checkDeposition(layer, cells, reader)
    }
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
    thinnestNm: readLength(growth?.thinnest, 'thinnest'),
    totalNm: readTotal(),
    strain: readStrain(),
    critical: growth?.critical ?? false,
    tooling: readTooling(),
    spread: readSpread(growth?.spread, growth?.index, kind, reader),
    assumed: !problems.source.has(['growth', 'spread']),
    trials,
  }

  function readStrain(): number | null {
    const strain = reader.single(growth?.strain, [...path, 'strain'], 'percent')
    if (strain === null || (strain > 0 && strain <= 0.2)) return strain
    reader.complain([...path, 'strain'], 'is outside 0..20 %', 'Write the greatest mean strain, like "0.5 %".')
    return null
  }

  function readTooling(): Record<string, number> {
    const found: Record<string, number> = {}
    for (const [name, factor] of Object.entries(growth?.tooling ?? {})) {
      const place = [...path, 'tooling', name]
      const inUse = layers.some(({ spec }) => spec.media?.some((option) => nameOf(option) === name))
      if (!inUse)
        problems.addAtKey(
          place,
          `No layer is made of "${shortened(name)}".`,
          'Write the name of a medium of the stack.',
        )
      else if (factor === undefined || !(factor >= 0.01 && factor <= 100))
        reader.complain(place, 'is no factor', 'Write thickness on the part over that on the monitor, like 1.05.')
      else found[name] = factor
    }
    return found
  }

  function readLength(value: string | number | undefined, key: string): number | null {
    const nm = reader.single(value, [...path, key], 'length')
    if (nm === null || nm > 0) return nm
    reader.complain([...path, key], 'is not above 0', 'Write a thickness like "8 nm", or take it out.')
    return null
  }

  /** `..6 um`, or both ends. */
  function readTotal(): readonly [number, number] | null {
    const total = reader.quantity(growth?.total, [...path, 'total'], 'length')
    if (total === null) return null
    const written = `${total.written[1]} ${total.unit}`
    if (!total.range)
      reader.complain([...path, 'total'], 'is one number, where a range is expected', `Write "..${written}".`)
    else if (total.step !== null) reader.complain([...path, 'total'], 'takes no step', `Write "..${written}".`)
    else if (total.from < 0) reader.complain([...path, 'total'], 'is negative', `Write "..${written}".`)
    else return [total.from, total.to]
    return null
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

function readSpread(
  spread: NonNullable<Growth>['spread'],
  writtenIndex: number | undefined,
  kind: Kind,
  reader: Reader,
): Spread {
  const path = ['growth', 'spread']
  const assumed = defaultSpread[kind]
  const rate = limited(reader.single(spread?.rate, [...path, 'rate'], 'percent'), 'rate', 0.5, '0..50 %')
  const x = limited(reader.single(spread?.x, [...path, 'x'], 'plain'), 'x', 0.5, '0..0.5')
  const layer = reader.quantity(spread?.layer, [...path, 'layer'], 'layerError')
  if (layer?.range) reader.complain([...path, 'layer'], 'is a range, where one number is expected', 'Write "0.5 ML".')
  if (layer?.unit === 'ML' && kind === 'light')
    reader.complain([...path, 'layer'], 'is in monolayers, which films do not have', 'Write nm, like "0.2 nm".')
  const value = limited(layer?.to ?? null, 'layer', 100, '0..100')
  return {
    rate: rate ?? assumed.rate,
    layer: layer && value !== null ? { value, unit: layer.unit === 'ML' ? 'ML' : 'nm' } : assumed.layer,
    x: x ?? assumed.x,
    index: readIndexSpread(),
  }

  function readIndexSpread(): number {
    const index = writtenIndex ?? 0
    if (!(index >= 0 && index <= 1))
      reader.complain(['growth', 'index'], 'is outside 0..1', 'Write one standard deviation.')
    return index
  }

  function limited(value: number | null, key: string, most: number, limits: string): number | null {
    if (value === null || (value >= 0 && value <= most)) return value
    reader.complain([...path, key], `is outside ${limits}`, 'Write one standard deviation.')
    return null
  }
}

/** growth.sources, from which compositions may be taken; null for one that is not in order. */
export function readSources(
  sources: NonNullable<Growth>['sources'],
  media: KnownMedia,
  reader: Reader,
): (Source | null)[] {
  const { problems } = reader
  return Object.entries(sources ?? {}).map(([name, value]) => {
    const path = ['growth', 'sources', name]
    if (media.kind === 'light') return filmSource(name, value, path)
    const element = elements.find((one) => name === one || name.startsWith(`${one}-`))
    if (element === undefined || !/^[A-Z][a-z](-[A-Za-z0-9]{1,20})?$/.test(name)) {
      const rule = `"${shortened(name)}" names no cell.`
      problems.addAtKey(path, rule, `Write an element (${elements.join(', ')}), or an element and a cell, like "Al-1".`)
      return null
    }
    const rate = reader.single(value, path, 'rate')
    if (rate === null) return null
    if (!(rate > 0 && rate <= 1000)) {
      reader.complain(path, 'is no rate', 'Write monolayers a second, like "0.70 ML/s".')
      return null
    }
    return { name, element, rate }
  })

  function filmSource(name: string, value: string | number | undefined, path: Path): Source | null {
    if (!media.own.has(name) && !isOptical(name)) {
      const near = nearest(name, [...media.own.keys(), ...opticalNames])
      const remedy =
        near.length > 0 ? `Did you mean ${near.join(' or ')}?` : 'Write the name of a material of the stack.'
      problems.addAtKey(path, `"${shortened(name)}" names no material.`, remedy)
      return null
    }
    const rate = reader.single(value, path, 'filmRate')
    if (rate === null) return null
    if (rate > 0 && rate <= 1000) return { name, element: name, rate }
    reader.complain(path, 'is no rate', 'Write nanometres a second, like "0.5 nm/s".')
    return null
  }
}

function nameOf(option: MediumOption): string | null {
  return option.kind === 'material' ? (option.own?.name ?? option.material) : option.name
}

/** Every material of a layer needs a source; media by numbers alone have none. */
function checkDeposition({ path, spec }: PlacedLayer, sources: readonly Source[], reader: Reader): void {
  for (const option of spec.media ?? []) {
    const name = nameOf(option)
    const names = [name, option.kind === 'material' ? option.material : null]
    if (name === null || sources.some((source) => names.includes(source.element))) continue
    reader.problems.add(
      [...path, 'material'],
      `${name} has no rate under growth.sources.`,
      `Add "${name}: 0.5 nm/s" there, or choose another material.`,
    )
  }
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

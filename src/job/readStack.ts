import { isMaterial, materialNames, nearest, needsX } from '../media/index.js'
import { elementsOf, reachableX } from './cells.js'
import type { Loose } from './checkShape.js'
import type { LayerSpec, MediumOption, PeriodSpec, Source, StackItem, StackSpec } from './job.js'
import { shortened } from './problemAt.js'
import type { Reader } from './Reader.js'
import { readLead } from './readLead.js'
import { isAlloy, type KnownMedia, readComposition, readNamed, readNumbers } from './readMedia.js'
import { readWidth } from './readWidth.js'
import type { ItemAsWritten, JobAsWritten } from './schema.js'
import { tieLayers } from './tieLayers.js'
import type { Path } from './YamlSource.js'

/** A layer as it was read, with the place of its parts: growth has something to say about them later. */
export interface PlacedLayer {
  readonly path: Path
  readonly writtenId: string | null
  readonly spec: LayerSpec
}

/** A stack with every layer of it in the order of the file; the parts that were wrong are missing. */
export interface ReadStack {
  readonly spec: StackSpec | null
  readonly layers: readonly PlacedLayer[]
}

const mostRepeats = 1000

/** More layers than this, repetitions counted, no machine grows in a night. */
const mostLayers = 2000

type Item = Loose<ItemAsWritten>

export function readStack(
  stack: Loose<JobAsWritten>['stack'],
  media: KnownMedia,
  stepNm: number | null,
  cells: readonly Source[],
  /** Where quarter waves are counted if the stack does not say; null where there is no scan. */
  middleNm: number | null,
  reader: Reader,
): ReadStack {
  const { problems } = reader
  const layers: PlacedLayer[] = []
  const periods = new Map<string, Path>()
  const electrons = media.kind === 'electron'
  const own: OwnIds = { suffix: '', ids: new Set() }
  const counted = new Map<string, readonly [number, number]>()
  const following: { readonly spec: PeriodSpec; readonly path: Path }[] = []
  if (stack === undefined) return { spec: null, layers }
  const entry = readLead(stack.entry, 'entry', media, reader) as MediumOption | null
  const exit = readLead(stack.exit, 'exit', media, reader)
  const before = problems.count
  const items = stack.layers ? readItems(stack.layers, ['stack', 'layers']) : null
  const mirror = readMirror(stack.mirror, stack.layers, ['stack', 'mirror'])
  const tied = tieLayers(layers, periods, reader)
  const counts = tieCounts()
  if (items && problems.count === before && countLayers(items, mirror) > mostLayers) {
    problems.addAtKey(['stack', 'layers'], `The stack has more than ${mostLayers} layers.`, 'Repeat less.')
  }
  const strainedTo = readStrain(stack['strained to'])
  const referenceNm = electrons ? null : readReference(stack.reference)
  const back = stack.back === undefined ? null : readBack(stack.back)
  commonZero()
  if (!entry || !exit || !items) return { spec: null, layers }
  const spec: StackSpec = {
    entry,
    exit,
    layers: items.map((item) => withTies(item, tied, counts)),
    mirror,
    massModel: stack.mass ?? 'two-band',
    strainedTo,
    biasOver: null,
    rising: readRising(stack.rising),
    referenceNm,
    back,
  }
  return { spec, layers }

  function readItems(written: readonly (Item | undefined)[], path: Path): StackItem[] {
    if (written.length === 0) {
      const what = path.length > 2 ? 'The period has no layers.' : 'The stack has no layers.'
      const like = electrons ? '{ material: GaAs, width: 10..30 ML }' : '{ material: SiO2, width: 20..200 nm }'
      problems.add(path, what, `Write at least one, like "- ${like}".`)
    }
    return written.flatMap((item, i) => (item === undefined ? [] : readItem(item, [...path, i])))
  }

  function readItem(item: Item, path: Path): StackItem[] {
    const form = formOf(item, path)
    for (const key of Object.keys(item)) {
      if (form === null || forms[form].includes(key)) continue
      problems.addAtKey([...path, key], `"${key}" has no place in ${meaning[form]}.`, misplaced(form, key, electrons))
    }
    const id = ownId(readId(item.id, [...path, 'id']))
    if (form === 'period') return item.alike === false ? readUnlike(item, path) : [readPeriod(item, id, path)]
    const media = form === 'material' ? readMaterial(item, path) : form === 'numbers' ? byNumbers(item, path) : null
    if (form !== 'like' && form !== null && !problems.source.has([...path, 'width'])) {
      problems.add(
        [...path, 'width'],
        '"width" is missing: a layer has a width, fixed or a range.',
        electrons ? 'Add "width: 6..20 ML".' : 'Add "width: 20..200 nm".',
      )
    }
    // A tied width or composition waits for the layer that it follows.
    const text = typeof item.width === 'object' ? undefined : item.width
    const widthLike = typeof item.width === 'object' ? readTie(item.width, [...path, 'width']) : null
    const tiedX = typeof item.x === 'object' && 'like' in item.x ? readTie(item.x, [...path, 'x']) : null
    if (tiedX && tiedX.times !== 1)
      problems.addAtKey([...path, 'x', 'times'], '"times" belongs to a width.', 'Take it out.')
    const width = form === 'like' ? null : readWidth(text, [...path, 'width'], media, stepNm, electrons, reader)
    const like =
      form === 'like' && item.like !== undefined ? (own.ids.has(item.like) ? ownId(item.like) : item.like) : null
    const ties = { ...(widthLike ? { widthLike } : {}), ...(tiedX ? { xLike: tiedX.like } : {}) }
    const spec: LayerSpec = { kind: 'layer', id: id ?? '', like, media, width, ...ties }
    layers.push({ path, writtenId: id, spec })
    return [spec]
  }

  function readTie(
    { like, times = 1 }: { readonly like?: string; readonly times?: number },
    path: Path,
  ): { readonly like: string; readonly times: number } | null {
    if (!(times > 0 && times <= 1000)) {
      reader.complain([...path, 'times'], 'is outside 0..1000', 'Write a number above 0, like 2 or 0.5.')
      return null
    }
    return like === undefined ? null : { like: own.ids.has(like) ? ownId(like)! : like, times }
  }

  /** An id inside a period whose repetitions are not alike stands once for each: with the number behind it. */
  function ownId(id: string | null): string | null {
    return id === null ? null : `${id}${own.suffix}`
  }

  /** A period whose repetitions have widths and media of their own: its layers written out. */
  function readUnlike(item: Item, path: Path): StackItem[] {
    const repeat = readRepeat(item.repeat, [...path, 'repeat'])
    for (const key of ['mirror', 'id'] as const) {
      if (item[key] === undefined) continue
      problems.addAtKey([...path, key], `"${key}" has no place in a period that is not alike.`, 'Take it out.')
    }
    if (repeat && repeat[0] !== repeat[1]) {
      const rule = 'A period that is not alike has a fixed count.'
      problems.add([...path, 'repeat'], rule, `Write "repeat: ${repeat[1]}", with widths that may be 0.`)
      return []
    }
    if (!item.period || !repeat) {
      if (!repeat && item.repeat === undefined) missingOf(path, 'repeat')
      if (!item.period) missingOf(path, 'period')
      return []
    }
    const { suffix, ids } = own
    own.ids = new Set([...item.period, ...(item.between ?? [])].flatMap((inner) => inner?.id ?? []))
    const items: StackItem[] = []
    for (let i = 1; i <= repeat[0]; i++) {
      own.suffix = `${suffix}-${i}`
      if (i > 1 && item.between) items.push(...readItems(item.between, [...path, 'between']))
      items.push(...readItems(item.period, [...path, 'period']))
    }
    own.suffix = suffix
    own.ids = ids
    return items
  }

  function missingOf(path: Path, key: 'period' | 'repeat'): void {
    if (problems.source.has([...path, key])) return
    const what = key === 'repeat' ? '"repeat: 3"' : '"period:" with the layers of one period'
    problems.add([...path, key], `"${key}" is missing: a period says its layers and how often.`, `Add ${what}.`)
  }

  function readPeriod(item: Item, id: string | null, path: Path): PeriodSpec {
    if (id !== null) periods.set(id, path)
    missingOf(path, 'repeat')
    missingOf(path, 'period')
    const follows = typeof item.repeat === 'object' ? (item.repeat.like ?? null) : null
    const repeat = readRepeat(item.repeat, [...path, 'repeat'])
    const period = item.period ? readItems(item.period, [...path, 'period']) : []
    const mirror = readMirror(item.mirror, item.period, [...path, 'mirror'])
    const between = item.between ? readItems(item.between, [...path, 'between']) : []
    const spec: PeriodSpec = { kind: 'period', id, repeat: repeat ?? [1, 1], period, between, mirror }
    if (follows === null) {
      if (id !== null && repeat) counted.set(id, repeat)
      return spec
    }
    const tied = { ...spec, repeatLike: follows }
    following.push({ spec: tied, path: [...path, 'repeat', 'like'] })
    return tied
  }

  /** `3`, or `2..5`. */
  function readRepeat(repeat: Item['repeat'], path: Path): readonly [number, number] | null {
    if (typeof repeat === 'number') {
      const whole = reader.whole(repeat, path, 1, mostRepeats)
      return whole === null ? null : [whole, whole]
    }
    if (typeof repeat !== 'string') return null
    const match = /^\s*(\d{1,4})\s*\.\.\s*(\d{1,4})\s*$/.exec(repeat)
    const [from, to] = match ? [Number(match[1]), Number(match[2])] : [0, 0]
    if (match && from > to) reader.complain(path, 'runs downwards', `Write "${to}..${from}".`)
    else if (!(from >= 1 && to <= mostRepeats)) {
      reader.complain(
        path,
        `is no count within 1..${mostRepeats}`,
        'Write a whole number, like 5, or a range, like "2..5".',
      )
    } else return [from, to]
    return null
  }

  /** The range of the count that a tied one follows. */
  function tieCounts(): ReadonlyMap<PeriodSpec, readonly [number, number]> {
    const found = new Map<PeriodSpec, readonly [number, number]>()
    for (const { spec, path } of following) {
      const range = counted.get(spec.repeatLike!)
      if (range !== undefined) {
        found.set(spec, range)
        continue
      }
      const ids = [...counted.keys()]
      const near = nearest(spec.repeatLike!, ids)
      const self = spec.repeatLike === spec.id
      const rule = self
        ? `The period "${shortened(spec.repeatLike!)}" is tied to itself.`
        : `There is no period with the id "${shortened(spec.repeatLike!)}" and a count of its own.`
      const remedy =
        near.length > 0 ? `Did you mean "${near[0]}"?` : 'Give the period that is meant an id, like "id: mirror".'
      problems.add(path, rule, remedy)
    }
    return found
  }

  function readMaterial(item: Item, path: Path): readonly MediumOption[] | null {
    const xPath = [...path, 'x']
    const hasX = electrons && problems.source.has(xPath)
    const fromSources = typeof item.x === 'object' && 'from' in item.x
    const tiedX = typeof item.x === 'object' && 'like' in item.x
    const x = fromSources ? null : readComposition(item.x, xPath, reader)
    const { material } = item
    if (material === undefined) return null
    const picked = typeof material === 'string' ? null : (material.pick ?? [])
    const names = picked ?? [material as string]
    const placeOf = (i: number) => [...path, 'material', ...(picked ? ['pick', i] : [])]
    if (names.length === 0)
      problems.add(
        [...path, 'material'],
        'The list of materials is empty.',
        electrons ? 'Write "material: { pick: [GaAs, AlAs] }".' : 'Write "material: { pick: [SiO2, MgF2] }".',
      )
    const options: MediumOption[] = []
    names.forEach((name, i) => {
      if (name === undefined) return
      if (names.indexOf(name) < i) {
        problems.add(placeOf(i), `${shortened(name)} stands twice in the list.`, 'Keep one of the two.')
        return
      }
      const reached = fromSources && isAlloy(name, media) ? reachedBy(name, xPath) : x
      const option = readNamed(name, placeOf(i), reached, media, reader)
      if (option) options.push(option)
    })
    const known = names.filter((name): name is string => name !== undefined)
    const alloys = known.filter((name) => isAlloy(name, media))
    if (alloys.length > 0 && !hasX) {
      problems.add(
        xPath,
        `${alloys[0]} is an alloy and needs a composition.`,
        'Add "x: 0.3" or "x: { pick: [0.25, 0.35] }".',
      )
    }
    if (hasX && alloys.length === 0 && options.length === known.length && known.length > 0) {
      problems.addAtKey(
        xPath,
        `${known.join(' and ')} has no composition to choose.`,
        `Take x out${alloyHint(known[0], media)}.`,
      )
    }
    const complete =
      options.length === names.length && names.length > 0 && (alloys.length === 0 || x !== null || fromSources || tiedX)
    return complete ? options : null
  }

  /** The compositions that the cells reach, to four digits: a machine sets no more. */
  function reachedBy(name: string, xPath: Path): readonly number[] {
    const reached = reachableX(elementsOf(name), cells).map((value) => Number(value.toFixed(4)))
    if (reached.length === 0) {
      const needed = elementsOf(name).join(' and ')
      problems.add(
        xPath,
        `growth.sources has no cells for ${needed}, from which ${name} could take its composition.`,
        'List them, like "sources: { Ga: 0.70 ML/s, Al-1: 0.233 ML/s }", or write "x: { pick: [0.25, 0.35] }".',
      )
    }
    return [...new Set(reached)]
  }

  function byNumbers(item: Item, path: Path): readonly MediumOption[] | null {
    const option = readNumbers(item, path, null, media.kind, reader)
    return option && [option]
  }

  function readId(id: string | undefined, path: Path): string | null {
    if (id === undefined) return null
    if (!/^[A-Za-z0-9][A-Za-z0-9_-]{0,39}$/.test(id)) {
      problems.add(path, `id "${shortened(id)}" is no id.`, 'Use letters, digits and dashes, at most 40.')
    }
    return id
  }

  function readMirror(
    mirror: boolean | undefined,
    items: readonly (Item | undefined)[] | undefined,
    path: Path,
  ): boolean {
    const last = items?.[items.length - 1]
    if (mirror && last !== undefined && (last.period !== undefined || last.repeat !== undefined)) {
      problems.add(
        path,
        '"mirror" reflects about the last layer, but a period stands last.',
        'End with the single layer in the middle of the stack.',
      )
    }
    return mirror ?? false
  }

  /** Ids of layers that are written with one; a tied layer stands for the layer that it follows. */
  function readRising(ids: readonly (string | undefined)[] | undefined): readonly string[] {
    if (ids === undefined) return []
    const path = ['stack', 'rising']
    if (ids.length < 2)
      problems.addAtKey(path, '"rising" orders two layers or more.', 'Write "rising: [first, second]".')
    const known = layers.flatMap(({ writtenId }) => writtenId ?? [])
    return ids.flatMap((id, i) => {
      if (id === undefined) return []
      if (known.includes(id)) return [id]
      const near = nearest(id, known)
      problems.add(
        [...path, i],
        `There is no layer with the id "${shortened(id)}".`,
        near.length > 0 ? `Did you mean "${near[0]}"?` : 'Give the layer an id.',
      )
      return []
    })
  }

  /** The middle of the scan where nothing is written. */
  function readReference(written: string | number | undefined): number | null {
    const path = ['stack', 'reference']
    const nm = reader.single(written, path, 'wavelength') ?? middleNm
    if (written !== undefined && nm !== null && !(nm > 0)) {
      reader.complain(path, 'is not above 0', 'Write a wavelength, like "633 nm".')
      return null
    }
    return nm
  }

  function readBack({ thickness, then }: NonNullable<NonNullable<typeof stack>['back']>): StackSpec['back'] {
    const path = ['stack', 'back']
    const thicknessNm = reader.single(thickness, [...path, 'thickness'], 'length')
    if (thicknessNm !== null && !(thicknessNm > 0))
      reader.complain([...path, 'thickness'], 'is not above 0', 'Write the thickness of the plate, like "1 mm".')
    const behind = readLead(then, 'back', media, reader)
    return thicknessNm === null || behind === null || behind === 'hard wall' ? null : { thicknessNm, behind }
  }

  function readStrain(name: string | undefined): string | null {
    if (name === undefined || name === 'none') return name ?? null
    const path = ['stack', 'strained to']
    const binaries = materialNames.filter((known) => !needsX(known))
    if (isMaterial(name) && !needsX(name)) return name
    const near = nearest(name, binaries)
    const remedy =
      near.length > 0 ? `Did you mean ${near.join(' or ')}?` : `Write none, or one of ${binaries.join(', ')}.`
    problems.add(path, `"${shortened(name)}" is no binary material to be strained to.`, remedy)
    return null
  }

  /** Offsets of materials are known to one another, plain numbers count from the entry: they can't be mixed the wrong way. */
  function commonZero(): void {
    if (entry?.kind !== 'numbers') return
    if (entry.potentialEv[0] !== 0) {
      const path = ['stack', 'entry', ...(problems.source.has(['stack', 'entry', 'potential']) ? ['potential'] : [])]
      problems.add(
        path,
        "The entry's potential is not 0, but every energy counts from the entry's own edge.",
        'Write "potential: 0 eV" and shift the others.',
      )
    }
    const remedy = 'Name a material as the entry, or give this by numbers too.'
    const rule = 'The entry is given by numbers, so that a material has no common zero of energy with it.'
    if (exit && exit !== 'hard wall' && exit.kind === 'material') problems.add(['stack', 'exit'], rule, remedy)
    for (const { path, spec } of layers) {
      if (spec.media?.some((option) => option.kind === 'material')) problems.add([...path, 'material'], rule, remedy)
    }
  }

  function formOf(item: Item, path: Path): Form | null {
    const stated = (key: string) => problems.source.has([...path, key])
    if (stated('like')) return 'like'
    if (stated('period') || stated('repeat')) return 'period'
    if (stated('material')) return 'material'
    if ((electrons ? (['potential', 'mass', 'alpha'] as const) : (['index', 'extinction'] as const)).some(stated))
      return 'numbers'
    // A key that was refused or unknown may have said it.
    if (problems.source.keyCount(path) > Object.keys(item).length) return null
    problems.add(
      path,
      'This layer says nothing of what it is made of.',
      `Add "material: ${electrons ? 'GaAs' : 'SiO2'}", numbers, or "like: id".`,
    )
    return null
  }
}

/** Ids of a period whose repetitions are not alike, and what the repetition that is being read puts behind them. */
interface OwnIds {
  suffix: string
  ids: ReadonlySet<string>
}

type Form = 'like' | 'period' | 'material' | 'numbers'

const forms: Readonly<Record<Form, readonly string[]>> = {
  like: ['id', 'like'],
  period: ['id', 'repeat', 'period', 'between', 'mirror', 'alike'],
  material: ['id', 'material', 'x', 'width'],
  numbers: ['id', 'potential', 'mass', 'alpha', 'index', 'extinction', 'width'],
}

const meaning: Readonly<Record<Form, string>> = {
  like: 'a layer with "like", which takes material, composition and width from the other',
  period: 'a period',
  material: 'a layer with "material"',
  numbers: 'a layer given by numbers',
}

function misplaced(form: Form, key: string, electrons: boolean): string {
  if (form === 'like') return `Take "${key}" out, or take "like" out and describe the layer in full.`
  if (form === 'period') return 'Put it on a layer inside "period".'
  if (key === 'mirror') return '"mirror" belongs to the stack or to a period.'
  if (key === 'alike') return '"alike" belongs to a period.'
  if (form === 'numbers' && key === 'x' && electrons)
    return 'Only materials have a composition: add "material: AlGaAs", or take x out.'
  return 'Give a material or numbers, not both.'
}

function alloyHint(name: string, media: KnownMedia): string {
  if (media.kind === 'light') return ''
  const alloys = materialNames.filter(
    (known) => needsX(known) && known.includes(name.slice(0, 2)) && !media.own.has(name),
  )
  return alloys.length > 0 ? `, or name an alloy (${alloys.join(', ')})` : ''
}

function countLayers(items: readonly StackItem[], mirror: boolean): number {
  const once = items.reduce((sum, item) => sum + (item.kind === 'layer' ? 1 : countRepeated(item)), 0)
  return mirror ? 2 * once - 1 : once
}

function countRepeated({ repeat, period, between, mirror }: PeriodSpec): number {
  return repeat[1] * countLayers(period, mirror) + (repeat[1] - 1) * countLayers(between, false)
}

/** Puts the layers as tied in the place of those that were read. */
function withTies(
  item: StackItem,
  tied: ReadonlyMap<LayerSpec, LayerSpec>,
  counts: ReadonlyMap<PeriodSpec, readonly [number, number]>,
): StackItem {
  if (item.kind === 'layer') return tied.get(item) ?? item
  const inside = (items: readonly StackItem[]) => items.map((inner) => withTies(inner, tied, counts))
  return {
    ...item,
    repeat: counts.get(item) ?? item.repeat,
    period: inside(item.period),
    between: inside(item.between),
  }
}

import { isMaterial, isOptical, materialNames, nearest, needsX, opticalNames } from '../media/index.js'
import type { Tables } from './CsvTable.js'
import type { Loose } from './checkShape.js'
import { stepped, stepsBetween } from './decimal.js'
import type { Kind, MediumOption, Override } from './job.js'
import { shortened } from './problemAt.js'
import type { DimensionName } from './quantities.js'
import type { Reader } from './Reader.js'
import { readTable } from './readTable.js'
import type { ItemAsWritten, JobAsWritten } from './schema.js'
import type { Path } from './YamlSource.js'

/** What a name in a job may mean. */
export interface KnownMedia {
  readonly kind: Kind
  /** The user's own; null where one is not in order. */
  readonly own: ReadonlyMap<string, MediumOption | null>
}

type Numbers = Loose<Pick<ItemAsWritten, 'potential' | 'mass' | 'alpha' | 'index' | 'extinction'>>
type Composition = Loose<ItemAsWritten>['x']

/** More choices than this of one number is no lattice to search. */
const mostChoices = 10_000

export function readMedia(media: Loose<JobAsWritten>['media'], kind: Kind, tables: Tables, reader: Reader): KnownMedia {
  const found = new Map<string, MediumOption | null>()
  for (const [name, numbers] of Object.entries(media ?? {})) {
    const path = ['media', name]
    if (!/^[A-Za-z][A-Za-z0-9_-]{0,39}$/.test(name)) {
      reader.problems.addAtKey(
        path,
        `"${shortened(name)}" is no name of a medium.`,
        'Use letters, digits and dashes, a letter first.',
      )
    }
    const medium = numbers === undefined ? null : readMedium(numbers, path, name)
    if (isBuiltIn(name, kind)) {
      reader.problems.addAtKey(path, `${name} is a built-in material.`, `Choose another name, like "my-${name}".`)
    } else found.set(name, medium)
  }
  return { kind, own: found }

  function readMedium(
    {
      table,
      material,
      x,
      ...numbers
    }: Numbers & {
      readonly table?: string
      readonly material?: string
      readonly x?: string | number
    },
    path: Path,
    name: string,
  ): MediumOption | null {
    if (material !== undefined) {
      if (table !== undefined)
        reader.problems.addAtKey([...path, 'table'], '"table" has no place beside "material".', 'Keep one of the two.')
      return readOverride(material, x, numbers, path, name)
    }
    if (x !== undefined)
      reader.problems.addAtKey(
        [...path, 'x'],
        '"x" belongs to a material, and none is named.',
        'Add "material: AlGaAs".',
      )
    if (table === undefined) return readNumbers(numbers, path, name, kind, reader)
    for (const key of Object.keys(numbers)) {
      reader.problems.addAtKey([...path, key], `"${key}" has no place beside "table".`, 'Keep one of the two.')
    }
    const rows = readTable(table, [...path, 'table'], tables, reader)
    return rows && { kind: 'table', name, rows }
  }

  /** A built-in material with single numbers of the user's own. */
  function readOverride(
    material: string,
    x: string | number | undefined,
    numbers: Numbers,
    path: Path,
    name: string,
  ): MediumOption | null {
    const known: KnownMedia = { kind, own: new Map() }
    const composition = x === undefined ? null : readComposition(x, [...path, 'x'], reader)
    const option = readNamed(material, [...path, 'material'], composition, known, reader)
    if (option?.kind !== 'material') return null
    if (isAlloy(material, known) && option.x === null) {
      if (x === undefined)
        reader.problems.add([...path, 'x'], `${material} is an alloy and needs a composition.`, 'Add "x: 0.3".')
      return null
    }
    const own: { -readonly [K in keyof Override]: Override[K] } = { name }
    for (const [key, dimension, limits, unit, as] of overridden) {
      const written = numbers[key]
      if (written === undefined) continue
      const values = choices(written, [...path, key], dimension, limits, unit, reader)
      if (values === null) continue
      if (values.length > 1)
        reader.complain([...path, key], 'is a range, where one number is expected', 'Write one number.')
      own[as] = values[0]
    }
    if (Object.keys(own).length === 1 && Object.keys(numbers).length === 0) {
      const what = kind === 'electron' ? '"mass: 0.146"' : '"index: 1.465"'
      reader.problems.add(
        path,
        `${name} is ${material} as it is listed.`,
        `Add what is different, like ${what}, or write ${material}.`,
      )
    }
    return { ...option, own }
  }
}

const overridden = [
  ['potential', 'energy', [-20, 20], 'eV', 'potentialEv'],
  ['mass', 'plain', [1e-4, 100], '', 'massRel'],
  ['alpha', 'nonparabolicity', [0, 1000], '/eV', 'alphaPerEv'],
  ['index', 'plain', [1e-3, 20], '', 'index'],
  ['extinction', 'plain', [0, 100], '', 'extinction'],
] as const

/** A medium by numbers; every number may be a range with a step. Null where one is missing or wrong. */
export function readNumbers(
  numbers: Numbers,
  path: Path,
  name: string | null,
  kind: Kind,
  reader: Reader,
): MediumOption | null {
  return kind === 'electron' ? readRegion(numbers, path, name, reader) : readIndex(numbers, path, name, reader)
}

/** n and, where it absorbs, kappa, at every wavelength. */
function readIndex(numbers: Numbers, path: Path, name: string | null, reader: Reader): MediumOption | null {
  const { problems } = reader
  const reported = problems.source.keyCount(path) > Object.keys(numbers).length
  if (!reported && !problems.source.has([...path, 'index'])) {
    const what = '"index" is missing: a medium of light by numbers needs it.'
    problems.add([...path, 'index'], what, 'Add "index: 1.46".')
  }
  const index = choices(numbers.index, [...path, 'index'], 'plain', [1e-3, 20], '', reader)
  const hasExtinction = problems.source.has([...path, 'extinction'])
  const extinction = hasExtinction
    ? choices(numbers.extinction, [...path, 'extinction'], 'plain', [0, 100], '', reader)
    : [0]
  return index && extinction ? { kind: 'index', name, index, extinction } : null
}

function readRegion(numbers: Numbers, path: Path, name: string | null, reader: Reader): MediumOption | null {
  const { problems } = reader
  // A key that was refused or unknown may have been meant for one of them.
  const reported = problems.source.keyCount(path) > Object.keys(numbers).length
  for (const key of ['potential', 'mass'] as const) {
    if (reported || problems.source.has([...path, key])) continue
    const what = key === 'mass' ? 'mass: 0.09' : 'potential: 0.2 eV'
    problems.add([...path, key], `"${key}" is missing: a medium by numbers needs potential and mass.`, `Add "${what}".`)
  }
  const potentialEv = choices(numbers.potential, [...path, 'potential'], 'energy', [-20, 20], 'eV', reader)
  const massRel = choices(numbers.mass, [...path, 'mass'], 'plain', [1e-4, 100], '', reader)
  const wantsAlpha = problems.source.has([...path, 'alpha'])
  const alphaPerEv = wantsAlpha
    ? choices(numbers.alpha, [...path, 'alpha'], 'nonparabolicity', [0, 1000], '/eV', reader)
    : [0]
  return potentialEv && massRel && alphaPerEv ? { kind: 'numbers', name, potentialEv, massRel, alphaPerEv } : null
}

/** What a name may mean: a medium of the user's, or a built-in material with the compositions that stand beside it. */
export function readNamed(
  name: string,
  namePath: Path,
  x: readonly number[] | null,
  media: KnownMedia,
  reader: Reader,
): MediumOption | null {
  const own = media.own.get(name)
  if (own !== undefined) return own
  if (!isBuiltIn(name, media.kind)) {
    const known = [...media.own.keys(), ...(media.kind === 'electron' ? materialNames : opticalNames)]
    if (isBuiltIn(name, media.kind === 'electron' ? 'light' : 'electron')) {
      const [other, own] = media.kind === 'electron' ? ['light', 'electron'] : ['electron', 'light']
      reader.problems.add(
        namePath,
        `${name} is listed for jobs with kind: ${other}.`,
        `Known for ${own}: ${known.slice(0, 40).join(', ')}.`,
      )
      return null
    }
    const near = nearest(name, known)
    const remedy = near.length > 0 ? `Did you mean ${near.join(' or ')}?` : `Known: ${known.slice(0, 40).join(', ')}.`
    reader.problems.add(namePath, `Unknown material "${shortened(name)}".`, remedy)
    return null
  }
  return { kind: 'material', material: name, x: media.kind === 'electron' && needsX(name) ? x : null }
}

export function isBuiltIn(name: string, kind: Kind): boolean {
  return kind === 'electron' ? isMaterial(name) : isOptical(name)
}

/** Whether a name needs an x beside it. */
export function isAlloy(name: string, { kind, own }: KnownMedia): boolean {
  return kind === 'electron' && !own.has(name) && isMaterial(name) && needsX(name)
}

/** The compositions of an alloy, ascending. Null where there are none or they are not in order. */
export function readComposition(x: Composition, path: Path, reader: Reader): readonly number[] | null {
  if (x === undefined) return null
  if (typeof x === 'string' || typeof x === 'number') return choices(x, path, 'plain', [0, 1], '', reader)
  if (!('pick' in x) || x.pick === undefined) return null
  const picked = x.pick.map((value, i) => {
    const here = [...path, 'pick', i]
    const single = reader.single(value, here, 'plain')
    return single !== null && within(single, [0, 1], '', here, reader) ? single : null
  })
  if (picked.length === 0)
    reader.problems.add([...path, 'pick'], 'The list of compositions is empty.', 'Write "x: { pick: [0.25, 0.35] }".')
  if (picked.includes(null) || picked.length === 0) return null
  return distinct(picked as number[], [...path, 'pick'], reader)
}

/** Sorted; a value that stands twice would be searched twice. */
function distinct(values: readonly number[], path: Path, reader: Reader): readonly number[] | null {
  const sorted = [...values].sort((a, b) => a - b)
  const twice = sorted.find((value, i) => i > 0 && value === sorted[i - 1])
  if (twice === undefined) return sorted
  reader.problems.add(path, `${twice} stands twice in the list.`, 'Keep one of the two.')
  return null
}

/** One number, or the values of a range with a step. */
function choices(
  value: string | number | undefined,
  path: Path,
  dimension: DimensionName,
  limits: readonly [number, number],
  unit: string,
  reader: Reader,
): readonly number[] | null {
  const quantity = reader.quantity(value, path, dimension)
  if (quantity === null) return null
  const { from, to, step } = quantity
  if (!within(from, limits, unit, path, reader) || !within(to, limits, unit, path, reader)) return null
  if (from === to) return [from]
  if (step === null) {
    const written = quantity.unit ? ` ${quantity.unit}` : ''
    const nice = Number(((quantity.written[1] - quantity.written[0]) / 20).toPrecision(1))
    const remedy = `Write "${quantity.written.join('..')}${written} step ${nice}${written}".`
    reader.complain(path, 'is a range without a step, which has no lattice to search on', remedy)
    return null
  }
  if (stepsBetween(from, to, step) >= mostChoices) {
    reader.complain(path, `holds more than ${mostChoices} values`, 'Write a larger step.')
    return null
  }
  return stepped(from, to, step)
}

function within(
  value: number,
  [low, high]: readonly [number, number],
  unit: string,
  path: Path,
  reader: Reader,
): boolean {
  if (value >= low && value <= high) return true
  const limits = `${low}..${high}${unit ? ` ${unit}` : ''}`
  const last = path[path.length - 1]
  const hints: Record<string, string> = {
    index: 'It is that of the medium over vacuum',
    extinction: 'Positive absorbs',
  }
  const label = path.includes('x') ? 'x counts the share of the first-named element' : (hints[last] ?? 'Check the unit')
  reader.complain(path, `is outside ${limits}`, `Write a number within it. ${label}.`)
  return false
}

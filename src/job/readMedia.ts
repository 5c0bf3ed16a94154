import { isMaterial, materialNames, nearest, needsX } from '../media/index.js'
import type { Loose } from './checkShape.js'
import { stepped, stepsBetween } from './decimal.js'
import type { MediumOption } from './job.js'
import { shortened } from './problemAt.js'
import type { DimensionName } from './quantities.js'
import type { Reader } from './Reader.js'
import type { ItemAsWritten, JobAsWritten } from './schema.js'
import type { Path } from './YamlSource.js'

export type NumbersOption = Extract<MediumOption, { kind: 'numbers' }>

/** The user's own media by name; null where the numbers of one are not in order. */
export type UserMedia = ReadonlyMap<string, NumbersOption | null>

type Numbers = Loose<Pick<ItemAsWritten, 'potential' | 'mass' | 'alpha'>>
type Composition = Loose<ItemAsWritten>['x']

/** More choices than this of one number is no lattice to search. */
const mostChoices = 10_000

export function readMedia(media: Loose<JobAsWritten>['media'], reader: Reader): UserMedia {
  const found = new Map<string, NumbersOption | null>()
  for (const [name, numbers] of Object.entries(media ?? {})) {
    const path = ['media', name]
    if (!/^[A-Za-z][A-Za-z0-9_-]{0,39}$/.test(name)) {
      reader.problems.addAtKey(
        path,
        `"${shortened(name)}" is no name of a medium.`,
        'Use letters, digits and dashes, a letter first.',
      )
    }
    const medium = numbers === undefined ? null : readNumbers(numbers, path, name, reader)
    if (isMaterial(name)) {
      reader.problems.addAtKey(path, `${name} is a built-in material.`, `Choose another name, like "my-${name}".`)
    } else found.set(name, medium)
  }
  return found
}

/** A medium by numbers; every number may be a range with a step. Null where one is missing or wrong. */
export function readNumbers(numbers: Numbers, path: Path, name: string | null, reader: Reader): NumbersOption | null {
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
  media: UserMedia,
  reader: Reader,
): MediumOption | null {
  const own = media.get(name)
  if (own !== undefined) return own
  if (!isMaterial(name)) {
    const known = [...media.keys(), ...materialNames]
    const near = nearest(name, known)
    const remedy = near.length > 0 ? `Did you mean ${near.join(' or ')}?` : `Known: ${known.slice(0, 40).join(', ')}.`
    reader.problems.add(namePath, `Unknown material "${shortened(name)}".`, remedy)
    return null
  }
  return { kind: 'material', material: name, x: needsX(name) ? x : null }
}

/** Whether a name needs an x beside it. */
export function isAlloy(name: string, media: UserMedia): boolean {
  return !media.has(name) && isMaterial(name) && needsX(name)
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
  const label = path.includes('x') ? 'x counts the share of the first-named element' : 'Check the unit'
  reader.complain(path, `is outside ${limits}`, `Write a number within it. ${label}.`)
  return false
}

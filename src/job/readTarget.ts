import { nearest } from '../media/index.js'
import type { Tables } from './CsvTable.js'
import type { Loose } from './checkShape.js'
import type { Condition, CurveRow, Demand, Kind, Quantity } from './job.js'
import { shortened } from './problemAt.js'
import { parseLevel } from './quantities.js'
import { isComplaint, type Reader } from './Reader.js'
import { readCurve } from './readCurve.js'
import type { JobAsWritten } from './schema.js'
import {
  axisOf,
  dimensionOn,
  energiesIn,
  readSpectralPlace,
  readSpectralRange,
  type SpectralRange,
} from './spectral.js'
import type { Path } from './YamlSource.js'

export interface ReadTarget {
  readonly resolutionEv: number | null
  readonly demands: readonly Demand[]
}

type Target = Loose<JobAsWritten>['target']
type Written = Loose<JobAsWritten['target']['demands'][number]>

const defaultResolutionEv = 1e-5
const defaultPoints = 64
const mostDemands = 256
const mostTables = 16

/** What the demands are held against. */
export interface TargetContext {
  readonly kind: Kind
  readonly scan: SpectralRange | null
  readonly conditions: readonly Condition[]
  readonly hardWall: boolean
  readonly tables: Tables
}

/** The range that is looked at. Energies of electrons start above everything at which nothing comes in. */
export function readScan(
  target: Target,
  kind: Kind,
  conditions: readonly Condition[],
  reader: Reader,
): SpectralRange | null {
  const path = ['target', 'scan']
  const scan = readSpectralRange(target?.scan, path, kind, reader)
  if (scan === null) return null
  const { lowEv, written } = scan
  if (lowEv <= 0) {
    const remedy = `Start above 0: "${Math.min(5, written.written[1] / 2)}..${written.written[1]} ${written.unit}".`
    const what =
      kind === 'electron' ? "starts at or below the entry's band edge, where nothing comes in" : 'starts at or below 0'
    reader.complain(path, what, remedy)
    return null
  }
  const inPlane = conditions.find(({ inPlaneEv }) => lowEv <= inPlaneEv)
  if (inPlane) {
    reader.complain(
      path,
      `starts at or below the in-plane energy${inPlane.name && ` of "${inPlane.name}"`}, ${inPlane.inPlaneEv * 1000} meV, where nothing comes in`,
      'Energies of the scan are total energies: start above it.',
    )
  }
  return scan
}

/** The demands; every one has to lie within the scan. */
export function readTarget(target: Target, context: TargetContext, reader: Reader): ReadTarget {
  const { problems } = reader
  const { kind, scan } = context
  const { resolution } = target ?? {}
  const resolutionPath = ['target', 'resolution']
  const resolutionEv =
    resolution === 'none'
      ? null
      : (reader.single(resolution, resolutionPath, 'energy') ?? (kind === 'electron' ? defaultResolutionEv : null))
  if (resolutionEv !== null && !(resolutionEv > 0))
    reader.complain(resolutionPath, 'is not above 0', 'Write "0.01 meV", or none.')

  const written = target?.demands
  if (written?.length === 0) {
    problems.add(
      ['target', 'demands'],
      'There are no demands.',
      `Write at least one, like "- { ${kind === 'electron' ? 'peak: 80 meV, within: 5 meV' : 'peak: 633 nm, within: 2 nm'} }".`,
    )
  }
  if (written && written.length > mostDemands) {
    problems.addAtKey(
      ['target', 'demands'],
      `There are more than ${mostDemands} demands.`,
      'A "curve" holds many points in one demand.',
    )
    return { resolutionEv, demands: [] }
  }
  const demands: Demand[] = []
  const curves = new Map<string, readonly CurveRow[] | null>()
  const ids = new Set<string>()
  written?.forEach((demand, i) => {
    if (demand === undefined) return
    const path = ['target', 'demands', i]
    const read = readDemand(demand, path, `d${i + 1}`, context, curveOf, reader)
    if (demand.id !== undefined && ids.has(demand.id)) {
      problems.add(
        [...path, 'id'],
        `The id "${shortened(demand.id)}" stands twice.`,
        'Give each demand an id of its own.',
      )
    }
    ids.add(demand.id ?? `d${i + 1}`)
    if (read) demands.push(read)
  })
  return { resolutionEv, demands }

  /** A table may stand in several demands; it is read once. */
  function curveOf(name: string, quantity: Quantity, path: Path): readonly CurveRow[] | null {
    const key = `${quantity} ${name}`
    const known = curves.get(key)
    if (known !== undefined) return known
    if (curves.size >= mostTables) {
      problems.add(path, `The job names more than ${mostTables} tables.`, 'Join some of them.')
      return null
    }
    const rows = readCurve(name, path, scan, { kind, quantity, tables: context.tables }, reader)
    curves.set(key, rows)
    return rows
  }
}

const forms = {
  peak: ['peak', 'within', 'fwhm', 'height', 'alone', 'accept'],
  band: ['band', 'within', 'fwhm', 'top', 'ripple', 'accept'],
  pass: ['pass', 'above', 'points', 'accept'],
  block: ['block', 'below', 'points', 'accept'],
  curve: ['curve', 'accept'],
} as const

type Form = keyof typeof forms

/** Keys of every form. */
const common: readonly string[] = ['id', 'weight', 'at', 'quantity']

function readDemand(
  demand: Written,
  path: Path,
  defaultId: string,
  { kind: jobKind, scan, conditions, hardWall }: TargetContext,
  curveOf: (name: string, quantity: Quantity, path: Path) => readonly CurveRow[] | null,
  reader: Reader,
): Demand | null {
  const { problems } = reader
  const stated = (key: string) => problems.source.has([...path, key])
  const kinds = (Object.keys(forms) as Form[]).filter(stated)
  const kind = kinds[0]
  if (kind === undefined) {
    // A key that was refused or unknown may have said it.
    if (problems.source.keyCount(path) > Object.keys(demand).length) return null
    problems.add(path, 'This demand asks for nothing.', `Start it with one of ${Object.keys(forms).join(', ')}.`)
    return null
  }
  for (const key of Object.keys(demand)) {
    if (common.includes(key) || (forms[kind] as readonly string[]).includes(key)) continue
    const owner = (Object.keys(forms) as Form[]).find((form) => (forms[form] as readonly string[]).includes(key))
    const remedy = owner === key ? 'Make it a demand of its own.' : `It belongs to "${owner}": take it out.`
    problems.addAtKey([...path, key], `"${key}" has no place beside "${kind}".`, remedy)
  }
  const axis = kind === 'peak' || kind === 'band' ? axisOf(demand[kind], jobKind) : 'eV'
  const like = { within: axis === 'eV' ? '5 meV' : '2 nm' }
  const id = demand.id ?? defaultId
  if (!/^[A-Za-z][A-Za-z0-9_-]{0,39}$/.test(id)) {
    problems.add([...path, 'id'], `id "${shortened(id)}" is no id.`, 'Use letters, digits and dashes, a letter first.')
  }
  const weight = demand.weight ?? 1
  if (!(weight > 0))
    reader.complain([...path, 'weight'], 'is not above 0', 'Write a number above 0, or take the demand out.')
  const quantity = readQuantity()
  const head = { id, weight, accept: null, at: readAt(), quantity }

  if (kind === 'peak' || kind === 'band') return readLine(kind)
  if (kind === 'curve') {
    const rows = demand.curve === undefined ? null : curveOf(demand.curve, quantity, [...path, 'curve'])
    return rows && accepting({ ...head, kind, file: demand.curve!, rows, mostRms: null })
  }
  const range = readSpectralRange(demand[kind], [...path, kind], jobKind, reader)
  if (range) inScan(range, [...path, kind])
  const limitKey = kind === 'pass' ? 'above' : 'below'
  if (!stated(limitKey)) {
    const [what, value] = kind === 'pass' ? ['the least T', '0.8'] : ['the greatest T', '2e-2']
    problems.add(
      [...path, limitKey],
      `"${limitKey}" is missing: a ${kind} says ${what}.`,
      `Add "${limitKey}: ${value}".`,
    )
  }
  const limit =
    kind === 'pass' ? reader.share(demand.above, [...path, 'above']) : level(demand.below, [...path, 'below'])
  const points =
    demand.points === undefined ? defaultPoints : reader.whole(demand.points, [...path, 'points'], 2, 10_000)
  if (range === null || limit === null || points === null) return null
  const pointsEv = energiesIn(range, points)
  return accepting(
    kind === 'pass' ? { ...head, kind, pointsEv, above: limit } : { ...head, kind, pointsEv, below: limit },
  )

  function readLine(kind: 'peak' | 'band'): Demand | null {
    const place = readSpectralPlace(demand[kind], [...path, kind], jobKind, reader)
    if (place && scan && (place.energyEv < scan.lowEv || place.energyEv > scan.highEv)) outside([...path, kind])
    if (!stated('within')) {
      problems.add(
        [...path, 'within'],
        `"within" is missing: a ${kind} says how far it may lie off.`,
        `Add "within: ${like.within}".`,
      )
    }
    const within = readWithin(demand.within, [...path, 'within'])
    const fwhm = readFwhm(demand.fwhm, [...path, 'fwhm'])
    if (kind === 'peak') {
      const height = reader.share(demand.height, [...path, 'height'])
      const alone = level(demand.alone, [...path, 'alone'])
      if (place === null || within === null) return null
      return accepting({ ...head, kind, axis: place.axis, centre: place.value, within, fwhm, height, alone })
    }
    const top = reader.share(demand.top, [...path, 'top'])
    const ripple = reader.share(demand.ripple, [...path, 'ripple'])
    if (place === null || within === null) return null
    return accepting({ ...head, kind, axis: place.axis, centre: place.value, within, fwhm, top, ripple })
  }

  /** Within and fwhm are stated on the axis of the line itself. */
  function otherAxis(written: string | number | undefined, here: Path): boolean {
    if (written === undefined || axisOf(written, jobKind) === axis) return false
    const [own, other] = axis === 'nm' ? ['a wavelength', 'an energy'] : ['an energy', 'a length']
    reader.complain(here, `is ${other}, but the line is at ${own}`, `Write it like "${like.within}".`)
    return true
  }

  function readQuantity(): Quantity {
    const quantity = demand.quantity ?? 'T'
    const here = [...path, 'quantity']
    if (jobKind === 'electron' && quantity === 'A')
      reader.complain(here, 'is what media absorb, which is nothing for electrons', 'Demand T or R.')
    if (hardWall && quantity === 'R')
      reader.complain(here, "can't be judged: at a hard wall everything comes back", 'Give the stack another exit.')
    return quantity
  }

  function readAt(): string | null {
    const { at } = demand
    if (at === undefined) return null
    const names = conditions.map(({ name }) => name)
    if (names.includes(at) && at !== '') return at
    const near = nearest(at, names)
    const given = names.filter((name) => name !== '')
    const remedy =
      near.length > 0
        ? `Did you mean "${near[0]}"?`
        : given.length > 0
          ? `There are ${given.join(', ')}.`
          : 'Add "conditions:" with it.'
    problems.add([...path, 'at'], `There is no condition "${shortened(at)}".`, remedy)
    return null
  }

  function readWithin(written: Written['within'], here: Path): number | null {
    if (otherAxis(written, here)) return null
    const within = reader.single(written, here, dimensionOn[axis])
    if (within !== null && !(within > 0)) {
      reader.complain(here, 'is not above 0', `Write how far it may lie off, like "${like.within}".`)
    }
    return within
  }

  /** The demand with what its `accept` states; each must be looser than the demand's own, and stated there. */
  function accepting(read: Demand): Demand {
    const { accept } = demand
    if (accept === undefined) return read
    const here = [...path, 'accept']
    const accepted: Record<string, unknown> = {}
    const own = read as unknown as Readonly<Record<string, unknown>>
    for (const key of Object.keys(accept) as (keyof typeof accept)[]) {
      const place = [...here, key]
      const name = acceptNames[key]
      if (key === 'rms') {
        if (kind !== 'curve') problems.addAtKey(place, '"rms" belongs to a curve.', 'Take it out.')
        else if (!(accept.rms! > 0)) reader.complain(place, 'is not above 0', 'Write the greatest rms, like 1.5.')
        else accepted.rms = accept.rms
        continue
      }
      if (own[name] === undefined || own[name] === null) {
        problems.addAtKey(place, `The demand states no "${key}" that could be loosened.`, 'Take it out.')
        continue
      }
      const value = acceptedValue(key, place)
      if (value === null) continue
      if (!isLooser(key, value, own[name])) {
        reader.complain(place, 'is tighter than the demand', 'accept loosens a demand for the yield.')
      }
      accepted[name] = value
    }
    return { ...read, accept: accepted }
  }

  function acceptedValue(key: Exclude<keyof NonNullable<Written['accept']>, 'rms'>, place: Path): unknown {
    const { accept } = demand
    if (key === 'within') return readWithin(accept?.within, place)
    if (key === 'fwhm') return readFwhm(accept?.fwhm, place)
    if (key === 'below') return level(accept?.below, place)
    if (key === 'alone') return level(accept?.alone, place)
    return reader.share(accept?.[key], place)
  }

  function readFwhm(written: Written['fwhm'], here: Path): readonly [number, number] | null {
    const fwhm = fwhmRange(written, here)
    return fwhm && [fwhm.from, fwhm.to]
  }

  function fwhmRange(asWritten: Written['fwhm'], here: Path): { readonly from: number; readonly to: number } | null {
    if (otherAxis(asWritten, here)) return null
    const fwhm = reader.quantity(asWritten, here, dimensionOn[axis])
    if (fwhm === null) return null
    const { unit, written } = fwhm
    const around = `"${Number((written[1] / 2).toPrecision(3))}..${Number((written[1] * 1.5).toPrecision(3))} ${unit}"`
    if (!fwhm.range)
      reader.complain(
        here,
        'is one number, where a range is expected',
        `Write ${around}, or "..${written[1]} ${unit}".`,
      )
    else if (fwhm.step !== null) reader.complain(here, 'takes no step', `Write "${written.join('..')} ${unit}".`)
    else if (fwhm.from < 0) reader.complain(here, 'is negative', `Write "..${Math.abs(written[1])} ${unit}".`)
    else if (!(fwhm.from < fwhm.to)) reader.complain(here, 'needs two different ends', `Write ${around}.`)
    return fwhm
  }

  function level(written: number | string | undefined, here: Path): number | null {
    if (written === undefined) return null
    const read = parseLevel(String(here[here.length - 1]), written)
    if (!isComplaint(read)) return read
    problems.add(here, read.rule, read.remedy)
    return null
  }

  function inScan({ lowEv, highEv }: SpectralRange, here: Path): void {
    if (scan && (lowEv < scan.lowEv || highEv > scan.highEv)) outside(here)
  }

  function outside(here: Path): void {
    const limits = problems.quoted(['target', 'scan'])
    reader.complain(here, `lies outside the scan, ${limits}`, 'Widen "scan", or move the demand into it.')
  }
}

/** Names of `Accepted`, by the key that states them. */
const acceptNames = {
  within: 'within',
  fwhm: 'fwhm',
  height: 'height',
  alone: 'alone',
  top: 'top',
  ripple: 'ripple',
  above: 'above',
  below: 'below',
  rms: 'rms',
} as const

function isLooser(key: keyof typeof acceptNames, value: unknown, own: unknown): boolean {
  if (key === 'fwhm') {
    const [[from, to], [ownFrom, ownTo]] = [value, own] as [readonly [number, number], readonly [number, number]]
    return from <= ownFrom && to >= ownTo
  }
  const upwards = key === 'within' || key === 'alone' || key === 'ripple' || key === 'below'
  return upwards ? (value as number) >= (own as number) : (value as number) <= (own as number)
}

import { nearest } from '../media/index.js'
import type { Loose } from './checkShape.js'
import type { Condition, CurveRow, Demand } from './job.js'
import { shortened } from './problemAt.js'
import { parseLevel, pointsOf, type Quantity } from './quantities.js'
import { isComplaint, type Reader } from './Reader.js'
import { readCurve, type Tables } from './readCurve.js'
import type { JobAsWritten } from './schema.js'
import type { Path } from './YamlSource.js'

export interface ReadTarget {
  readonly scanEv: readonly [number, number] | null
  readonly resolutionEv: number | null
  readonly demands: readonly Demand[]
}

type Target = Loose<JobAsWritten>['target']
type Written = Loose<JobAsWritten['target']['demands'][number]>

const defaultResolutionEv = 1e-5
const defaultPoints = 64
const mostDemands = 256
const mostTables = 16

/** Scan and demands; every demand has to lie within the scan. */
export function readTarget(
  target: Target,
  conditions: readonly Condition[],
  tables: Tables,
  reader: Reader,
): ReadTarget {
  const { problems } = reader
  const scan = reader.range(target?.scan, ['target', 'scan'], 'energy')
  if (scan && scan.from <= 0) {
    const remedy = `Start above 0: "${Math.min(5, scan.written[1] / 2)}..${scan.written[1]} ${scan.unit}".`
    reader.complain(['target', 'scan'], "starts at or below the entry's band edge, where nothing comes in", remedy)
  }
  const inPlane = conditions.find(({ inPlaneEv }) => scan && scan.from > 0 && scan.from <= inPlaneEv)
  if (inPlane) {
    reader.complain(
      ['target', 'scan'],
      `starts at or below the in-plane energy${inPlane.name && ` of "${inPlane.name}"`}, ${inPlane.inPlaneEv * 1000} meV, where nothing comes in`,
      'Energies of the scan are total energies: start above it.',
    )
  }
  const within = scan && scan.from > 0 ? scan : null
  const { resolution } = target ?? {}
  const resolutionPath = ['target', 'resolution']
  const resolutionEv =
    resolution === 'none' ? null : (reader.single(resolution, resolutionPath, 'energy') ?? defaultResolutionEv)
  if (resolutionEv !== null && !(resolutionEv > 0))
    reader.complain(resolutionPath, 'is not above 0', 'Write "0.01 meV", or none.')

  const written = target?.demands
  if (written?.length === 0) {
    problems.add(
      ['target', 'demands'],
      'There are no demands.',
      'Write at least one, like "- { peak: 80 meV, within: 5 meV }".',
    )
  }
  if (written && written.length > mostDemands) {
    problems.addAtKey(
      ['target', 'demands'],
      `There are more than ${mostDemands} demands.`,
      'A "curve" holds many points in one demand.',
    )
    return { scanEv: within && [within.from, within.to], resolutionEv, demands: [] }
  }
  const demands: Demand[] = []
  const curves = new Map<string, readonly CurveRow[] | null>()
  const ids = new Set<string>()
  written?.forEach((demand, i) => {
    if (demand === undefined) return
    const path = ['target', 'demands', i]
    const read = readDemand(demand, path, `d${i + 1}`, within, conditions, curveOf, reader)
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
  return { scanEv: within && [within.from, within.to], resolutionEv, demands }

  /** A table may stand in several demands; it is read once. */
  function curveOf(name: string, path: Path): readonly CurveRow[] | null {
    const known = curves.get(name)
    if (known !== undefined) return known
    if (curves.size >= mostTables) {
      problems.add(path, `The job names more than ${mostTables} tables.`, 'Join some of them.')
      return null
    }
    const rows = readCurve(name, path, within, tables, reader)
    curves.set(name, rows)
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

function readDemand(
  demand: Written,
  path: Path,
  defaultId: string,
  scan: Quantity | null,
  conditions: readonly Condition[],
  curveOf: (name: string, path: Path) => readonly CurveRow[] | null,
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
    if (key === 'id' || key === 'weight' || key === 'at' || (forms[kind] as readonly string[]).includes(key)) continue
    const owner = (Object.keys(forms) as Form[]).find((form) => (forms[form] as readonly string[]).includes(key))
    const remedy = owner === key ? 'Make it a demand of its own.' : `It belongs to "${owner}": take it out.`
    problems.addAtKey([...path, key], `"${key}" has no place beside "${kind}".`, remedy)
  }
  const id = demand.id ?? defaultId
  if (!/^[A-Za-z][A-Za-z0-9_-]{0,39}$/.test(id)) {
    problems.add([...path, 'id'], `id "${shortened(id)}" is no id.`, 'Use letters, digits and dashes, a letter first.')
  }
  const weight = demand.weight ?? 1
  if (!(weight > 0))
    reader.complain([...path, 'weight'], 'is not above 0', 'Write a number above 0, or take the demand out.')
  const head = { id, weight, accept: null, at: readAt() }

  if (kind === 'peak' || kind === 'band') return readLine(kind)
  if (kind === 'curve') {
    const rows = demand.curve === undefined ? null : curveOf(demand.curve, [...path, 'curve'])
    return rows && accepting({ ...head, kind, file: demand.curve!, rows, mostRms: null })
  }
  const range = reader.range(demand[kind], [...path, kind], 'energy')
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
  const pointsEv = pointsOf(range, points)
  return accepting(
    kind === 'pass' ? { ...head, kind, pointsEv, above: limit } : { ...head, kind, pointsEv, below: limit },
  )

  function readLine(kind: 'peak' | 'band'): Demand | null {
    const energyEv = reader.single(demand[kind], [...path, kind], 'energy')
    if (energyEv !== null && scan && (energyEv < scan.from || energyEv > scan.to)) outside([...path, kind])
    if (!stated('within')) {
      problems.add(
        [...path, 'within'],
        `"within" is missing: a ${kind} says how far it may lie off.`,
        'Add "within: 5 meV".',
      )
    }
    const withinEv = readWithin(demand.within, [...path, 'within'])
    const fwhm = readFwhm(demand.fwhm, [...path, 'fwhm'])
    if (kind === 'peak') {
      const height = reader.share(demand.height, [...path, 'height'])
      const alone = level(demand.alone, [...path, 'alone'])
      if (energyEv === null || withinEv === null) return null
      return accepting({ ...head, kind, energyEv, withinEv, fwhmEv: fwhm, height, alone })
    }
    const top = reader.share(demand.top, [...path, 'top'])
    const ripple = reader.share(demand.ripple, [...path, 'ripple'])
    if (energyEv === null || withinEv === null) return null
    return accepting({ ...head, kind, energyEv, withinEv, fwhmEv: fwhm, top, ripple })
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
    const withinEv = reader.single(written, here, 'energy')
    if (withinEv !== null && !(withinEv > 0)) {
      reader.complain(here, 'is not above 0', 'Write how far it may lie off, like "5 meV".')
    }
    return withinEv
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

  function fwhmRange(asWritten: Written['fwhm'], here: Path): Quantity | null {
    const fwhm = reader.quantity(asWritten, here, 'energy')
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

  function inScan(range: Quantity, here: Path): void {
    if (scan && (range.from < scan.from || range.to > scan.to)) outside(here)
  }

  function outside(here: Path): void {
    const limits = problems.quoted(['target', 'scan'])
    reader.complain(here, `lies outside the scan, ${limits}`, 'Widen "scan", or move the demand into it.')
  }
}

/** Names of `Accepted`, by the key that states them. */
const acceptNames = {
  within: 'withinEv',
  fwhm: 'fwhmEv',
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

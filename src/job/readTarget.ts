import type { Loose } from './checkShape.js'
import type { CurveRow, Demand } from './job.js'
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
export function readTarget(target: Target, tables: Tables, reader: Reader): ReadTarget {
  const { problems } = reader
  const scan = reader.range(target?.scan, ['target', 'scan'], 'energy')
  if (scan && scan.from <= 0) {
    const remedy = `Start above 0: "${Math.min(5, scan.written[1] / 2)}..${scan.written[1]} ${scan.unit}".`
    reader.complain(['target', 'scan'], "starts at or below the entry's band edge, where nothing comes in", remedy)
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
    const read = readDemand(demand, path, `d${i + 1}`, within, curveOf, reader)
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
  peak: ['peak', 'within', 'fwhm', 'height'],
  pass: ['pass', 'above', 'points'],
  block: ['block', 'below', 'points'],
  curve: ['curve'],
} as const

type Form = keyof typeof forms

function readDemand(
  demand: Written,
  path: Path,
  defaultId: string,
  scan: Quantity | null,
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
    if (key === 'id' || key === 'weight' || (forms[kind] as readonly string[]).includes(key)) continue
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
  const head = { id, weight }

  if (kind === 'peak') return readPeak()
  if (kind === 'curve') {
    const rows = demand.curve === undefined ? null : curveOf(demand.curve, [...path, 'curve'])
    return rows && { ...head, kind, file: demand.curve!, rows }
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
  const limit = kind === 'pass' ? reader.share(demand.above, [...path, 'above']) : level(demand.below)
  const points =
    demand.points === undefined ? defaultPoints : reader.whole(demand.points, [...path, 'points'], 2, 10_000)
  if (range === null || limit === null || points === null) return null
  const pointsEv = pointsOf(range, points)
  return kind === 'pass' ? { ...head, kind, pointsEv, above: limit } : { ...head, kind, pointsEv, below: limit }

  function readPeak(): Demand | null {
    const energyEv = reader.single(demand.peak, [...path, 'peak'], 'energy')
    if (energyEv !== null && scan && (energyEv < scan.from || energyEv > scan.to)) {
      outside([...path, 'peak'])
    }
    if (!stated('within')) {
      problems.add(
        [...path, 'within'],
        '"within" is missing: a peak says how far it may lie off.',
        'Add "within: 5 meV".',
      )
    }
    const withinEv = reader.single(demand.within, [...path, 'within'], 'energy')
    if (withinEv !== null && !(withinEv > 0)) {
      reader.complain([...path, 'within'], 'is not above 0', 'Write how far the peak may lie off, like "5 meV".')
    }
    const height = reader.share(demand.height, [...path, 'height'])
    const fwhm = readFwhm()
    if (energyEv === null || withinEv === null) return null
    return { ...head, kind: 'peak', energyEv, withinEv, fwhmEv: fwhm && [fwhm.from, fwhm.to], height }
  }

  function readFwhm(): Quantity | null {
    const here = [...path, 'fwhm']
    const fwhm = reader.quantity(demand.fwhm, here, 'energy')
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

  function level(below: number | string | undefined): number | null {
    if (below === undefined) return null
    const here = [...path, 'below']
    const read = parseLevel('below', below)
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

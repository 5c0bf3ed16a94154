import { hcEvNm, materialNotes, opticalMaterial } from '../media/index.js'
import type { Tables } from './CsvTable.js'
import { checkOptics } from './checkOptics.js'
import { checkShape, type Loose } from './checkShape.js'
import type { Job, MediumOption } from './job.js'
import { Problems } from './Problems.js'
import { shortened } from './problemAt.js'
import { Reader } from './Reader.js'
import { readBiasOver } from './readBiasOver.js'
import { readConditions } from './readConditions.js'
import { readGrowth, readSources, readStep } from './readGrowth.js'
import { readMedia } from './readMedia.js'
import { readStack } from './readStack.js'
import { readScan, readTarget } from './readTarget.js'
import { readYaml } from './readYaml.js'
import { refuse } from './refuse.js'
import type { JobAsWritten } from './schema.js'
import type { SpectralRange } from './spectral.js'
import { largestFile, refusedName } from './tableFile.js'
import { YamlSource } from './YamlSource.js'

/**
 * Reads a job from its text. `file` names it in messages, `files` holds the text of the tables that it names. Throws JobError
 * with everything that is wrong, whatever the text.
 */
export function readJobText(text: string, file: string, files: Readonly<Record<string, string>> = {}): Job {
  return assembleJob(text, file, (name) => {
    const refused = refusedName(name)
    if (refused) return refused
    if (Object.hasOwn(files, name)) return { text: files[name] }
    return { rule: `There is no file ${shortened(name)} beside the job.`, remedy: 'Check its name.' }
  })
}

/** The same with the tables from wherever `tables` finds them. */
export function assembleJob(text: string, file: string, tables: Tables): Job {
  // A byte order mark is no part of the first line.
  const plain = text.startsWith('\ufeff') ? text.slice(1) : text
  const source = new YamlSource(file, plain.length > largestFile ? '' : plain)
  const problems = new Problems(source)
  if (plain.length > largestFile) {
    problems.addAt(
      { start: 0, end: 0 },
      'The file is larger than 1 MB.',
      'A job has a few lines. Is this the right file?',
    )
    problems.throwIfAny()
  }
  const value = readYaml(source, problems)
  if (value === undefined) problems.throwIfAny()

  const written = checkShape(value, problems)
  const kind = written.kind ?? 'electron'
  refuse(written, kind, problems)

  const files: Record<string, string> = Object.create(null)
  const reader = new Reader(problems)
  const name = readName(written.name, problems)
  const conditions = readConditions(written, reader)
  const keep = keeping(tables, files)
  const media = readMedia(written.media, kind, keep, reader)
  const stepNm = readStep(written.growth, reader)
  const sources = readSources(written.growth?.sources, media, reader)
  const cells = sources.filter((source) => source !== null)
  const scan = readScan(written.target, kind, conditions, reader)
  const stack = readStack(written.stack, media, stepNm, cells, scanMiddleNm(scan), reader)
  const biasOver = readBiasOver(written['bias over'], stack.layers, reader)
  const hardWall = stack.spec?.exit === 'hard wall'
  const target = readTarget(written.target, { kind, scan, conditions, hardWall, tables: keep }, reader)
  const growth = readGrowth(written.growth, stepNm, stack.layers, sources, kind, reader)
  if (kind === 'light' && scan && stack.spec) checkOptics(stack.spec, stack.layers, scan, problems)
  const seed =
    written.search?.seed === undefined ? 1 : reader.whole(written.search.seed, ['search', 'seed'], 0, 4294967295)
  const candidates =
    written.deliver?.candidates === undefined
      ? 10
      : reader.whole(written.deliver.candidates, ['deliver', 'candidates'], 1, 256)
  problems.throwIfAny()

  const job = {
    file,
    text,
    files,
    format: 1 as const,
    name,
    kind,
    note: written.note ?? '',
    conditions,
    stack: { ...stack.spec!, biasOver },
    scanEv: [scan!.lowEv, scan!.highEv],
    resolutionEv: target.resolutionEv,
    demands: target.demands,
    growth,
    search: {
      method: written.search?.method ?? 'auto',
      effort: written.search?.effort ?? 'standard',
      seed: seed!,
    },
    deliver: { candidates: candidates! },
  } as const
  return { ...job, notes: notesOf(job, statesTemperature(written)) }
}

/** In the unit that the scan is written in. */
function scanMiddleNm(scan: SpectralRange | null): number | null {
  if (scan === null) return null
  const { from, to } = scan.written
  return scan.axis === 'nm' ? 0.5 * (from + to) : hcEvNm / (0.5 * (from + to))
}

function readName(name: string | undefined, problems: Problems): string {
  if (name === undefined || /^[A-Za-z0-9][A-Za-z0-9-]{0,63}$/.test(name)) return name ?? ''
  const cleaned = name
    .slice(0, 200)
    .replace(/[^A-Za-z0-9]+/g, '-')
    .replace(/^-+|-+$/g, '')
    .slice(0, 64)
  const rule = `name "${shortened(name)}" is no name: letters, digits and dashes, at most 64, no dash first.`
  problems.add(['name'], rule, `Write "${cleaned || 'my-filter'}".`)
  return ''
}

/** Every operating point has a temperature that the job states. */
function statesTemperature({ temperature, conditions }: Loose<JobAsWritten>): boolean {
  const points = Object.values<{ readonly temperature?: unknown } | undefined>(conditions ?? {})
  return temperature !== undefined || (points.length > 0 && points.every((point) => point?.temperature !== undefined))
}

function keeping(tables: Tables, files: Record<string, string>): Tables {
  return (name) => {
    const table = tables(name)
    if ('text' in table) files[name] = table.text
    return table
  }
}

function notesOf(job: Omit<Job, 'notes'>, statesTemperature: boolean): string[] {
  const { growth, stack, conditions, kind } = job
  const notes: string[] = []
  if (!statesTemperature && kind === 'electron') notes.push('The job states no temperature: 300 K is assumed.')
  if (growth.assumed) {
    const { rate, layer, x } = growth.spread
    const values = `rates ${rate * 100} %, layers ${layer.value} ${layer.unit}${kind === 'electron' ? `, x ${x}` : ''}`
    notes.push(`The job states no growth.spread: ${values} (one standard deviation) are assumed.`)
  }
  if (kind === 'light') return [...notes, ...opticalNotes(stack)]
  const seen = new Set<string>()
  for (const option of optionsOf(stack)) {
    if (option.kind !== 'material') continue
    // The ends of a range tell all: what holds for one composition and not for its neighbours has a limit between them.
    const ends = option.x ? [option.x[0], option.x[option.x.length - 1]] : [null]
    for (const x of ends) {
      for (const { temperatureK } of conditions) {
        for (const note of materialNotes(option.material, x, temperatureK)) seen.add(note)
      }
    }
  }
  return [...notes, ...seen]
}

/** What the engineer must know of the listed media; a layer of a bulk medium is a film that has other indices. */
function opticalNotes({ entry, exit, back, layers }: Job['stack']): string[] {
  const notes = new Set<string>()
  const leads = [entry, exit, back?.behind].filter((lead) => lead !== undefined && lead !== 'hard wall')
  for (const option of leads) {
    if (option.kind === 'material')
      for (const remark of opticalMaterial(option.material).remarks) notes.add(`${option.material}: ${remark}`)
  }
  for (const option of insideOf(layers)) {
    if (option.kind !== 'material') continue
    const { form, name, remarks } = opticalMaterial(option.material)
    for (const remark of remarks) notes.add(`${name}: ${remark}`)
    if (form === 'bulk') {
      notes.add(
        `${name} is listed as bulk, but stands in a layer: a deposited film is less dense, and its index lies some per cent lower. Give ` +
          'measured values by a table.',
      )
    }
  }
  return [...notes]
}

function optionsOf({ entry, exit, layers }: Job['stack']) {
  return [entry, ...insideOf(layers), ...(exit === 'hard wall' ? [] : [exit])]
}

function insideOf(items: Job['stack']['layers']): MediumOption[] {
  return items.flatMap((item) =>
    item.kind === 'period' ? [...insideOf(item.period), ...insideOf(item.between)] : (item.media ?? []),
  )
}

import { readFile } from 'node:fs/promises'
import { type CsvError, parse } from 'csv-parse/sync'
import { isMaterial, isOptical, material, materialNames, nearest, opticalNames } from '../media/index.js'

/** One layer of a table. Either a material (with x for an alloy) or numbers; a count of monolayers, a width, or both. */
export interface LayerRow {
  /** Where the row stands, for messages: `layers.csv:4`. */
  readonly where: string
  readonly id: string | null
  readonly medium:
    | { readonly kind: 'material'; readonly material: string; readonly x: number | null }
    | {
        readonly kind: 'numbers'
        readonly name: string | null
        readonly potentialEv: number
        readonly massRel: number
        readonly alphaPerEv: number
      }
    | { readonly kind: 'index'; readonly name: string | null; readonly index: number; readonly extinction: number }
  /** Of the layer's own, strained material; not whole for a stack as grown. Null for numbers. */
  readonly ml: number | null
  readonly widthNm: number | null
}

/** Everything wrong with a table of layers, a problem a line: file, line, value, rule. */
export class LayersError extends Error {
  override readonly name = 'LayersError'

  constructor(readonly problems: readonly string[]) {
    super(problems.join('\n'))
  }
}

const known = [
  ...(['no', 'id', 'material', 'x', 'ml', 'width_nm', 'potential_eV', 'mass_rel', 'alpha_per_eV'] as const),
  ...(['index', 'extinction'] as const),
]
type Column = (typeof known)[number]

/**
 * Reads a stack from CSV (commas, one header line): a layers.csv of a result, or any table with `ml` or `width_nm` and either
 * `material` (and `x`) or numbers: `potential_eV` and `mass_rel` (and `alpha_per_eV`, 0 where empty), or for light `index` (and
 * `extinction`, 0 where empty). Other columns are passed over. A
 * known material wins over numbers beside it; another word beside numbers is the name of the user's own medium. Rows come back
 * from entry to exit: in the order of `no` where there is one, else as they stand. Throws LayersError that holds every problem.
 */
export async function readLayers(path: string): Promise<LayerRow[]> {
  let text: string
  try {
    text = await readFile(path, 'utf8')
  } catch (error) {
    throw new LayersError([`${path}  The file can't be read: ${(error as Error).message}`])
  }
  return parseLayers(text, path)
}

/** The same from text; `file` only names it in messages. */
export function parseLayers(text: string, file: string): LayerRow[] {
  const [head, ...lines] = records(text, file)
  const columns = new Map<string, number>(head?.record.map((name, i) => [name, i]))
  const problems = head
    ? headProblems(columns, `${file}:${head.info.lines}`)
    : [`${file}:1  The file is empty. ${needed}`]
  if (problems.length > 0) throw new LayersError(problems)

  const rows: { readonly no: number | null; readonly row: LayerRow }[] = []
  for (const { record, info } of lines) {
    const cells = new Cells(record, columns, `${file}:${info.lines}`, problems)
    const before = problems.length
    const row = layerRow(cells)
    const no = columns.has('no') ? cells.required('no') : null
    if (no !== null && rows.some((other) => other.no === no))
      cells.problem(`no ${no} is there twice. Number each layer once.`)
    if (row && problems.length === before) rows.push({ no, row })
  }
  if (lines.length === 0) problems.push(`${file}:1  There is a header and no layer below it.`)
  if (problems.length > 0) throw new LayersError(problems)
  return rows.sort((a, b) => (a.no ?? 0) - (b.no ?? 0)).map(({ row }) => row)
}

const needed =
  'Give a header with ml or width_nm, and material (with x for alloys), potential_eV and mass_rel, or index; columns are separated by commas.'

interface Line {
  readonly record: readonly string[]
  readonly info: { readonly lines: number }
}

function records(text: string, file: string): Line[] {
  try {
    // The types of the parser do not follow `info`, which pairs each record with its line.
    return parse(text, {
      bom: true,
      trim: true,
      skip_empty_lines: true,
      relax_column_count: true,
      info: true,
    }) as unknown as Line[]
  } catch (error) {
    const { message, lines } = error as CsvError & { lines?: number }
    throw new LayersError([`${file}:${lines ?? 1}  This is no CSV: ${message}`])
  }
}

function headProblems(columns: ReadonlyMap<string, number>, where: string): string[] {
  const problems: string[] = []
  const misspelt = [...columns.keys()].flatMap((name) => {
    const [near] = columns.has(name) && !isColumn(name) ? nearest(name, known) : []
    return near && !columns.has(near) ? [`"${name}" may mean ${near}.`] : []
  })
  const hint = [needed, ...misspelt].join(' ')
  if (!columns.has('ml') && !columns.has('width_nm'))
    problems.push(`${where}  There is no column ml or width_nm. ${hint}`)
  if (!columns.has('material') && !columns.has('potential_eV') && !columns.has('index')) {
    problems.push(`${where}  There is no column material, potential_eV or index. ${hint}`)
  }
  return problems
}

function isColumn(name: string): name is Column {
  return (known as readonly string[]).includes(name)
}

/** The cells of one line by column name; keeps the problems that it meets. */
class Cells {
  constructor(
    private readonly record: readonly string[],
    private readonly columns: ReadonlyMap<string, number>,
    readonly where: string,
    private readonly problems: string[],
  ) {}

  /** Null for an empty or absent cell. A leading apostrophe only tells a spreadsheet that text follows. */
  text(column: Column): string | null {
    const i = this.columns.get(column)
    const cell = i === undefined ? '' : (this.record[i] ?? '')
    return cell.replace(/^'(?=[=+\-@])/, '') || null
  }

  number(column: Column, rule: (value: number) => boolean = () => true, words = 'a finite number'): number | null {
    const cell = this.text(column)
    if (cell === null) return null
    const value = Number(cell)
    if (Number.isFinite(value) && rule(value)) return value
    this.problem(`${column} is "${cell}". Give ${words}, with a dot as decimal sign.`)
    return null
  }

  required(column: Column, rule?: (value: number) => boolean, words?: string): number | null {
    if (this.text(column) === null) this.problem(`${column} is empty. Give ${words ?? 'a finite number'}.`)
    return this.number(column, rule, words)
  }

  problem(sentence: string): void {
    this.problems.push(`${this.where}  ${sentence}`)
  }
}

function layerRow(cells: Cells): LayerRow | null {
  const medium = mediumOf(cells)
  const ml = cells.number('ml', notNegative, '0 or more monolayers')
  const widthNm = cells.number('width_nm', notNegative, '0 nm or more')
  if (ml === null && widthNm === null && cells.text('ml') === null && cells.text('width_nm') === null) {
    cells.problem('ml and width_nm are both empty. Give one of them.')
  }
  if (!medium) return null
  // A sheet gives both: of a medium with numbers of its own, the width.
  if (medium.kind !== 'material' && ml !== null && widthNm === null) {
    cells.problem(`ml is ${ml}, but a medium given by numbers has no monolayer. Give width_nm and leave ml empty.`)
  }
  return { where: cells.where, id: cells.text('id'), medium, ml: medium.kind === 'material' ? ml : null, widthNm }
}

function notNegative(value: number): boolean {
  return value >= 0
}

function mediumOf(cells: Cells): LayerRow['medium'] | null {
  const name = cells.text('material')
  if (name !== null && isMaterial(name)) return materialOf(name, cells)
  if (name !== null && isOptical(name)) return { kind: 'material', material: name, x: null }
  if (cells.text('index') !== null) return opticsOf(name, cells)
  const hasNumbers = cells.text('potential_eV') !== null || cells.text('mass_rel') !== null
  if (name !== null && (!hasNumbers || (cells.text('ml') !== null && cells.text('width_nm') === null))) {
    const builtIn = [...materialNames, ...opticalNames]
    const near = nearest(name, builtIn)
    const remedy = near.length > 0 ? `Did you mean ${near.join(' or ')}?` : `Built in: ${builtIn.join(', ')}.`
    cells.problem(
      `"${name}" is no built-in material. ${remedy} Another medium needs potential_eV and mass_rel, or index, and width_nm.`,
    )
    return null
  }
  const potentialEv = cells.required('potential_eV')
  const massRel = cells.required('mass_rel', (value) => value > 0, 'a number above 0, in free-electron masses')
  const alphaPerEv = cells.number('alpha_per_eV') ?? 0
  if (potentialEv === null || massRel === null) return null
  return { kind: 'numbers', name, potentialEv, massRel, alphaPerEv }
}

function opticsOf(name: string | null, cells: Cells): LayerRow['medium'] | null {
  const index = cells.required('index', (value) => value > 0, 'a refractive index above 0')
  const extinction = cells.number('extinction', notNegative, '0 or more (positive absorbs)') ?? 0
  return index === null ? null : { kind: 'index', name, index, extinction }
}

function materialOf(name: string, cells: Cells): LayerRow['medium'] | null {
  const listed = material(name)
  if (listed.kind === 'binary') {
    if (cells.text('x') === null) return { kind: 'material', material: name, x: null }
    cells.problem(`x is "${cells.text('x')}", but ${name} has a fixed composition. Leave x empty.`)
    return null
  }
  const [low, high] = listed.xRange
  const x = cells.required('x', (value) => value >= low && value <= high, `${low}..${high} (${listed.x})`)
  return x === null ? null : { kind: 'material', material: name, x }
}

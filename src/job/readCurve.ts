import { type CsvError, parse } from 'csv-parse/sync'
import { nearest } from '../media/index.js'
import { shifted } from './decimal.js'
import type { CurveRow } from './job.js'
import { type Source, type Span, shortened } from './problemAt.js'
import type { Quantity } from './quantities.js'
import type { Reader } from './Reader.js'
import type { Path } from './YamlSource.js'

/** Gives the text of a file that a job names, or says why it can't be had. */
export type Tables = (name: string) => { readonly text: string } | { readonly rule: string; readonly remedy: string }

const columns = ['energy_meV', 'T', 'sense', 'scale', 'tolerance', 'weight']
const mostRows = 20_000
/** After so many wrong rows the reader has seen the pattern. */
const mostComplaints = 8
/** T of a goal on decades is floored here, as the calculated T is. */
const floor = 1e-30

/** The rows of a goal: energy_meV, T, optional sense, scale, tolerance, weight. Null where there is a problem. */
export function readCurve(
  name: string,
  path: Path,
  scan: Quantity | null,
  tables: Tables,
  reader: Reader,
): readonly CurveRow[] | null {
  const { problems } = reader
  const table = tables(name)
  if ('rule' in table) {
    problems.add(path, table.rule, table.remedy)
    return null
  }
  const source: Source = { file: name, text: table.text }
  const before = problems.count
  const spans = linesOf(table.text)
  const records = csvRecords()
  if (records === null) return null
  const [head, ...body] = records
  if (!head || head.cells.every((cell) => cell.trim() === '')) {
    return complain(
      1,
      'The table is empty.',
      `Write one header line, "${columns.join(',')}", and a row for each energy.`,
    )
  }
  const names = head.cells.map((cell) => cell.trim())
  checkHead(names, head.line)
  if (problems.count > before) return null
  if (body.length === 0)
    return complain(head.line, 'The table has no rows.', 'Write one for each energy, like "80,0.9".')
  if (body.length > mostRows) return complain(head.line, `The table has more than ${mostRows} rows.`, 'Thin it out.')

  const rows: CurveRow[] = []
  for (const { cells, line } of body) {
    if (problems.count - before >= mostComplaints) break
    const row = readRow(new Map(names.map((column, i) => [column, (cells[i] ?? '').trim()])), line)
    if (row) rows.push(row)
  }
  if (problems.count === before && rows.every((row) => row.weight === 0)) {
    return complain(head.line, 'Every row has weight 0.', 'Give at least one row a weight above 0.')
  }
  return problems.count === before ? rows : null

  function readRow(cells: ReadonlyMap<string, string>, line: number): CurveRow | null {
    const energyText = cells.get('energy_meV') ?? ''
    const energyEv = numeric('energy_meV', energyText, line) === null ? null : shifted(energyText, -3)
    const T = numeric('T', cells.get('T') ?? '', line)
    const sense = word('sense', cells.get('sense') || 'equal', ['equal', 'least', 'most'] as const, line)
    const scale = word('scale', cells.get('scale') || 'linear', ['linear', 'decades'] as const, line)
    const tolerance = numeric('tolerance', cells.get('tolerance') || '1', line)
    const weight = numeric('weight', cells.get('weight') || '1', line)
    if (energyEv === null || T === null || !sense || !scale || tolerance === null || weight === null) return null
    if (scan && (energyEv < scan.from || energyEv > scan.to)) {
      const limits = problems.quoted(['target', 'scan'])
      complain(
        line,
        `energy_meV ${shortened(energyText)} lies outside the scan, ${limits}.`,
        'Widen "scan", or take the row out.',
      )
    }
    if (T < 0 || T > 1) complain(line, `T ${T} is outside 0..1.`, 'Write a share of the incoming flux.')
    if (!(tolerance > 0)) complain(line, `tolerance ${tolerance} is not above 0.`, 'Write how far off counts as 1.')
    if (weight < 0) complain(line, `weight ${weight} is negative.`, 'Write 0 or more.')
    return { energyEv, T: scale === 'decades' ? Math.max(T, floor) : T, sense, scale, tolerance, weight }
  }

  function numeric(column: string, text: string, line: number): number | null {
    const value = /^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i.test(text) && text.length < 60 ? Number(text) : Number.NaN
    if (Number.isFinite(value)) return value
    complain(line, `${column} "${shortened(text, 30)}" is no number.`, 'Write a number with a dot, like 80.5 or 1e-3.')
    return null
  }

  function word<W extends string>(column: string, text: string, known: readonly W[], line: number): W | null {
    const found = known.find((one) => one === text)
    if (!found)
      complain(line, `${column} "${shortened(text, 30)}" is not known.`, `Write ${known.join(', ')} or nothing.`)
    return found ?? null
  }

  function checkHead(names: readonly string[], line: number): void {
    if (names.includes('wavelength_nm')) {
      complain(line, '"wavelength_nm" belongs to light.', 'An electron goal has energies: "energy_meV".')
    }
    names.forEach((column, i) => {
      if (column === 'wavelength_nm') return
      const near = nearest(column, columns)[0]
      const remedy = near ? `Did you mean "${near}"?` : `Columns are ${columns.join(', ')}.`
      if (!columns.includes(column)) complain(line, `Unknown column "${shortened(column, 30)}".`, remedy)
      else if (names.indexOf(column) < i) complain(line, `The column "${column}" stands twice.`, 'Keep one of the two.')
    })
    for (const needed of ['energy_meV', 'T']) {
      if (names.includes(needed) || (needed === 'energy_meV' && names.includes('wavelength_nm'))) continue
      complain(line, `The column "${needed}" is missing.`, `The first line has to name it: "${columns.join(',')}".`)
    }
  }

  function csvRecords(): { cells: string[]; line: number }[] | null {
    try {
      const found = parse(source.text, { bom: true, info: true, skip_empty_lines: true, relax_column_count: false })
      return (found as unknown as { record: string[]; info: { lines: number } }[]).map(({ record, info }) => ({
        cells: record,
        line: info.lines,
      }))
    } catch (error) {
      const { code, lines } = error as CsvError & { lines?: number }
      const line = lines ?? 1
      if (code === 'CSV_RECORD_INCONSISTENT_FIELDS_LENGTH') {
        complain(
          line,
          'The row has another number of cells than the header.',
          'Use one comma between cells, and a dot in numbers.',
        )
      } else {
        complain(line, 'This is no CSV.', 'Use commas between cells, and quote only whole cells.')
      }
      return null
    }
  }

  function complain(line: number, rule: string, remedy: string): null {
    problems.addIn(source, spans[Math.min(line, spans.length) - 1], rule, remedy, path)
    return null
  }
}

function linesOf(text: string): Span[] {
  const spans: Span[] = []
  let start = 0
  for (const line of text.split('\n')) {
    spans.push({ start, end: start + line.length })
    start += line.length + 1
  }
  return spans
}

import { type CsvError, parse } from 'csv-parse/sync'
import { type Source, type Span, shortened } from './problemAt.js'
import type { Reader } from './Reader.js'
import type { Path } from './YamlSource.js'

/** Gives the text of a file that a job names, or says why it can't be had. */
export type Tables = (name: string) => { readonly text: string } | { readonly rule: string; readonly remedy: string }

/** A record of a table, by its columns. */
export interface CsvRow {
  readonly cells: ReadonlyMap<string, string>
  readonly line: number
}

const mostRows = 20_000

/** After so many wrong rows the reader has seen the pattern. */
const mostComplaints = 8

/** A CSV that a job names at `path`: its problems are those of the job, told with the line of the table. */
export class CsvTable {
  private readonly source: Source
  private readonly spans: readonly Span[]
  private readonly before: number

  private constructor(
    name: string,
    text: string,
    private readonly path: Path,
    private readonly reader: Reader,
  ) {
    this.source = { file: name, text }
    this.spans = linesOf(text)
    this.before = reader.problems.count
  }

  /** Null where the file can't be had. */
  static open(name: string, path: Path, tables: Tables, reader: Reader): CsvTable | null {
    const table = tables(name)
    if ('text' in table) return new CsvTable(name, table.text, path, reader)
    reader.problems.add(path, table.rule, table.remedy)
    return null
  }

  get inOrder(): boolean {
    return this.reader.problems.count === this.before
  }

  /**
   * `read` of every row; null where anything is wrong. `checkHead` complains about the columns; `likeHead` and `likeRow` are examples.
   */
  rows<T>(
    checkHead: (names: readonly string[], line: number) => void,
    read: (row: CsvRow) => T | null,
    likeHead: string,
    likeRow: string,
  ): T[] | null {
    const records = this.records()
    if (records === null) return null
    const [head, ...body] = records
    if (!head || head.cells.every((cell) => cell.trim() === '')) {
      return this.complain(1, 'The table is empty.', `Write one header line, "${likeHead}", and rows below it.`)
    }
    const names = head.cells.map((cell) => cell.trim())
    checkHead(names, head.line)
    if (!this.inOrder) return null
    if (body.length === 0) return this.complain(head.line, 'The table has no rows.', `Write some, like "${likeRow}".`)
    if (body.length > mostRows)
      return this.complain(head.line, `The table has more than ${mostRows} rows.`, 'Thin it out.')
    const rows: T[] = []
    for (const { cells, line } of body) {
      if (this.reader.problems.count - this.before >= mostComplaints) break
      const row = read({ cells: new Map(names.map((column, i) => [column, (cells[i] ?? '').trim()])), line })
      if (row !== null) rows.push(row)
    }
    return this.inOrder ? rows : null
  }

  number({ cells, line }: CsvRow, column: string, absent = ''): number | null {
    const text = cells.get(column) || absent
    const value = /^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i.test(text) && text.length < 60 ? Number(text) : Number.NaN
    if (Number.isFinite(value)) return value
    const rule = `${column} "${shortened(text, 30)}" is no number.`
    return this.complain(line, rule, 'Write a number with a dot, like 80.5 or 1e-3.')
  }

  word<W extends string>({ cells, line }: CsvRow, column: string, known: readonly W[]): W | null {
    const text = cells.get(column) || known[0]
    const found = known.find((one) => one === text)
    if (found !== undefined) return found
    return this.complain(
      line,
      `${column} "${shortened(text, 30)}" is not known.`,
      `Write ${known.join(', ')} or nothing.`,
    )
  }

  complain(line: number, rule: string, remedy: string): null {
    const { source, spans, path } = this
    this.reader.problems.addIn(source, spans[Math.min(line, spans.length) - 1], rule, remedy, path)
    return null
  }

  private records(): { cells: string[]; line: number }[] | null {
    try {
      const found = parse(this.source.text, {
        bom: true,
        info: true,
        skip_empty_lines: true,
        relax_column_count: false,
      })
      return (found as unknown as { record: string[]; info: { lines: number } }[]).map(({ record, info }) => ({
        cells: record,
        line: info.lines,
      }))
    } catch (error) {
      const { code, lines } = error as CsvError & { lines?: number }
      const line = lines ?? 1
      if (code !== 'CSV_RECORD_INCONSISTENT_FIELDS_LENGTH') {
        return this.complain(line, 'This is no CSV.', 'Use commas between cells, and quote only whole cells.')
      }
      return this.complain(
        line,
        'The row has another number of cells than the header.',
        'Use one comma between cells, and a dot in numbers.',
      )
    }
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

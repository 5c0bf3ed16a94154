import { nearest } from '../media/index.js'
import { type CsvRow, CsvTable, type Tables } from './CsvTable.js'
import type { MediumOption } from './job.js'
import { shortened } from './problemAt.js'
import type { Reader } from './Reader.js'
import type { Path } from './YamlSource.js'

type Row = Extract<MediumOption, { kind: 'table' }>['rows'][number]

/** Names of the three columns, the first of each as we write them. */
const columns = {
  wavelength: ['wavelength_nm', 'wavelength_um'],
  index: ['n', 'index'],
  extinction: ['k', 'extinction'],
} as const

const header = 'wavelength_nm,n,k'

/**
 * A medium of light by a table: vacuum wavelength (nm or um), n and, where it absorbs, k >= 0 (positive absorbs). Wavelengths run one
 * way; rows come back ascending, in nm. Null where there is a problem.
 */
export function readTable(name: string, path: Path, tables: Tables, reader: Reader): readonly Row[] | null {
  const table = CsvTable.open(name, path, tables, reader)
  if (table === null) return null
  const lines: number[] = []
  const rows = table.rows(checkHead, readRow, header, '550,1.46,0')
  if (rows === null) return null
  if (rows.length < 2) return table.complain(lines[0] ?? 1, 'The table has one row.', 'Give two wavelengths or more.')
  const upwards = rows[1][0] > rows[0][0]
  const turn = rows.findIndex(([nm], i) => i > 0 && (upwards ? nm <= rows[i - 1][0] : nm >= rows[i - 1][0]))
  if (turn > 0) {
    const rule = `The wavelengths are not monotone: ${rows[turn][0]} nm stands behind ${rows[turn - 1][0]} nm.`
    return table.complain(lines[turn], rule, 'Sort the rows, and give each wavelength once.')
  }
  return upwards ? rows : [...rows].reverse()

  function readRow(row: CsvRow): Row | null {
    const { cells, line } = row
    lines.push(line)
    const column = (names: readonly string[]) => names.find((one) => cells.has(one))
    const place = column(columns.wavelength)!
    const value = table!.number(row, place)
    const n = table!.number(row, column(columns.index)!)
    const kColumn = column(columns.extinction)
    const k = kColumn === undefined ? 0 : table!.number(row, kColumn, '0')
    if (value === null || n === null || k === null) return null
    const nm = place === 'wavelength_um' ? value * 1000 : value
    if (!(nm > 0)) return table!.complain(line, `${place} ${value} is not above 0.`, 'Write a vacuum wavelength.')
    if (!(n > 0 && n <= 20)) return table!.complain(line, `n ${n} is outside 0..20.`, 'Write a refractive index.')
    if (k < 0) {
      const rule = `k ${k} is negative: it would amplify.`
      return table!.complain(line, rule, 'Positive k absorbs: turn its sign.')
    }
    return [nm, n, k]
  }

  function checkHead(names: readonly string[], line: number): void {
    const known = Object.values(columns).flat() as readonly string[]
    names.forEach((column, i) => {
      const near = nearest(column, known)[0]
      const remedy = near ? `Did you mean "${near}"?` : `Columns are ${known.join(', ')}.`
      if (!known.includes(column)) table!.complain(line, `Unknown column "${shortened(column, 30)}".`, remedy)
      else if (names.indexOf(column) < i)
        table!.complain(line, `The column "${column}" stands twice.`, 'Keep one of the two.')
    })
    for (const either of Object.values(columns) as readonly (readonly string[])[]) {
      const found = either.filter((column) => names.includes(column))
      if (found.length > 1)
        table!.complain(line, `"${found[0]}" and "${found[1]}" say the same.`, 'Keep one of the two columns.')
      if (found.length === 0 && either !== columns.extinction)
        table!.complain(line, `The column "${either[0]}" is missing.`, `The first line has to name it: "${header}".`)
    }
  }
}

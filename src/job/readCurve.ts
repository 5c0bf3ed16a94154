import { nearest } from '../media/index.js'
import { type CsvRow, CsvTable, type Tables } from './CsvTable.js'
import { shifted } from './decimal.js'
import type { CurveRow, Kind, Quantity } from './job.js'
import { shortened } from './problemAt.js'
import type { Reader } from './Reader.js'
import { otherAxis, type SpectralRange } from './spectral.js'
import type { Path } from './YamlSource.js'

/** T of a goal on decades is floored here, as the calculated T is. */
const floor = 1e-30

/**
 * The rows of a goal: energy_meV or, for light, wavelength_nm; T (for a goal on R or A that letter does too), optional sense, scale,
 * tolerance, weight. Null where there is a problem.
 */
export function readCurve(
  name: string,
  path: Path,
  scan: SpectralRange | null,
  { kind, quantity, tables }: { readonly kind: Kind; readonly quantity: Quantity; readonly tables: Tables },
  reader: Reader,
): readonly CurveRow[] | null {
  const table = CsvTable.open(name, path, tables, reader)
  if (table === null) return null
  const places = kind === 'electron' ? ['energy_meV'] : ['wavelength_nm', 'energy_meV']
  const values = [...new Set(['T', quantity])]
  const columns = [...places, ...values, 'sense', 'scale', 'tolerance', 'weight']
  const header = [places[0], 'T', 'sense', 'scale', 'tolerance', 'weight'].join(',')
  const rows = table.rows(checkHead, readRow, header, kind === 'electron' ? '80,0.9' : '633,0.9')
  if (rows?.every((row) => row.weight === 0)) {
    return table.complain(1, 'Every row has weight 0.', 'Give at least one row a weight above 0.')
  }
  return rows

  function readRow(row: CsvRow): CurveRow | null {
    const { cells, line } = row
    const place = places.find((column) => cells.has(column))!
    const at = table!.number(row, place)
    const energyEv = at === null ? null : energyOf(place, at, cells.get(place)!)
    const T = table!.number(row, values.findLast((column) => cells.has(column))!)
    const sense = table!.word(row, 'sense', ['equal', 'least', 'most'])
    const scale = table!.word(row, 'scale', ['linear', 'decades'])
    const tolerance = table!.number(row, 'tolerance', '1')
    const weight = table!.number(row, 'weight', '1')
    if (at === null || energyEv === null || T === null || !sense || !scale || tolerance === null || weight === null)
      return null
    if (scan && !(energyEv >= scan.lowEv && energyEv <= scan.highEv)) {
      const limits = reader.problems.quoted(['target', 'scan'])
      const rule = `${place} ${shortened(cells.get(place)!)} lies outside the scan, ${limits}.`
      table!.complain(line, rule, 'Widen "scan", or take the row out.')
    }
    if (T < 0 || T > 1) table!.complain(line, `T ${T} is outside 0..1.`, 'Write a share of the incoming flux.')
    if (!(tolerance > 0)) {
      table!.complain(line, `tolerance ${tolerance} is not above 0.`, 'Write how far off counts as 1.')
    }
    if (weight < 0) table!.complain(line, `weight ${weight} is negative.`, 'Write 0 or more.')
    return { energyEv, T: scale === 'decades' ? Math.max(T, floor) : T, sense, scale, tolerance, weight }
  }

  function checkHead(names: readonly string[], line: number): void {
    if (kind === 'electron' && names.includes('wavelength_nm')) {
      table!.complain(line, '"wavelength_nm" belongs to light.', 'An electron goal has energies: "energy_meV".')
    }
    if (places.every((column) => names.includes(column)) && places.length > 1) {
      table!.complain(line, 'The table has energies and wavelengths.', 'Keep one of the two columns.')
    }
    names.forEach((column, i) => {
      if (column === 'wavelength_nm' && kind === 'electron') return
      const near = nearest(column, columns)[0]
      const remedy = near ? `Did you mean "${near}"?` : `Columns are ${columns.join(', ')}.`
      if (!columns.includes(column)) table!.complain(line, `Unknown column "${shortened(column, 30)}".`, remedy)
      else if (names.indexOf(column) < i)
        table!.complain(line, `The column "${column}" stands twice.`, 'Keep one of the two.')
    })
    const missing = [
      ...(names.includes('wavelength_nm') || places.some((column) => names.includes(column)) ? [] : [places[0]]),
      ...(values.some((column) => names.includes(column)) ? [] : ['T']),
    ]
    for (const column of missing)
      table!.complain(line, `The column "${column}" is missing.`, `The first line has to name it: "${header}".`)
  }
}

/** A place as written, in eV. */
function energyOf(column: string, value: number, text: string): number {
  return column === 'energy_meV' ? shifted(text, -3) : otherAxis('nm', value)
}

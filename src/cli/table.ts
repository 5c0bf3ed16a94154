/** Columns of equal width, right-aligned but for the last; a row of the header first. */
export function table(rows: readonly (readonly string[])[]): string {
  const widths = rows[0].map((_, i) => Math.max(...rows.map((row) => row[i].length)))
  const last = widths.length - 1
  return rows.map((row) => row.map((cell, i) => (i === last ? cell : cell.padStart(widths[i]))).join('  ')).join('\n')
}

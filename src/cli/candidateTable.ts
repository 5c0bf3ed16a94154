import type { JobResult } from '../deliver/index.js'
import { table } from './table.js'

/** The list as a person reads it; the files have every digit. */
export function candidateTable({ candidates }: JobResult): string {
  const header = ['rank', 'meets', 'merit', 'margin', 'yield %', 'peak meV', 'fwhm meV', 'peak T', 'nm', 'stack']
  const rows = candidates.map(({ rank, evaluation, margin, yield: grown, totalNm, stack, listedAs }) => {
    const { peak, met, merit } = evaluation
    return [
      String(rank),
      met ? 'yes' : 'no',
      digits(merit, 4),
      digits(margin, 4),
      grown === null ? '' : grown.pct.toFixed(1),
      peak ? digits(peak.energyEv * 1000, 5) : '',
      peak ? digits(peak.fwhmEv * 1000, 3) : '',
      peak ? digits(peak.T, 4) : '',
      totalNm.toFixed(2),
      listedAs === 'family' ? `${stack} (of another family)` : stack,
    ]
  })
  return table([header, ...rows])
}

function digits(value: number | null, count: number): string {
  return value === null ? '' : String(Number(value.toPrecision(count)))
}

import { type JobResult, spectralUnit } from '../deliver/index.js'
import type { Kind } from '../job/index.js'
import { hcEvNm } from '../media/index.js'
import { table } from './table.js'

/** The list as a person reads it; the files have every digit. */
export function candidateTable({ candidates }: JobResult, kind: Kind): string {
  const { name, place } = spectralUnit(kind)
  const header = [
    'rank',
    'meets',
    'merit',
    'margin',
    'yield %',
    `peak ${name}`,
    `fwhm ${name}`,
    'peak T',
    'nm',
    'stack',
  ]
  const rows = candidates.map(({ rank, evaluation, margin, yield: grown, totalNm, stack, listedAs }) => {
    const { peak, met, merit } = evaluation
    return [
      String(rank),
      met ? 'yes' : 'no',
      digits(merit, 4),
      digits(margin, 4),
      grown === null ? '' : grown.pct.toFixed(1),
      peak ? digits(place(peak.energyEv), kind === 'electron' ? 5 : 6) : '',
      peak
        ? digits(kind === 'electron' ? peak.fwhmEv * 1000 : (hcEvNm * peak.fwhmEv) / (peak.lowEv * peak.highEv), 3)
        : '',
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

import type { Job } from '../job/index.js'
import { demandRows, demandTable, factLines } from './demandTable.js'
import { focusPanel } from './focusPanel.js'
import { short } from './layerText.js'
import { picture, pictureWidth } from './picture.js'
import { scanPanel } from './scanPanel.js'
import { spectralUnit } from './spectralUnit.js'
import type { Candidate } from './types.js'

/**
 * transmission.svg: T over the scan in powers of ten with the demands drawn in; beneath it T on a linear scale around the peak (or over the
 * pass ranges), and the demands in words with what was reached.
 */
export function transmissionPlot(job: Job, candidate: Candidate): string {
  const rows = demandRows(job, candidate)
  return picture(job, candidate, 'transmission', description(job, candidate), (top, key) => {
    const scan = scanPanel(
      job,
      candidate,
      { left: 80, top: top + 24, width: pictureWidth - 100, height: 250 },
      `${key}-scan`,
    )
    const below = top + 24 + scan.height
    const focus = focusPanel(job, candidate, { left: 80, top: below + 26, width: 250, height: 200 }, `${key}-focus`)
    const table = demandTable(rows, factLines(job, candidate), {
      left: 356,
      top: below + 22,
      width: pictureWidth - 356 - 20,
    })
    return {
      height: 24 + scan.height + Math.max(26 + focus.height, 22 + table.height),
      defs: [...scan.defs, ...focus.defs],
      parts: [...scan.parts, ...focus.parts, ...table.parts],
    }
  })
}

function description(job: Job, candidate: Candidate): string {
  const unit = spectralUnit(job.kind)
  const { peak } = candidate.evaluation
  const demands = demandRows(job, candidate)
    .map(
      ({ id, wanted, reached, state }) =>
        `${id === '' ? 'and' : id} ${wanted}: ${reached}${state === '' ? '' : `, ${state}`}.`,
    )
    .join(' ')
  return [
    `Transmission over ${unit.rangeText(job.scanEv)}${job.kind === 'electron' ? ' above the band edge of the entry' : ''}.`,
    peak === null
      ? 'There is no maximum.'
      : `Peak at ${unit.text(peak.energyEv)}, ${unit.widthText(peak)} wide, T = ${short(peak.T)}.`,
    `Demands: ${demands}`,
  ].join(' ')
}

import type { Kind } from '../job/index.js'
import { type Cell, csv } from './csv.js'
import { type SpectralUnit, spectralUnit } from './spectralUnit.js'
import type { Candidate } from './types.js'

/**
 * candidates.csv: one line a candidate, in the order of the list. `reached` of a demand is an energy in meV, or a wavelength in nm, for a peak or a band (its centre), the extreme T
 * of a pass or block, the rms of a curve; `residual` is the root mean square of its residuals, 0 when met.
 */
export function candidatesCsv(candidates: readonly Candidate[], demandIds: readonly string[], kind: Kind): string {
  const unit = spectralUnit(kind)
  const header = [
    ...['rank', 'id', 'listed_as', 'meets', 'merit', 'margin'],
    ...['yield_pct', 'yield_low_pct', 'yield_high_pct', 'trials'],
    ...[`peak_${unit.name}`, `fwhm_${unit.name}`, 'peak_T'],
    ...demandIds.flatMap((id) => [`${id}_reached`, `${id}_residual`]),
    ...['limiting_demand', 'total_nm', 'layers', 'compositions', 'worst_layer', `worst_shift_${unit.name}`],
    ...['flux_error', 'path_error', 'stack'],
  ]
  return csv(
    header,
    candidates.map((candidate) => row(candidate, demandIds, unit)),
  )
}

function row(candidate: Candidate, demandIds: readonly string[], unit: SpectralUnit): Cell[] {
  const { evaluation, yield: grown } = candidate
  const peak = evaluation.peak
  return [
    ...[candidate.rank, candidate.id, candidate.listedAs, evaluation.met ? 'yes' : 'no'],
    ...[evaluation.merit, candidate.margin],
    ...[grown?.pct ?? null, grown?.lowPct ?? null, grown?.highPct ?? null, grown?.trials ?? null],
    ...[unit.cell(peak?.energyEv ?? null), unit.widthCell(peak), peak?.T ?? null],
    ...demandIds.flatMap((id) => demandCells(candidate, id, unit)),
    ...[candidate.limitingDemand, candidate.totalNm, candidate.layers.length, candidate.compositions],
    ...[candidate.worstLayer, unit.shiftCell(candidate.worstShiftEv, peak?.energyEv ?? null)],
    ...[candidate.fluxError, candidate.pathError, candidate.stack],
  ]
}

function demandCells(candidate: Candidate, id: string, unit: SpectralUnit): Cell[] {
  const demand = candidate.evaluation.demands.find((result) => result.id === id)
  if (demand === undefined) return [null, null]
  return [demand.kind === 'peak' || demand.kind === 'band' ? unit.cell(demand.reached) : demand.reached, demand.rms]
}

import { type Cell, csv, meV } from './csv.js'
import type { Candidate } from './types.js'

/**
 * candidates.csv: one line a candidate, in the order of the list. `reached` of a demand is an energy in meV for a peak or a band (its centre), the extreme T
 * of a pass or block, the rms of a curve; `residual` is the root mean square of its residuals, 0 when met.
 */
export function candidatesCsv(candidates: readonly Candidate[], demandIds: readonly string[]): string {
  const header = [
    ...['rank', 'id', 'listed_as', 'meets', 'merit', 'margin'],
    ...['yield_pct', 'yield_low_pct', 'yield_high_pct', 'trials'],
    ...['peak_meV', 'fwhm_meV', 'peak_T'],
    ...demandIds.flatMap((id) => [`${id}_reached`, `${id}_residual`]),
    ...['limiting_demand', 'total_nm', 'layers', 'compositions', 'worst_layer', 'worst_shift_meV'],
    ...['flux_error', 'path_error', 'stack'],
  ]
  return csv(
    header,
    candidates.map((candidate) => row(candidate, demandIds)),
  )
}

function row(candidate: Candidate, demandIds: readonly string[]): Cell[] {
  const { evaluation, yield: grown } = candidate
  const peak = evaluation.peak
  return [
    ...[candidate.rank, candidate.id, candidate.listedAs, evaluation.met ? 'yes' : 'no'],
    ...[evaluation.merit, candidate.margin],
    ...[grown?.pct ?? null, grown?.lowPct ?? null, grown?.highPct ?? null, grown?.trials ?? null],
    ...[meV(peak?.energyEv ?? null), meV(peak?.fwhmEv ?? null), peak?.T ?? null],
    ...demandIds.flatMap((id) => demandCells(candidate, id)),
    ...[candidate.limitingDemand, candidate.totalNm, candidate.layers.length, candidate.compositions],
    ...[candidate.worstLayer, meV(candidate.worstShiftEv)],
    ...[candidate.fluxError, candidate.pathError, candidate.stack],
  ]
}

function demandCells(candidate: Candidate, id: string): Cell[] {
  const demand = candidate.evaluation.demands.find((result) => result.id === id)
  if (demand === undefined) return [null, null]
  return [demand.kind === 'peak' || demand.kind === 'band' ? meV(demand.reached) : demand.reached, demand.rms]
}

import type { Demand, Job } from '../job/index.js'
import type { DemandResult } from '../target/index.js'
import { fitted, label, textWidth, wrapped } from './label.js'
import { short } from './layerText.js'
import { palette } from './palette.js'
import type { PictureBody } from './picture.js'
import { lineText, type SpectralUnit, spectralUnit, widthsText } from './spectralUnit.js'
import { element } from './svg.js'
import type { Candidate } from './types.js'

/** One line of the table: what was wanted and what came of it. `id` and `state` stand on the first line of a demand only. */
export interface DemandRow {
  readonly id: string
  readonly wanted: string
  readonly reached: string
  readonly state: '' | 'met' | 'missed' | 'goal'
}

/** Rows of demands that a picture holds. */
const mostRows = 24

/** The demands in words. */
export function demandRows(job: Job, { evaluation }: Candidate): DemandRow[] {
  return job.demands.flatMap((demand) => {
    const result = evaluation.demands.find(({ id }) => id === demand.id)
    const [first, ...others] = partsOf(demand, result, spectralUnit(job.kind))
    if (demand.at !== null) others.push({ wanted: `at ${demand.at}`, reached: '' })
    const state = result === undefined ? '' : result.met === null ? 'goal' : result.met ? 'met' : 'missed'
    return [
      { id: demand.id, ...first, state } as const,
      ...others.map((part) => ({ id: '', ...part, state: '' }) as const),
    ]
  })
}

/** What else a planner asks first: how good, how sure, how sensitive. */
export function factLines({ growth, kind }: Job, candidate: Candidate): string[] {
  const { evaluation, margin, yield: grown, limitingDemand, worstLayer, worstShiftEv } = candidate
  const assumed = growth.assumed ? ', assumed growth errors' : ''
  const lines = [
    evaluation.met
      ? `All limits are met.${margin === null ? '' : ` Margin ${short(margin)} standard deviations.`}`
      : `Merit ${short(evaluation.merit)}; 0 would meet all limits.`,
  ]
  if (grown !== null) {
    const interval = `${short(grown.lowPct)} to ${short(grown.highPct)} %`
    lines.push(`Yield ${short(grown.pct)} % (${interval}, ${grown.trials} trials on paper${assumed}).`)
  }
  if (limitingDemand !== null) lines.push(`Fails most often: ${limitingDemand}.`)
  if (worstLayer !== null && worstShiftEv !== null) {
    lines.push(
      `Most sensitive: ${worstLayer}, ${spectralUnit(kind)
        .shiftText(worstShiftEv, evaluation.peak?.energyEv ?? null)
        .replace('-', '\u2212')} for one deviation of its width.`,
    )
  }
  return lines
}

/** Draws both below one another. */
export function demandTable(
  rows: readonly DemandRow[],
  facts: readonly string[],
  { left, top, width }: { left: number; top: number; width: number },
): PictureBody {
  const idWidth = Math.min(100, Math.max(textWidth('demand', 11.5), ...rows.map(({ id }) => textWidth(id, 11.5))))
  const columns = { id: left, wanted: left + idWidth + 8, reached: left + idWidth + 150, state: left + width }
  const shown = rows.slice(0, mostRows)
  const head = { bold: true, size: 11, fill: palette.quiet }
  const parts = [
    label(columns.id, top, 'demand', head),
    label(columns.wanted, top, 'wanted', head),
    label(columns.reached, top, 'reached', head),
    rule(left, top + 5, width),
  ]
  let y = top + 21
  for (const { id, wanted, reached, state } of shown) {
    if (id !== '') parts.push(label(columns.id, y, fitted(id, idWidth, 11.5), { size: 11.5, bold: true }))
    parts.push(label(columns.wanted, y, fitted(wanted, 138, 11.5), { size: 11.5 }))
    parts.push(
      label(columns.reached, y, fitted(reached, columns.state - columns.reached - (state === '' ? 0 : 50), 11.5), {
        size: 11.5,
      }),
    )
    if (state !== '') {
      const fill = { met: palette.wanted, missed: palette.forbidden, goal: palette.quiet }[state]
      parts.push(label(columns.state, y, state, { size: 11.5, anchor: 'end', bold: true, fill }))
    }
    y += 17
  }
  if (rows.length > shown.length) {
    parts.push(label(columns.wanted, y, 'and more, in candidates.csv', { size: 11, fill: palette.quiet }))
    y += 17
  }
  parts.push(rule(left, y - 10, width))
  y += 8
  for (const line of facts.flatMap((fact) => wrapped(fact, width, 11.5, 2))) {
    parts.push(label(left, y, line, { size: 11.5 }))
    y += 16
  }
  return { height: y - top, defs: [], parts }
}

type Part = Pick<DemandRow, 'wanted' | 'reached'>

function partsOf(demand: Demand, result: DemandResult | undefined, unit: SpectralUnit): [Part, ...Part[]] {
  const { quantity } = demand
  const reached = result?.reached ?? null
  if (demand.kind === 'curve') {
    return [{ wanted: `curve ${demand.file}`, reached: reached === null ? '' : `rms ${short(reached)}` }]
  }
  if (demand.kind === 'pass' || demand.kind === 'block') {
    const range = unit.rangeText([demand.pointsEv[0], demand.pointsEv[demand.pointsEv.length - 1]])
    const limit =
      demand.kind === 'block'
        ? `${quantity} \u2264 ${short(demand.below)}`
        : `${quantity} \u2265 ${short(demand.above)}`
    const extreme = result?.extremeEv ?? null
    return [
      { wanted: `${demand.kind} ${range}`, reached: reached === null ? '' : `${quantity} = ${short(reached)}` },
      { wanted: limit, reached: extreme === null ? '' : `at ${unit.text(extreme)}` },
    ]
  }
  const peak = result?.peak ?? null
  const parts: Part[] = []
  if (demand.fwhm !== null) {
    const wanted = `fwhm ${widthsText(demand.axis, demand.fwhm)}`
    parts.push({ wanted, reached: peak === null ? '' : unit.widthText(peak) })
  }
  const figure = (wanted: string, limit: number | null, value: number | undefined) => {
    if (limit !== null)
      parts.push({ wanted: `${wanted} ${short(limit)}`, reached: value === undefined ? '' : short(value) })
  }
  if (demand.kind === 'peak') {
    figure('height', demand.height, peak?.T)
    if (demand.alone !== null) parts.push({ wanted: `alone ${short(demand.alone)}`, reached: '' })
  } else {
    figure('top', demand.top, result?.band?.top)
    figure('ripple', demand.ripple, result?.band?.ripple)
  }
  const nothing = result === undefined ? '' : 'no maximum'
  const place = `${demand.kind}${quantity === 'T' ? '' : ` of ${quantity}`} ${lineText(demand)}`
  return [{ wanted: place, reached: reached === null ? nothing : unit.text(reached) }, ...parts]
}

function rule(left: number, y: number, width: number): string {
  return element('line', { x1: left, y1: y, x2: left + width, y2: y, stroke: palette.border })
}

import { type CurveDemand, type Demand, energiesAround } from '../job/index.js'
import type { Box, Frame } from './frame.js'
import { forbidden } from './hatch.js'
import { fitted, label, textWidth } from './label.js'
import { palette } from './palette.js'
import { pushApart } from './pushApart.js'
import { element, fixed } from './svg.js'

/** `across` maps an energy (eV) to pixels, `height` T, on whatever scales. */
export interface DemandFrame {
  readonly plot: Frame
  readonly across: (ev: number) => number
  readonly height: (T: number) => number
  readonly key: string
}

/** The place of a demand in a plot of T: a window for a peak or the centre of a band, a no-go region for a block or a pass, nothing for a curve. */
export function demandRegion(frame: DemandFrame, demand: Demand): string {
  const { plot, height, key } = frame
  // Limits of R or A have no place beside T.
  if (demand.kind === 'curve' || demand.quantity !== 'T') return ''
  // One pixel more than the box, so that only the inner edge shows as a line.
  const top = plot.box.top - 2
  const bottom = plot.box.top + plot.box.height + 2
  const across = spanInside(frame, rangeEv(demand))
  if (across === null) return ''
  const { left, right } = across
  if (demand.kind === 'block') return forbidden({ left, right, top, bottom: height(demand.below) }, 'bottom', key)
  if (demand.kind === 'pass') return forbidden({ left, right, top: height(demand.above), bottom }, 'top', key)
  const width = Math.max(right - left, 2)
  return element('rect', {
    ...{ x: (left + right - width) / 2, y: top, width, height: bottom - top },
    ...{ fill: palette.wanted, 'fill-opacity': '0.12', stroke: palette.wanted, 'stroke-dasharray': '3 3' },
  })
}

/**
 * A range of energies in pixels, cut a little outside of the plot; null when all of it is elsewhere. (Drawing it in full and leaving the cut to
 * the clip path goes wrong where a plot magnifies a million times: viewers overflow.)
 */
export function spanInside(
  { plot: { box }, across }: Pick<DemandFrame, 'across' | 'plot'>,
  [fromEv, toEv]: readonly [number, number],
): { left: number; right: number } | null {
  const [least, most] = [box.left - 2, box.left + box.width + 2]
  const ends = [across(fromEv), across(toEv)]
  const [left, right] = [Math.min(...ends), Math.max(...ends)]
  return right < least || left > most ? null : { left: Math.max(left, least), right: Math.min(right, most) }
}

/** Rows of a curve demand that are drawn at most. */
const mostGoals = 150

/** The table of a curve demand: a dot a row; triangles point to the side where T may be. */
export function goalMarks(frame: DemandFrame, { rows, quantity }: CurveDemand): string {
  if (quantity !== 'T') return ''
  const { across, height } = frame
  const every = Math.ceil(rows.length / mostGoals)
  const marks = rows
    .filter(({ T, energyEv }, i) => i % every === 0 && T > 0 && spanInside(frame, [energyEv, energyEv]) !== null)
    .map(({ energyEv, T, sense }) => {
      const x = across(energyEv)
      const y = height(T)
      if (sense === 'equal') return element('circle', { cx: x, cy: y, r: 2.2 })
      const tip = sense === 'least' ? -5 : 5
      const corners = [x - 3, y, x + 3, y, x, y + tip].map(fixed)
      return element('polygon', { points: corners.join(' ') })
    })
  return element('g', { fill: palette.wanted }, ...marks)
}

/** The ids of the demands above the plot, each led to its region; none when they don't fit side by side: the table names them all. */
export function demandLabels({ plot, across }: DemandFrame, demands: readonly Demand[]): string[] {
  const { box } = plot
  const texts = demands.map(({ id }) => fitted(id, 110, 12))
  const wishes = demands.map((demand) => held(box, across(middleEv(demand))))
  const widths = texts.map((text) => textWidth(text, 12) + 10)
  const places = pushApart(wishes, widths, box.left, box.left + box.width)
  if (places === null) return []
  return demands.flatMap(({ kind }, i) => [
    label(places[i], box.top - 11, texts[i], {
      ...{ anchor: 'middle', bold: true },
      fill: kind === 'block' || kind === 'pass' ? palette.forbidden : palette.wanted,
    }),
    element('line', { x1: places[i], y1: box.top - 7, x2: wishes[i], y2: box.top, stroke: palette.border }),
  ])
}

/** The energies that a demand speaks of. */
export function rangeEv(demand: Demand): readonly [number, number] {
  if (demand.kind === 'peak' || demand.kind === 'band') return energiesAround(demand, demand.within)
  const energies = demand.kind === 'curve' ? demand.rows.map(({ energyEv }) => energyEv) : demand.pointsEv
  return [Math.min(...energies), Math.max(...energies)]
}

function middleEv(demand: Demand): number {
  const [from, to] = rangeEv(demand)
  return (from + to) / 2
}

function held({ left, width }: Box, x: number): number {
  return Math.min(Math.max(x, left), left + width)
}

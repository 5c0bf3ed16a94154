import { line } from 'd3-shape'
import type { Job } from '../job/index.js'
import type { PeakFigures } from '../target/index.js'
import { type DemandFrame, demandRegion, goalMarks, rangeEv, spanInside } from './demandMarks.js'
import { energyAxis, heightUnit } from './focusAxes.js'
import { focusRange, isLine } from './focusRange.js'
import { type Box, frame, roundAxis } from './frame.js'
import { hatch } from './hatch.js'
import { label, textWidth, wrapped } from './label.js'
import { short } from './layerText.js'
import { palette } from './palette.js'
import type { PictureBody } from './picture.js'
import { type Curve, rollUp } from './rollUp.js'
import { type SpectralUnit, spectralUnit } from './spectralUnit.js'
import { element } from './svg.js'
import type { Candidate, SpectrumReport } from './types.js'

/** T on a linear scale where it matters: around the peak, or over the pass ranges of the job. */
export function focusPanel(job: Job, candidate: Candidate, box: Box, key: string): PictureBody {
  const { peak } = candidate.evaluation
  const range = focusRange(job, peak)
  const told = spectralUnit(job.kind)
  if (range === null)
    return sentence(peak === null ? 'No maximum of T: there is no peak to show.' : tooNarrow(peak, told), box)
  const [from, to] = range
  const curves = candidate.spectra.map((spectrum, i) => piece(spectrum, range, i === 0 ? peak : null, box.width))
  const highest = Math.max(0, ...curves.flatMap(({ y }) => Array.from(y)))
  const wanted = Math.max(0, ...wantedHeights(job, range))
  // Where hardly anything passes, an axis up to what was wanted would show a flat line.
  const tooLow = highest < 0.05 * wanted
  const greatest = tooLow ? highest : Math.max(highest, wanted)
  if (curves[0].x.length < 5 || !(greatest > 1e-300)) {
    const what = peak === null ? 'The pass range' : `The peak at ${told.text(peak.energyEv)}`
    return sentence(`${what} lies outside of the scan, or is too low to draw.`, box)
  }
  const unit = heightUnit(greatest)
  const { axis, at } = energyAxis(from, to, peak, job.kind)
  const plot = frame(box, axis, roundAxis(unit.name, 0, unit.top, 6), key)
  const across = (ev: number) => plot.x(at(ev))
  const marks: DemandFrame = { plot, key, across, height: (T) => plot.y(T * unit.inverse) }
  const passes = job.demands.some(({ kind }) => kind === 'pass')
  const marked = peak !== null && (!passes || job.demands.some(isLine)) ? peak : null
  return {
    height: box.height + 44,
    defs: [plot.defs, hatch(key)],
    parts: [
      plot.under,
      plot.inside(
        ...job.demands.map((demand) => demandRegion(marks, demand)),
        ...heightLines(job, marks),
        ...curves.map((curve, i) => path(curve, across, marks.height, i)),
        ...job.demands.map((demand) => (demand.kind === 'curve' ? goalMarks(marks, demand) : '')),
        ...(marked === null ? [] : peakMarks(marked, marks, told)),
      ),
      plot.over,
      ...(tooLow ? [label(box.left + 6, box.top + 15, `wanted: ${short(wanted)}`, { size: 11, halo: true })] : []),
    ],
  }
}

/** The points of a spectrum in a range; the peak itself among them, should the samples have missed its top. */
function piece(
  { energyEv, T }: SpectrumReport,
  [from, to]: [number, number],
  peak: PeakFigures | null,
  columns: number,
): Curve {
  const kept = rollUp({ x: energyEv, y: T }, from, to, columns)
  const points = kept.map((i) => [energyEv[i], T[i]] as const).filter(([ev]) => ev >= from && ev <= to)
  if (peak !== null && points.length > 0 && peak.energyEv >= from && peak.energyEv <= to) {
    const after = points.findIndex(([ev]) => ev > peak.energyEv)
    points.splice(after < 0 ? points.length : after, 0, [peak.energyEv, peak.T])
  }
  return { x: points.map(([ev]) => ev), y: points.map(([, t]) => t) }
}

function path(
  { x, y }: Curve,
  across: (ev: number) => number,
  height: (T: number) => number,
  condition: number,
): string {
  const { stroke, dash } = palette.curves[condition % palette.curves.length]
  const numbers = Array.from(x, (_, i) => i)
  const d = line<number>(
    (i) => across(x[i]),
    (i) => height(y[i]),
  ).digits(2)(numbers)
  return element('path', {
    d: d ?? '',
    ...{ fill: 'none', stroke, 'stroke-width': 1.8, 'stroke-linejoin': 'round', 'stroke-dasharray': dash },
  })
}

/** Heights that demands ask for in a range, so that the axis reaches them. */
function wantedHeights(job: Job, [from, to]: [number, number]): number[] {
  return job.demands.flatMap((demand) => {
    if (demand.quantity !== 'T') return []
    if (demand.kind === 'pass') return [demand.above]
    const [low, high] = rangeEv(demand)
    const near = demand.kind === 'peak' && high >= from && low <= to
    if (demand.kind === 'band') return demand.top === null ? [] : [demand.top]
    return near && demand.height !== null ? [demand.height] : []
  })
}

/** The least height of a peak, across its window. */
function heightLines(job: Job, frame: DemandFrame): string[] {
  return job.demands.flatMap((demand) => {
    if (demand.kind !== 'peak' || demand.height === null || demand.quantity !== 'T') return []
    const y = frame.height(demand.height)
    const across = spanInside(frame, rangeEv(demand))
    if (across === null) return []
    return [
      element('line', {
        x1: across.left,
        y1: y,
        x2: across.right,
        y2: y,
        stroke: palette.wanted,
        'stroke-width': 1.8,
        'stroke-dasharray': '6 4',
      }),
    ]
  })
}

/** A dot on the peak, and its full width at half of its own height. */
function peakMarks(peak: PeakFigures, marks: DemandFrame, told: SpectralUnit): string[] {
  const { energyEv, T, lowEv, highEv } = peak
  const { across } = marks
  const { left, width } = marks.plot.box
  const y = marks.height(T / 2)
  const ends = [across(lowEv), across(highEv)]
  const [x1, x2] = [Math.min(...ends), Math.max(...ends)]
  const text = told.widthText(peak)
  const room = textWidth(text, 11) + 10
  const end = (x: number) => element('line', { x1: x, y1: y - 5, x2: x, y2: y + 5 })
  const bar = element(
    'g',
    { stroke: palette.ink, 'stroke-width': 1.2 },
    element('line', { x1, y1: y, x2, y2: y }),
    end(x1),
    end(x2),
  )
  const beside = x2 + room <= left + width
  const name =
    beside || x1 - room >= left
      ? [label(beside ? x2 + 7 : x1 - 7, y + 4, text, { size: 11, anchor: beside ? 'start' : 'end', halo: true })]
      : []
  return [bar, element('circle', { cx: across(energyEv), cy: marks.height(T), r: 3, fill: palette.ink }), ...name]
}

function tooNarrow(peak: PeakFigures, told: SpectralUnit): string {
  return `The peak at ${told.text(peak.energyEv)} is ${told.widthText(peak)} wide: too narrow to draw.`
}

function sentence(text: string, { left, top, width }: Box): PictureBody {
  const lines = wrapped(text, width, 12)
  return {
    height: lines.length * 17 + 20,
    defs: [],
    parts: lines.map((each, i) => label(left, top + 20 + i * 17, each, { fill: palette.quiet })),
  }
}

import { line } from 'd3-shape'
import type { Job } from '../job/index.js'
import { log10, type Pole } from '../wave/index.js'
import { conditionLegend } from './conditionLegend.js'
import { type DemandFrame, demandLabels, demandRegion, goalMarks } from './demandMarks.js'
import { type Box, type Frame, frame, roundAxis } from './frame.js'
import { hatch } from './hatch.js'
import { label, wrapped } from './label.js'
import { palette } from './palette.js'
import type { PictureBody } from './picture.js'
import { rollUp } from './rollUp.js'
import { type SpectralUnit, spectralUnit } from './spectralUnit.js'
import { element } from './svg.js'
import type { Candidate, SpectrumReport } from './types.js'

/** T of every condition over the whole scan, on an axis of decades, with the demands as regions and every resonance marked. */
export function scanPanel(job: Job, candidate: Candidate, box: Box, key: string): PictureBody {
  const least = leastLog10T(candidate)
  const floor = floorOf(job, least)
  const every = [1, 2, 5, 10, 20, 50].find((step) => -floor / step <= 9) ?? 100
  const powers = Array.from({ length: Math.floor(-floor / every) + 1 }, (_, i) => ({ value: -i * every, text: '' }))
  const unit = spectralUnit(job.kind)
  const [first, last] = unit.rising ? job.scanEv : [job.scanEv[1], job.scanEv[0]]
  const plot = frame(
    box,
    roundAxis(unit.axisName, unit.place(first), unit.place(last), 10),
    { name: 'transmission T', from: floor, to: -0.04 * floor, ticks: powers, powers: true },
    key,
  )
  // A limit of 0 has no decade: it lies below every picture.
  const across = (ev: number) => plot.x(unit.place(ev))
  const marks: DemandFrame = { plot, key, across, height: (T) => plot.y(T > 0 ? log10(T) : floor - 1) }
  const captions = captionsOf(job, candidate, least, floor).flatMap((text) => wrapped(text, box.width, 11))
  const foot = box.top + box.height + 54
  const legend = conditionLegend(candidate.spectra, box, foot + captions.length * 15)
  return {
    height: box.height + 44 + captions.length * 15 + legend.height,
    defs: [plot.defs, hatch(key)],
    parts: [
      plot.under,
      plot.inside(
        ...job.demands.map((demand) => demandRegion(marks, demand)),
        ...candidate.resonances.map((pole) => stroke(marks, pole)),
        ...candidate.spectra.map((spectrum, i) => curve(plot, spectrum, i, unit)),
        ...job.demands.map((demand) => (demand.kind === 'curve' ? goalMarks(marks, demand) : '')),
      ),
      ...(least === null ? [nothingPasses(job, box)] : []),
      plot.over,
      ...demandLabels(marks, job.demands),
      ...legend.parts,
      ...captions.map((text, i) => label(box.left, foot + i * 15, text, { size: 11, fill: palette.quiet })),
    ],
  }
}

/** Null when T is zero everywhere. */
function leastLog10T({ spectra }: Candidate): number | null {
  let least = Number.POSITIVE_INFINITY
  for (const { log10T } of spectra)
    for (const value of log10T) if (Number.isFinite(value)) least = Math.min(least, value)
  return Number.isFinite(least) ? least : null
}

/** Where the axis ends below, in whole decades: deep enough for the limits, and not so deep that nothing can be read. */
function floorOf({ demands }: Job, least: number | null): number {
  const limits = demands.flatMap((demand) => {
    if (demand.quantity !== 'T') return []
    if (demand.kind === 'block') return [demand.below]
    if (demand.kind === 'pass') return [demand.above]
    return demand.kind === 'curve' ? demand.rows.filter(({ T }) => T > 0).map(({ T }) => Math.max(T, 1e-30)) : []
  })
  const lowest = Math.min(0, ...limits.filter((T) => T > 0).map((T) => log10(T)))
  return Math.floor(Math.max(Math.min(least ?? 0, lowest - 1, -2), Math.min(-12, lowest - 3)))
}

/** A resonance: a stroke at the foot, or its whole height where its line would be thinner than a pixel. */
function stroke({ plot, across, height }: DemandFrame, { energyEv, widthEv, peakT }: Pole): string {
  const x = across(energyEv)
  const foot = plot.box.top + plot.box.height
  const needle = Math.abs(across(energyEv + widthEv) - x) < 1
  const top = needle ? Math.min(height(peakT), foot - 8) : foot - 8
  return element('line', { x1: x, y1: top, x2: x, y2: foot, stroke: palette.ink, 'stroke-width': needle ? 0.9 : 1.8 })
}

function curve(plot: Frame, spectrum: SpectrumReport, condition: number, unit: SpectralUnit): string {
  const { left, width } = plot.box
  // From left to right, whichever way energies run.
  const ordered = (values: Float64Array) => (unit.rising ? values : values.slice().reverse())
  const x = ordered(spectrum.energyEv.map((ev) => plot.x(unit.place(ev))))
  const y = ordered(spectrum.log10T)
  const path = line<number>(
    (i) => x[i],
    (i) => plot.y(y[i]),
  )
    .defined((i) => Number.isFinite(y[i]))
    .digits(2)
  const { stroke, dash } = palette.curves[condition % palette.curves.length]
  return element('path', {
    d: path(rollUp({ x, y }, left, left + width, width)) ?? '',
    ...{ fill: 'none', stroke, 'stroke-width': 1.7, 'stroke-linejoin': 'round', 'stroke-dasharray': dash },
  })
}

function nothingPasses(job: Job, box: Box): string {
  const why = job.stack.exit === 'hard wall' ? ': the exit is a hard wall, all is reflected' : ''
  return label(box.left + box.width / 2, box.top + box.height / 2, `T = 0 at every energy of the scan${why}.`, {
    ...{ size: 14, anchor: 'middle', halo: true },
  })
}

function captionsOf(
  { demands }: Job,
  { spectra, resonances }: Candidate,
  least: number | null,
  floor: number,
): string[] {
  const captions: string[] = []
  if (least !== null && least < floor) {
    captions.push(`T goes down to 1e${Math.floor(least)}; the picture ends at 1e${floor}.`)
  }
  if (least !== null && spectra.some(({ T, log10T }) => T.some((_, i) => !Number.isFinite(log10T[i])))) {
    captions.push('T = 0 where the line is missing: the wave is forbidden in the exit.')
  }
  const kinds = demands.filter(({ quantity }) => quantity === 'T').map(({ kind }) => kind)
  const key = [
    resonances.length > 0 ? 'Strokes at the foot: resonances' : 'No resonance in the scan',
    ...(kinds.includes('peak') ? ['green: window of a peak'] : []),
    ...(kinds.includes('block') || kinds.includes('pass') ? ['hatched: where T must not be'] : []),
    ...(kinds.includes('curve') ? ['marks: the goal'] : []),
    ...(kinds.length < demands.length ? ['demands on R or A stand in the table'] : []),
  ]
  captions.push(`${key.join('; ')}.`)
  return captions
}

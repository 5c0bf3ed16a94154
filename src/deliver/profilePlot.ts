import { area, line } from 'd3-shape'
import type { Job } from '../job/index.js'
import { type Frame, frame, roundAxis } from './frame.js'
import { forbidden, hatch } from './hatch.js'
import { fitted, label, textWidth } from './label.js'
import { layerLabels } from './layerLabels.js'
import { leadText, mediumText, short, widthText } from './layerText.js'
import { palette } from './palette.js'
import { type PictureBody, picture, pictureWidth } from './picture.js'
import { spectralUnit } from './spectralUnit.js'
import { element, fixed } from './svg.js'
import type { Candidate, ProfileReport } from './types.js'

const left = 80
const width = pictureWidth - 100
const height = 270

/** profile.svg: the band edge (for light the index) through the stack, its layers by name, and the wave at the peak, standing on its energy. */
export function profilePlot(job: Job, candidate: Candidate): string {
  const what = job.kind === 'electron' ? 'band edge and wave' : 'index and wave'
  return picture(job, candidate, what, description(job, candidate), (top, key) => body(job, candidate, top, key))
}

function body(job: Job, candidate: Candidate, top: number, key: string): PictureBody {
  const { profile, layers, totalNm } = candidate
  const { zNm } = profile
  // A stack that ends in a wall has no lead to show there: room for the hatching.
  const [from, to] = [zNm[0], Math.max(zNm[zNm.length - 1], job.stack.exit === 'hard wall' ? 1.06 * totalNm : 0)]
  const labels = layerLabels(layers, width / (to - from), width)
  const box = { left, top: top + 8 + labels.height, width, height }
  const electrons = job.kind === 'electron'
  const wave = waveOf(job, candidate)
  const energies = electrons ? energyRange(profile, wave) : indexRange(profile)
  const plot = frame(
    box,
    roundAxis('z from the entry to the exit (nm)', from, to, 10),
    roundAxis(electrons ? 'energy (meV)' : 'refractive index', energies[0], energies[1], 7),
    key,
  )
  const foot = directionLines(job, box.top + height + 58)
  return {
    height: labels.height + height + 8 + 58 + 38,
    defs: [plot.defs, hatch(key)],
    parts: [
      plot.under,
      plot.inside(
        ...edge(plot, profile, electrons ? 1000 : 1),
        ...(job.stack.exit === 'hard wall' ? [wall(plot, totalNm, key)] : []),
        ...(wave === null ? [] : waveParts(plot, profile, wave)),
      ),
      plot.over,
      ...labels.draw(box, plot.x),
      ...(wave === null ? [label(left + 8, box.top + 18, 'No peak: no wave is drawn.', { size: 11, halo: true })] : []),
      ...foot,
    ],
  }
}

/** The wave at the peak: where on the axis it stands, what it is called and the pixels-free scale of its density. */
interface Wave {
  readonly level: number
  readonly name: string
  readonly density: Float64Array
  readonly greatest: number
}

function waveOf({ kind }: Job, { evaluation, profile }: Candidate): Wave | null {
  const density = profile.densityPerNm
  if (evaluation.peak === null || density === null) return null
  const greatest = density.reduce((a, b) => Math.max(a, b), 0)
  if (!(greatest > 0 && Number.isFinite(greatest))) return null
  const name = spectralUnit(kind).text(evaluation.peak.energyEv)
  // The index has its foot at 0, and the wave of light stands there.
  return { level: kind === 'electron' ? evaluation.peak.energyEv * 1000 : 0, name, density, greatest }
}

/** Share of the axis that the wave takes. */
const waveShare = 0.38

/** From 0, where the wave stands. */
function indexRange({ edge }: ProfileReport): [number, number] {
  return [0, 1.15 * edge.reduce((a, b) => Math.max(a, b), 1)]
}

function energyRange({ edge }: ProfileReport, wave: Wave | null): [number, number] {
  const edges = Array.from(edge, (ev) => ev * 1000).filter(Number.isFinite)
  const level = wave === null ? [] : [wave.level]
  const low = Math.min(...edges, ...level)
  const span = Math.max(Math.max(...edges, ...level) - low, 1)
  const from = low - 0.08 * span
  const to = low + 1.1 * span
  // from + (to - from) * share above the level has to be inside as well.
  const needed = wave === null ? to : (wave.level - waveShare * from) / (1 - waveShare)
  return [from, Math.max(to, needed + 0.03 * span)]
}

function edge(plot: Frame, { zNm, edge: edges }: ProfileReport, perUnit: number): string[] {
  // The corners say all of a staircase.
  const corner = (i: number) => edges[i] !== edges[i - 1] || edges[i] !== edges[i + 1]
  const numbers = Array.from(zNm, (_, i) => i).filter(corner)
  const x = (i: number) => plot.x(zNm[i])
  const y = (i: number) => plot.y(edges[i] * perUnit)
  const given = (i: number) => Number.isFinite(edges[i])
  const solid = area<number>(x, plot.box.top + plot.box.height + 2, y)
    .defined(given)
    .digits(2)(numbers)
  const stairs = line<number>(x, y).defined(given).digits(2)(numbers)
  return [
    element('path', { d: solid ?? '', fill: palette.solid }),
    element('path', { d: stairs ?? '', fill: 'none', stroke: palette.edge, 'stroke-width': 1.8 }),
  ]
}

function wall(plot: Frame, atNm: number, key: string): string {
  const { box } = plot
  const edges = {
    left: plot.x(atNm),
    right: box.left + box.width + 2,
    top: box.top - 2,
    bottom: box.top + box.height + 2,
  }
  return [
    forbidden(edges, 'bottom', key),
    element('line', {
      x1: edges.left,
      x2: edges.left,
      y1: edges.top,
      y2: edges.bottom,
      stroke: palette.edge,
      'stroke-width': 3,
    }),
  ].join('')
}

function waveParts(plot: Frame, { zNm }: ProfileReport, { level: at, name, density, greatest }: Wave): string[] {
  const { box } = plot
  const level = plot.y(at)
  const numbers = Array.from(zNm, (_, i) => i)
  const x = (i: number) => plot.x(zNm[i])
  const y = (i: number) => level - (density[i] / greatest) * waveShare * box.height
  const text = `${name}: abs(u)\u00b2 at the peak, on a scale of its own`
  return [
    element('path', {
      d: area<number>(x, level, y).digits(2)(numbers) ?? '',
      fill: palette.wave,
      'fill-opacity': '0.16',
    }),
    element('path', {
      d: line<number>(x, y).digits(2)(numbers) ?? '',
      fill: 'none',
      stroke: palette.wave,
      'stroke-width': 1.8,
    }),
    element('line', {
      ...{
        x1: box.left,
        x2: box.left + box.width,
        y1: level,
        y2: level,
        stroke: palette.wave,
        'stroke-dasharray': '5 3',
      },
    }),
    label(box.left + 8, at === 0 ? box.top + 18 : level + 15, text, {
      size: 11,
      fill: palette.wave,
      halo: true,
    }),
  ]
}

/** Which side is which, in words, and the direction of growth as an arrow: mixing them up is the commonest expensive mistake. */
function directionLines({ stack, growth }: Job, y: number): string[] {
  const right = left + width
  const middle = left + width / 2
  const leaves = stack.exit === 'hard wall' ? 'nothing leaves' : 'the wave leaves here'
  const side = (text: string) => fitted(text, width / 2 - 8, 11.5)
  const toLeft = growth.startsAt === 'exit'
  const [first, last] = toLeft ? ['top', 'substrate'] : ['substrate', 'top']
  const words = 'direction of growth'
  const at = y + 18
  const room = textWidth(words, 11.5) / 2 + 8
  const [from, to] = [left + textWidth(first, 11.5) + 12, right - textWidth(last, 11.5) - 12]
  const [tip, back] = toLeft ? [from, from + 9] : [to, to - 9]
  const rule = (x1: number, x2: number) => element('line', { x1, y1: at, x2, y2: at, stroke: palette.ink })
  return [
    label(left, y, side(`entry: ${leadText(stack.entry)}, the wave comes in here`), { size: 11.5, bold: true }),
    label(right, y, side(`exit: ${leadText(stack.exit)}, ${leaves}`), { size: 11.5, bold: true, anchor: 'end' }),
    label(left, at + 4, first, { size: 11.5, bold: true }),
    label(right, at + 4, last, { size: 11.5, bold: true, anchor: 'end' }),
    label(middle, at + 4, words, { size: 11.5, anchor: 'middle' }),
    rule(from, middle - room),
    rule(middle + room, to),
    element('polygon', {
      points: `${fixed(tip)} ${at} ${fixed(back)} ${at - 4} ${fixed(back)} ${at + 4}`,
      fill: palette.ink,
    }),
  ]
}

function description(job: Job, { layers, evaluation }: Candidate): string {
  const inOrder = layers.map((layer) => `${layer.id} ${mediumText(layer.choice)} ${widthText(layer)}`).join('; ')
  const { peak } = evaluation
  return [
    `From the entry (${leadText(job.stack.entry)}) to the exit (${leadText(job.stack.exit)}): ${inOrder}.`,
    `The substrate is on the side of the ${job.growth.startsAt}; growth runs from there.`,
    peak === null
      ? 'There is no peak, so no wave is drawn.'
      : job.kind === 'electron'
        ? `The wave at the peak stands on ${short(peak.energyEv * 1000)} meV.`
        : `The wave is that at ${spectralUnit('light').text(peak.energyEv)}.`,
  ].join(' ')
}

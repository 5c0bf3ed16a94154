import { scaleLinear } from 'd3-scale'
import { type LabelStyle, label, powerLabel } from './label.js'
import { palette } from './palette.js'
import { element } from './svg.js'
import { roundTicks, type Tick } from './ticks.js'

/** Where a plot's drawing area lies in its picture, in pixels. */
export interface Box {
  readonly left: number
  readonly top: number
  readonly width: number
  readonly height: number
}

export interface Axis {
  readonly from: number
  readonly to: number
  readonly name: string
  readonly ticks: readonly Tick[]
  /** The values are powers of ten: labels 10^-3. */
  readonly powers?: boolean
}

/** Axes around a box: draw `under`, then what belongs inside through `inside`, then `over`. */
export interface Frame {
  readonly box: Box
  readonly x: (value: number) => number
  readonly y: (value: number) => number
  readonly defs: string
  readonly under: string
  readonly over: string
  /** Cuts what is drawn at the edge of the box. */
  inside(...parts: readonly string[]): string
}

/** @param key makes the id of the clip path unique in a page */
export function frame(box: Box, xAxis: Axis, yAxis: Axis, key: string): Frame {
  const right = box.left + box.width
  const bottom = box.top + box.height
  const x = scaleLinear([xAxis.from, xAxis.to], [box.left, right])
  const y = scaleLinear([yAxis.from, yAxis.to], [bottom, box.top])
  const clip = `${key}-clip`
  const rect = { x: box.left, y: box.top, width: box.width, height: box.height }
  const rule = (x1: number, y1: number, x2: number, y2: number) => element('line', { x1, y1, x2, y2 })
  return {
    box,
    x,
    y,
    defs: element('clipPath', { id: clip }, element('rect', rect)),
    under: element(
      'g',
      { stroke: palette.grid },
      ...xAxis.ticks.map(({ value }) => rule(x(value), box.top, x(value), bottom)),
      ...yAxis.ticks.map(({ value }) => rule(box.left, y(value), right, y(value))),
    ),
    over: element(
      'g',
      {},
      element('rect', { ...rect, fill: 'none', stroke: palette.border }),
      ...xAxis.ticks.map((tick) => tickLabel(x(tick.value), bottom + 17, tick, xAxis, { anchor: 'middle' })),
      ...yAxis.ticks.map((tick) => tickLabel(box.left - 7, y(tick.value) + 4, tick, yAxis, { anchor: 'end' })),
      label(box.left + box.width / 2, bottom + 36, xAxis.name, { anchor: 'middle', fill: palette.quiet }),
      label(box.left - 58, box.top + box.height / 2, yAxis.name, {
        anchor: 'middle',
        fill: palette.quiet,
        upright: true,
      }),
    ),
    inside: (...parts) => element('g', { 'clip-path': `url(#${clip})` }, ...parts),
  }
}

/** An axis with round ticks. */
export function roundAxis(name: string, from: number, to: number, wanted: number): Axis {
  return { name, from, to, ticks: roundTicks(from, to, wanted) }
}

function tickLabel(x: number, y: number, { value, text }: Tick, { powers }: Axis, style: LabelStyle): string {
  return powers ? powerLabel(x, y, value, style) : label(x, y, text, style)
}

import { palette } from './palette.js'
import { element } from './svg.js'

/** The pattern of regions that T must not enter; once in the defs of each plot. */
export function hatch(key: string): string {
  return element(
    'pattern',
    { id: hatchId(key), width: 7, height: 7, patternUnits: 'userSpaceOnUse', patternTransform: 'rotate(45)' },
    element('line', {
      x1: 0,
      y1: 0,
      x2: 0,
      y2: 7,
      stroke: palette.forbidden,
      'stroke-width': 1.6,
      'stroke-opacity': '0.45',
    }),
  )
}

export interface Edges {
  readonly left: number
  readonly right: number
  readonly top: number
  readonly bottom: number
}

/** A no-go region with a firm line along the side that is the limit. */
export function forbidden({ left, right, top, bottom }: Edges, limit: 'top' | 'bottom', key: string): string {
  const y = limit === 'top' ? top : bottom
  const rect = { x: left, y: top, width: Math.max(right - left, 1), height: Math.max(bottom - top, 0) }
  return [
    element('rect', { ...rect, fill: palette.forbidden, 'fill-opacity': '0.06' }),
    element('rect', { ...rect, fill: `url(#${hatchId(key)})` }),
    element('line', { x1: left, y1: y, x2: right, y2: y, stroke: palette.forbidden, 'stroke-width': 2 }),
  ].join('')
}

function hatchId(key: string): string {
  return `${key}-hatch`
}

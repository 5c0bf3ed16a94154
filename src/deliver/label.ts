import { palette } from './palette.js'
import { type Attributes, element, escapeXml, fixed } from './svg.js'

export interface LabelStyle {
  readonly size?: number
  readonly anchor?: 'start' | 'middle' | 'end'
  readonly fill?: string
  readonly bold?: boolean
  /** A white rim, so that a label on a line stays readable. */
  readonly halo?: boolean
  /** Turned to read upwards. */
  readonly upright?: boolean
}

/** A line of text with its baseline at (x, y). */
export function label(x: number, y: number, text: string, style: LabelStyle = {}): string {
  return element('text', { ...position(x, y, style), ...look(style) }, escapeXml(text))
}

/** 10 to a power, the exponent raised by the drawing and not by a font that may lack it. */
export function powerLabel(x: number, y: number, exponent: number, style: LabelStyle = {}): string {
  const size = style.size ?? defaultSize
  const raised = element('tspan', { dy: -0.4 * size, 'font-size': 0.75 * size }, escapeXml(signed(exponent)))
  return element('text', { ...position(x, y, style), ...look(style) }, exponent === 0 ? '1' : `10${raised}`)
}

/** With a true minus sign. */
export function signed(value: number): string {
  return value < 0 ? `\u2212${-value}` : String(value)
}

/**
 * How wide a line of text is at most, in pixels: a table of the widest common sans-serif font, so that what is laid out by it fits in
 * every font that a viewer may put in its place.
 */
export function textWidth(text: string, size: number): number {
  let em = 0
  for (const letter of text) {
    if (/[il.,:;'|!()[\] /-]/.test(letter)) em += 0.4
    else if (/[mwMW@%\u2265\u2264\u2026\u2192\u2190]/.test(letter)) em += 1
    else if (/[A-Z\u2212+=<>]/.test(letter)) em += 0.8
    else em += letter > '\u2fff' ? 1.1 : 0.65
  }
  return em * size
}

/** The text, or as much of its start as fits, with an ellipsis. */
export function fitted(text: string, width: number, size: number): string {
  if (textWidth(text, size) <= width) return text
  const letters = [...text]
  while (letters.length > 0 && textWidth(`${letters.join('')}\u2026`, size) > width) letters.pop()
  return `${letters.join('').trimEnd()}\u2026`
}

/** The text in lines of at most `width`, broken between words; past `lines` it ends in an ellipsis. */
export function wrapped(text: string, width: number, size: number, lines = Number.POSITIVE_INFINITY): string[] {
  const out: string[] = []
  let rest = text.split(/\s+/).filter((word) => word !== '')
  while (rest.length > 0) {
    if (out.length === lines - 1) return [...out, fitted(rest.join(' '), width, size)]
    let count = 1
    while (count < rest.length && textWidth(rest.slice(0, count + 1).join(' '), size) <= width) count++
    out.push(fitted(rest.slice(0, count).join(' '), width, size))
    rest = rest.slice(count)
  }
  return out
}

const defaultSize = 12

function position(x: number, y: number, { upright }: LabelStyle): Attributes {
  return upright ? { transform: `translate(${fixed(x)} ${fixed(y)}) rotate(-90)` } : { x, y }
}

function look({ size = defaultSize, anchor, fill = palette.ink, bold, halo }: LabelStyle): Attributes {
  return {
    'font-size': size,
    'text-anchor': anchor,
    fill,
    'font-weight': bold ? 'bold' : undefined,
    ...(halo ? { stroke: '#ffffff', 'stroke-width': 3, 'stroke-linejoin': 'round', 'paint-order': 'stroke' } : {}),
  }
}

/** The few words of SVG that the pictures are made of. Same input, same bytes: every number passes `fixed`. */

export type Attributes = Readonly<Record<string, string | number | undefined>>

/** An element; numbers are written with at most two digits after the point, undefined attributes are left out. */
export function element(name: string, attributes: Attributes, ...children: readonly string[]): string {
  const written = Object.entries(attributes)
    .filter(([, value]) => value !== undefined)
    .map(([key, value]) => ` ${key}="${typeof value === 'number' ? fixed(value) : escapeXml(String(value))}"`)
    .join('')
  return children.length === 0 ? `<${name}${written}/>` : `<${name}${written}>${children.join('')}</${name}>`
}

/** Two digits after the point at most, and no negative zero. */
export function fixed(value: number): string {
  const rounded = Math.round(value * 100) / 100
  return String(rounded === 0 ? 0 : rounded)
}

/** Text for between tags or quotes. What XML 1.0 can't hold at all becomes the replacement character. */
export function escapeXml(text: string): string {
  return text
    .replace(/[^\t\n\r -\ud7ff\ue000-\ufffd\u{10000}-\u{10ffff}]/gu, '\ufffd')
    .replace(/&/g, '&amp;')
    .replace(/</g, '&lt;')
    .replace(/>/g, '&gt;')
    .replace(/"/g, '&quot;')
}

/** A whole picture: `title` and `description` are what a screen reader says. `key` makes its ids unique in a page. */
export function svgDocument(
  { width, height, title, description, key }: DocumentSpec,
  defs: readonly string[],
  body: readonly string[],
): string {
  const ids = { title: `${key}-title`, desc: `${key}-desc` }
  return `${element(
    'svg',
    {
      xmlns: 'http://www.w3.org/2000/svg',
      viewBox: `0 0 ${fixed(width)} ${fixed(height)}`,
      width,
      height,
      role: 'img',
      'aria-labelledby': `${ids.title} ${ids.desc}`,
      'font-family': "'DejaVu Sans', Verdana, Arial, sans-serif",
    },
    element('title', { id: ids.title }, escapeXml(title)),
    element('desc', { id: ids.desc }, escapeXml(description)),
    element('defs', {}, ...defs),
    element('rect', { width, height, fill: '#ffffff' }),
    ...body.map((part) => `\n${part}`),
    '\n',
  )}\n`
}

export interface DocumentSpec {
  readonly width: number
  readonly height: number
  readonly title: string
  readonly description: string
  readonly key: string
}

import { textWidth } from '../../src/deliver/label.js'

/** A picture taken apart by a reader that takes nothing but well-formed XML. */
export interface Svg {
  readonly width: number
  readonly height: number
  readonly ids: readonly string[]
  readonly texts: readonly Text[]
  /** Text of `<title>` and `<desc>`. */
  readonly title: string
  readonly description: string
}

export interface Text {
  readonly text: string
  /** The space that it takes at most: left, top, right, bottom. */
  readonly box: readonly [number, number, number, number]
}

interface Node {
  readonly name: string
  readonly attributes: ReadonlyMap<string, string>
  readonly children: Node[]
  text: string
}

/** @throws Error for a tag that is not closed, an attribute given twice, a bare `&` or `<`, more than one root */
export function readSvg(source: string): Svg {
  const root = parseXml(source)
  const all = flatten(root)
  const texts = all.filter(({ name }) => name === 'text').map(textOf)
  const say = (name: string) => all.find((node) => node.name === name)?.text ?? ''
  const ids = all.flatMap(({ attributes }) => attributes.get('id') ?? [])
  for (const [, id] of source.matchAll(/url\(#([^)]+)\)/g)) if (!ids.includes(id)) throw new Error(`No id ${id}`)
  return {
    ...{ width: Number(root.attributes.get('width')), height: Number(root.attributes.get('height')), ids, texts },
    ...{ title: say('title'), description: say('desc') },
  }
}

function parseXml(source: string): Node {
  const top: Node = { name: '', attributes: new Map(), children: [], text: '' }
  const open = [top]
  const token = /<(\/?)([a-zA-Z]+)((?:\s+[a-zA-Z0-9:-]+="[^"<]*")*)\s*(\/?)>|([^<]+)/gy
  while (token.lastIndex < source.length) {
    const at = token.lastIndex
    const match = token.exec(source)
    if (match === null) throw new Error(`No XML at ${at}: ${source.slice(at, at + 60)}`)
    const [, closing, name, attributes, empty, text] = match
    const here = open[open.length - 1]
    if (text !== undefined) for (const node of open) node.text += resolved(text)
    else if (closing) {
      if (here.name !== name) throw new Error(`</${name}> closes <${here.name}>`)
      open.pop()
    } else {
      const node: Node = { name, attributes: attributesOf(attributes), children: [], text: '' }
      here.children.push(node)
      if (!empty) open.push(node)
    }
  }
  if (open.length !== 1 || top.children.length !== 1) throw new Error('Not one root, or a tag left open')
  return top.children[0]
}

function attributesOf(text: string): Map<string, string> {
  const found = new Map<string, string>()
  for (const [, name, value] of text.matchAll(/([a-zA-Z0-9:-]+)="([^"]*)"/g)) {
    if (found.has(name)) throw new Error(`${name} is given twice`)
    found.set(name, resolved(value))
  }
  return found
}

function resolved(text: string): string {
  // biome-ignore lint/suspicious/noControlCharactersInRegex: they are what XML 1.0 can't hold
  if (/[\u0000-\u0008\u000b\u000c\u000e-\u001f\ufffe\uffff]/.test(text)) throw new Error('A character that XML lacks')
  return text.replace(/&([^;]*;?)/g, (_, name) => {
    const letter = ({ 'amp;': '&', 'lt;': '<', 'gt;': '>', 'quot;': '"' } as Record<string, string>)[name]
    if (letter === undefined) throw new Error(`&${name} is no entity`)
    return letter
  })
}

function flatten(node: Node): Node[] {
  return [node, ...node.children.flatMap(flatten)]
}

function textOf({ attributes, text }: Node): Text {
  const size = Number(attributes.get('font-size'))
  const width = textWidth(text, size)
  const before = { middle: width / 2, end: width }[attributes.get('text-anchor') ?? ''] ?? 0
  const turned = attributes.get('transform')?.match(/^translate\((\S+) (\S+)\) rotate\(-90\)$/)
  if (turned) {
    const [x, y] = [Number(turned[1]), Number(turned[2])]
    return { text, box: [x - 0.8 * size, y + before - width, x + 0.2 * size, y + before] }
  }
  const [x, y] = [Number(attributes.get('x')), Number(attributes.get('y'))]
  return { text, box: [x - before, y - 0.8 * size, x - before + width, y + 0.2 * size] }
}

/** Pairs of texts that lie on one another. */
export function collisions({ texts }: Svg): string[] {
  const found: string[] = []
  for (const [i, a] of texts.entries()) {
    for (const b of texts.slice(i + 1)) {
      const [ax, ay, aright, abottom] = a.box
      const [bx, by, bright, bbottom] = b.box
      if (ax < bright && bx < aright && ay < bbottom && by < abottom) found.push(`${a.text} | ${b.text}`)
    }
  }
  return found
}

/** Texts that leave the picture. */
export function strays({ texts, width, height }: Svg): string[] {
  return texts
    .filter(({ box: [left, top, right, bottom] }) => left < 0 || top < 0 || right > width || bottom > height)
    .map(({ text, box }) => `${text} ${box.join(' ')}`)
}

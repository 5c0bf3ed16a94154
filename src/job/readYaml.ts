import { isAlias, isMap, isScalar, isSeq, type Node, parseDocument } from 'yaml'
import { guardYaml, most } from './guardYaml.js'
import type { Problems } from './Problems.js'
import { type Span, shortened } from './problemAt.js'
import type { Path, YamlSource } from './YamlSource.js'

/**
 * The plain value of a YAML 1.2 text: maps become objects without prototype, every number is finite. What is not in order
 * is left out and stands in `problems`. Returns undefined where there is nothing to go on with.
 */
export function readYaml(source: YamlSource, problems: Problems): unknown {
  const { text } = source
  const control = /[^\t\n\r\u0020-\u007e\u0085\u00a0-\ufffd\u{10000}-\u{10ffff}]/u.exec(text)
  if (control || text.includes('\ufffd')) {
    const start = control?.index ?? text.indexOf('\ufffd')
    problems.addAt(
      { start, end: start + 1 },
      'This is no text: it holds a control character.',
      'Is this the right file?',
    )
    return undefined
  }
  const refused = guardYaml(text)
  if (refused) {
    problems.addAt(refused.span, refused.rule, refused.remedy)
    return undefined
  }
  const document = parseDocument(text, { uniqueKeys: true, prettyErrors: false, version: '1.2', logLevel: 'silent' })
  let broken = false
  for (const error of document.errors) {
    // One slip of syntax sets off many messages; the first is the one that helps.
    if (error.code !== 'DUPLICATE_KEY' && broken) continue
    const span = { start: error.pos[0], end: error.pos[1] }
    if (error.code === 'DUPLICATE_KEY') {
      const key = shortened(/^[^:]*/.exec(text.slice(span.start))?.[0] ?? '')
      problems.addAt(span, `${key} stands twice in the same map.`, 'Keep one of the two.', key)
      continue
    }
    broken = true
    const [rule, remedy] = syntax[error.code] ?? [
      `This is not YAML: ${shortened(error.message, 120)}.`,
      'See the line above it too.',
    ]
    problems.addAt(span, rule, remedy)
  }
  if (broken) return undefined
  const { contents } = document
  if (contents === null || (isScalar(contents) && contents.value === null)) {
    problems.addAt({ start: 0, end: 0 }, 'The file is empty.', 'Start from the output of "tunnelwright new NAME".')
    return undefined
  }
  if (!isMap(contents)) {
    const span = spanOf(contents as Node)
    problems.addAt(span, 'A job is a map of keys.', 'Write "format: 1" and so on, with a space after each colon.')
    return undefined
  }
  let visited = 0
  return plain(contents as Node, [], undefined)

  function plain(node: Node | null, path: Path, key: Span | undefined): unknown {
    if (++visited > most.tokens || path.length > most.depth) {
      // Only aliases get here: the guard has counted what is written out.
      if (!broken)
        problems.addAt(key ?? { start: 0, end: 1 }, 'The aliases multiply without end.', 'Write it out, or use "like".')
      broken = true
      return undefined
    }
    if (node === null) return null
    const span = spanOf(node)
    source.record(path, span, key)
    if (isAlias(node)) {
      const target = node.resolve(document)
      if (!target)
        problems.addAt(span, `The alias ${shortened(source.written(path))} has no anchor.`, 'Write the value out.')
      const value = target ? plain(target, path, key) : undefined
      source.record(path, span, key)
      return value
    }
    if (node.tag && !node.tag.startsWith('tag:yaml.org,2002:')) return tagged(node.tag, span)
    if (node.tag && !coreTags.has(node.tag.slice('tag:yaml.org,2002:'.length))) return tagged(node.tag, span)
    if (isSeq(node)) return node.items.map((item, i) => plain(item as Node, [...path, i], undefined))
    if (isMap(node)) {
      const map: Record<string, unknown> = Object.create(null)
      for (const pair of node.items) {
        const keyNode = pair.key as Node
        const keySpan = keyNode ? spanOf(keyNode) : span
        if (!isScalar(keyNode) || keyNode.value === null || typeof keyNode.value === 'object') {
          problems.addAt(keySpan, 'A key has to be a name.', 'Write it as "key: value".')
          continue
        }
        const name = String(keyNode.value)
        if (name === '__proto__') {
          problems.addAt(keySpan, 'Unknown key "__proto__".', 'Leave it out.')
          continue
        }
        map[name] = plain(pair.value as Node, [...path, name], keySpan)
      }
      return map
    }
    if (!isScalar(node)) return undefined
    if (typeof node.value === 'bigint') return Number(node.value)
    if (typeof node.value === 'number' && !Number.isFinite(node.value)) {
      problems.addAt(
        span,
        `${shortened(source.written(path))} is not a finite number.`,
        'Write a number within 1e-300..1e300.',
      )
      return undefined
    }
    return node.value
  }

  function tagged(tag: string, span: Span): undefined {
    problems.addAt(span, `The tag ${shortened(tag)} is not part of the job format.`, 'Leave it out.')
    return undefined
  }
}

const coreTags = new Set(['str', 'int', 'float', 'bool', 'null', 'map', 'seq'])

const syntax: Record<string, readonly [string, string]> = {
  TAB_AS_INDENT: ['A tab stands in the indentation.', 'Indent with spaces.'],
  MULTIPLE_DOCS: ['The file holds more than one document.', 'One job a file: take "---" out, or make it two files.'],
  MISSING_CHAR: ['A quote, bracket or comma is missing here.', 'Close what was opened.'],
  BAD_INDENT: [
    'A bracket is not closed, or a line is not indented like its neighbours.',
    'Close it with } or ], or line it up.',
  ],
  BLOCK_AS_IMPLICIT_KEY: [
    'Two "key: value" pairs share a line.',
    'Put them on lines of their own, or in { } with commas.',
  ],
  IMPOSSIBLE: ['This is not YAML.', 'See the line above it too.'],
}

function spanOf(node: Node): Span {
  const range = node.range ?? [0, 1, 1]
  return { start: range[0], end: range[1] }
}

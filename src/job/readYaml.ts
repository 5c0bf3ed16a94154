import { isMap, isScalar, type Node, parseDocument } from 'yaml'
import { guardYaml } from './guardYaml.js'
import type { Problems } from './Problems.js'
import { plainValue, spanOf } from './plainValue.js'
import { shortened } from './problemAt.js'
import type { YamlSource } from './YamlSource.js'

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
  // The library compares every key with every other; plainValue finds those that stand twice in linear time.
  const document = parseDocument(text, { uniqueKeys: false, prettyErrors: false, version: '1.2' })
  // One slip of syntax sets off many messages; the first is the one that helps.
  const [error] = document.errors
  if (error) {
    const [start, end] = error.pos
    const rule = `This is not YAML: ${shortened(error.message, 120)}.`
    problems.addAt({ start, end }, ...(syntax[error.code] ?? [rule, 'See the line above it too.']))
    return undefined
  }
  const { yaml } = document.directives
  if (yaml.explicit && yaml.version !== '1.2') {
    problems.addAt(
      { start: 0, end: 5 },
      `The file says that it is YAML ${yaml.version}.`,
      'Jobs are YAML 1.2: take the %YAML line out.',
    )
  }
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
  return plainValue(document, problems)
}

const syntax: Readonly<Record<string, readonly [string, string]>> = {
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

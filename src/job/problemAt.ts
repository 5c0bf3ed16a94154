import type { JobProblem } from './JobError.js'

/** Text with a name: what positions and underlines refer to. */
export interface Source {
  readonly file: string
  readonly text: string
}

/** Characters of a text: [start, end). */
export interface Span {
  readonly start: number
  readonly end: number
}

/** The problem of a stretch of text; `value` is what stands there unless it is given. */
export function problemAt(source: Source, span: Span, rule: string, remedy: string, value?: string): JobProblem {
  const { text, file } = source
  const start = Math.min(span.start, text.length)
  const lineStart = text.lastIndexOf('\n', start - 1) + 1
  const lineEnd = endOfLine(text, start)
  const line = countLines(text, lineStart)
  const column = start - lineStart + 1
  const end = Math.max(start + 1, Math.min(span.end, lineEnd))
  const head = `${file}:${line}:${column}  ${rule} ${remedy}`
  const excerpt = text.slice(lineStart, lineEnd)
  return {
    file,
    line,
    column,
    value: value ?? shortened(text.slice(start, Math.min(span.end, lineEnd))),
    rule,
    remedy,
    message: excerpt.trim() === '' ? head : `${head}\n${underlined(excerpt, start - lineStart, end - lineStart)}`,
  }
}

/** One line, at most `length` characters: what may be shown of a text that nobody checked. */
export function shortened(text: string, length = 60): string {
  const line = text
    .split(/\r?\n/, 1)[0]
    .replace(/\p{Cc}/gu, ' ')
    .trim()
  return line.length > length ? `${line.slice(0, length - 3)}...` : line
}

/** A long line is cut to a window around the place. */
const width = 110

function underlined(line: string, from: number, to: number): string {
  const begin = Math.max(0, Math.min(from - 40, line.length - width))
  const part = line.slice(begin, begin + width).replace(/[\p{Cc}\p{Cf}]/gu, (c) => (c === '\t' ? c : ' '))
  const pad = part.slice(0, from - begin).replace(/[^\t]/g, ' ')
  const carets = '^'.repeat(Math.max(1, Math.min(to - begin, part.length) - (from - begin)))
  return `    ${part.trimEnd()}\n    ${pad}${carets}`
}

function endOfLine(text: string, from: number): number {
  const newline = text.indexOf('\n', from)
  const end = newline < 0 ? text.length : newline
  return end > from && text[end - 1] === '\r' ? end - 1 : end
}

function countLines(text: string, before: number): number {
  let line = 1
  for (let at = text.indexOf('\n'); at >= 0 && at < before; at = text.indexOf('\n', at + 1)) line++
  return line
}

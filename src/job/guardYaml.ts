import { Lexer } from 'yaml'
import type { Span } from './problemAt.js'

/**
 * What no job needs and a parser can choke on (it recurses on nesting and compares every key with every other; at a few
 * hundred thousand brackets it takes the whole process down). Looks at tokens only: linear in time, no recursion.
 */
export function guardYaml(text: string): { span: Span; rule: string; remedy: string } | null {
  let at = 0
  let tokens = 0
  let flow = 0
  let onLine = 0
  let fresh = true
  for (const token of new Lexer().lex(text)) {
    // Marks of the lexer's own, not characters of the text.
    if (token === '\u0002' || token === '\u0018' || token === '\u001f') continue
    const span = { start: at, end: at + 1 }
    at += token.length
    if (++tokens > most.tokens)
      return refusal(span, `The file has more than ${most.tokens} parts`, 'a job has hundreds')
    if (token === '[' || token === '{') flow++
    else if (token === ']' || token === '}') flow--
    else if (token === '\n' || token === '\r\n') onLine = 0
    else if (flow <= 0 && (token === '-' || token === '?' || token === ':')) onLine++
    const indent = fresh && token.trim() === '' ? token.length : 0
    fresh = token.endsWith('\n')
    if (flow > most.depth || onLine > most.depth || (flow <= 0 && indent > most.indent)) {
      return refusal(span, `The nesting is deeper than ${most.depth} levels`, 'a job has about six')
    }
  }
  return null
}

export const most = { tokens: 60_000, depth: 40, indent: 160, aliases: 100 }

function refusal(span: Span, rule: string, fact: string) {
  return { span, rule: `${rule}; ${fact}.`, remedy: 'Is this the right file?' }
}

import { crc32 } from 'node:zlib'
import type { Yield } from '../growth/index.js'
import type { Found, SliceResult, UnitResult } from '../search/index.js'

/** What a journal must agree on before it goes on. */
export interface JournalHead {
  readonly format: 1
  readonly name: string
  readonly engine: string
  readonly kernel: string
  /** Of the fixed calculation (kernelChecksum). */
  readonly checksum: string
  readonly resume_hash: string
}

/** A stack grown on paper; `of` is the yieldHash it was grown for. */
export interface GrownStack {
  readonly id: string
  readonly of: string
  readonly yield: Yield
}

export type JournalEntry =
  | { readonly head: JournalHead }
  | { readonly unit: UnitResult; readonly seconds: number }
  /** Of a complete search: what its first round found, and what a slice leaves. */
  | { readonly round: readonly Found[]; readonly seconds: number }
  | { readonly slice: SliceResult; readonly seconds: number }
  | { readonly grown: GrownStack; readonly seconds: number }

/** `{"crc":"xxxxxxxx","entry":...}`, the CRC-32 (of zip and PNG) that of the bytes of the entry. */
export function encodeLine(entry: JournalEntry): string {
  const text = JSON.stringify(entry)
  return `${opening}${checksumOf(text)}${middle}${text}}\n`
}

/** The entry of a line without its end; null for anything that was not written whole. */
export function decodeLine(line: string): JournalEntry | null {
  const from = opening.length + 8 + middle.length
  const text = line.slice(from, -1)
  if (line.slice(0, from) !== `${opening}${checksumOf(text)}${middle}` || !line.endsWith('}')) return null
  return JSON.parse(text) as JournalEntry
}

const opening = '{"crc":"'
const middle = '","entry":'

function checksumOf(text: string): string {
  return crc32(text).toString(16).padStart(8, '0')
}

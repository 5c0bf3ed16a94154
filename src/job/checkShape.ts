import type { z } from 'zod'
import { nearest } from '../media/index.js'
import { keyExamples } from './keyExamples.js'
import type { Problems } from './Problems.js'
import { shortened } from './problemAt.js'
import { type JobAsWritten, jobFormat } from './schema.js'
import type { Path } from './YamlSource.js'

/** A type any part of which may be missing, because it was wrong and has been taken out. */
export type Loose<T> = T extends readonly (infer U)[]
  ? readonly (Loose<U> | undefined)[]
  : T extends object
    ? { readonly [K in keyof T]?: Loose<T[K]> }
    : T

type Issue = z.core.$ZodIssue

/**
 * Holds a value against the schema. Every key and type that does not fit becomes a problem and is taken out of the value
 * (in place), so that the rest can still be read and everything wrong is told at once.
 */
export function checkShape(value: unknown, problems: Problems): Loose<JobAsWritten> {
  const result = jobFormat.safeParse(value)
  if (!result.success) {
    // Misspelt keys first: what they were meant for is not missing.
    const unknownFirst = [...result.error.issues].sort((a, b) => order(a) - order(b))
    for (const issue of unknownFirst) report(issue, issue.path as Path, value, problems)
  }
  return (value ?? {}) as Loose<JobAsWritten>
}

function report(issue: Issue, path: Path, root: unknown, problems: Problems): void {
  if (issue.code === 'invalid_union') {
    const branch = closest(issue.errors, at(root, path))
    if (branch) {
      for (const inner of [...branch].sort((a, b) => order(a) - order(b)))
        report(inner, [...path, ...(inner.path as Path)], root, problems)
      return
    }
  }
  if (issue.code === 'unrecognized_keys') {
    for (const key of issue.keys) {
      unknownKey([...path, key], knownKeys(path), problems)
      remove(root, [...path, key])
    }
    return
  }
  const label = labelOf(path)
  const missing = !has(root, path)
  if (missing) {
    // A value that was taken out earlier has its problem already.
    if (!problems.source.has(path))
      problems.add(path, `"${label}" is missing${inside(path)}.`, `Add ${example(label)}.`)
    return
  }
  const written = at(root, path)
  if (written === undefined) return
  if (written === null)
    problems.addAtKey(path, `"${label}" has no value.`, `Write ${example(label)}, or take the key out.`)
  else if (issue.code === 'invalid_value') oneOf(issue.values, label, path, problems)
  else if (issue.code === 'invalid_type')
    problems.add(path, ...wrongType(label, issue.expected, written, problems.quoted(path)))
  else problems.add(path, ...wrongType(label, '', written, problems.quoted(path)))
  remove(root, path)
}

function order(issue: Issue): number {
  return issue.code === 'unrecognized_keys' ? 0 : 1
}

/** The branch of a union that the writer most likely meant: of the right type, then with the fewest complaints. */
function closest(branches: readonly (readonly Issue[])[], value: unknown): readonly Issue[] | null {
  const cost = (issues: readonly Issue[]) => {
    const wrong = issues.some((issue) => issue.path.length === 0 && issue.code !== 'unrecognized_keys')
    const keys = issues.map((issue) => (issue.code === 'unrecognized_keys' ? issue.keys.length : 1))
    return (wrong ? 1000 : 0) + keys.reduce((sum, n) => sum + n, 0)
  }
  const sorted = [...branches].sort((a, b) => cost(a) - cost(b))
  const best = sorted[0]
  return best && (cost(best) < 1000 || value === undefined || value === null) ? best : null
}

function unknownKey(path: Path, known: readonly string[], problems: Problems): void {
  if (problems.full) return
  const key = String(path[path.length - 1])
  const near = nearest(key, known)
  const spaced = known.find((name) => name.replaceAll(/[ -]/g, '') === key.toLowerCase().replaceAll(/[ _-]/g, ''))
  const meant = spaced ?? near[0]
  if (meant) problems.source.takeFor([...path.slice(0, -1), meant], problems.source.keySpan(path))
  const remedy = (spaced ?? near[0]) ? `Did you mean "${spaced ?? near[0]}"?` : `Known here: ${known.join(', ')}.`
  problems.addAtKey(path, `Unknown key "${shortened(key)}"${inside(path)}.`, remedy)
}

function oneOf(values: readonly unknown[], label: string, path: Path, problems: Problems): void {
  const quoted = problems.quoted(path)
  if (label === 'format') {
    problems.add(path, `format ${quoted} is not known.`, 'This version reads "format: 1".')
    return
  }
  const known = values.map(String)
  const near = nearest(quoted.slice(1, -1), known)[0]
  const list = known.length > 1 ? `${known.slice(0, -1).join(', ')} or ${known[known.length - 1]}` : known[0]
  problems.add(
    path,
    `${label} ${quoted} is not known.`,
    near ? `Did you mean "${near}"? It can be ${list}.` : `Write ${list}.`,
  )
}

function wrongType(label: string, expected: string, value: unknown, quoted: string): [string, string] {
  const is = Array.isArray(value) ? 'a list' : typeof value === 'object' ? 'a map' : `${quoted}`
  const what = Object.hasOwn(names, expected) ? `where ${names[expected]} is expected` : 'which does not fit here'
  return [`${label} is ${is}, ${what}.`, `Write ${example(label)}.`]
}

const names: Record<string, string> = {
  string: 'text',
  number: 'a number',
  boolean: 'true or false',
  object: 'a map of keys',
  record: 'a map of keys',
  array: 'a list',
  int: 'a whole number',
}

/** What a line can't say. */
const phrases: Record<string, string> = {
  like: '"like: outer", the id of another layer',
  growth: '"growth:" with sources and spread',
  stack: '"stack:" with entry, layers and exit',
  target: '"target:" with scan and demands',
  layers: '"layers:" with one "- { ... }" a layer',
  demands: '"demands:" with one "- { ... }" a demand',
  x: '"x: 0.3" or "x: { pick: [0.25, 0.35] }"',
  period: '"period:" with one "- { ... }" a layer',
  'each of layers': '"- { material: GaAs, width: 10..30 ML }"',
  'each of period': '"- { material: GaAs, width: 10..30 ML }"',
  'each of demands': '"- { peak: 80 meV, within: 5 meV }"',
  'each of pick': 'one of the choices',
  media: '"media:" with one "name: { potential: 0.2 eV, mass: 0.09 }" a medium',
}

function example(label: string): string {
  if (Object.hasOwn(phrases, label)) return phrases[label]
  return Object.hasOwn(keyExamples, label) ? `"${keyExamples[label]}"` : `a value for "${label}"`
}

/** The key of a value; of an item of a list, the list's. */
function labelOf(path: Path): string {
  const last = path[path.length - 1]
  if (typeof last === 'string') return last
  return last === undefined ? 'the job' : `each of ${labelOf(path.slice(0, -1))}`
}

/** ` in target.demands`, or nothing at the top: line and column tell which of a list. */
function inside(path: Path): string {
  const parent = path.slice(0, -1).filter((part) => typeof part === 'string')
  return parent.length > 0 ? ` in ${parent.join('.')}` : ''
}

type Schema = { def: { type: string; [key: string]: unknown }; shape?: Record<string, unknown> }

/** The keys that the schema knows in the map at a path. */
function knownKeys(path: Path): string[] {
  let found: Schema[] = [jobFormat as unknown as Schema]
  for (const part of path) found = found.flatMap(unwrapped).flatMap((schema) => child(schema, part))
  return [...new Set(found.flatMap(unwrapped).flatMap((schema) => Object.keys(schema.shape ?? {})))]
}

function unwrapped(schema: Schema): Schema[] {
  if (schema.def.type === 'optional') return unwrapped(schema.def.innerType as Schema)
  if (schema.def.type === 'union') return (schema.def.options as Schema[]).flatMap(unwrapped)
  return [schema]
}

function child(schema: Schema, part: string | number): Schema[] {
  if (schema.def.type === 'array') return [schema.def.element as Schema]
  if (schema.def.type === 'record') return [schema.def.valueType as Schema]
  const inner = schema.shape && Object.hasOwn(schema.shape, part) ? schema.shape[part] : null
  return inner ? [inner as Schema] : []
}

function at(root: unknown, path: Path): unknown {
  return path.reduce<unknown>((value, part) => (value as Record<string | number, unknown> | undefined)?.[part], root)
}

function has(root: unknown, path: Path): boolean {
  if (path.length === 0) return true
  const parent = at(root, path.slice(0, -1))
  return typeof parent === 'object' && parent !== null && Object.hasOwn(parent, path[path.length - 1])
}

function remove(root: unknown, path: Path): void {
  const parent = at(root, path.slice(0, -1)) as Record<string | number, unknown> | undefined
  if (parent === undefined || parent === null || path.length === 0) return
  const key = path[path.length - 1]
  if (Array.isArray(parent)) parent[key as number] = undefined
  else delete parent[key]
}

import type { Source, Span } from './problemAt.js'

export type Path = readonly (string | number)[]

/** Where the parts of a YAML text stand. */
export class YamlSource implements Source {
  private readonly values = new Map<string, Span>()
  private readonly keys = new Map<string, Span>()
  private readonly parts = new Map<string, number>()

  constructor(
    readonly file: string,
    readonly text: string,
  ) {}

  record(path: Path, value: Span, key?: Span): void {
    this.values.set(id(path), value)
    if (!key) return
    // An alias is recorded before and after what it stands for.
    if (!this.keys.has(id(path))) this.parts.set(id(path.slice(0, -1)), this.keyCount(path.slice(0, -1)) + 1)
    this.keys.set(id(path), key)
  }

  /** How many keys the map at a path was written with. */
  keyCount(path: Path): number {
    return this.parts.get(id(path)) ?? 0
  }

  /** The value at a path, else what would hold it. */
  span(path: Path): Span {
    const found = this.values.get(id(path))
    if (found) return found
    return path.length > 0 ? this.heading(path.slice(0, -1)) : { start: 0, end: this.text.length }
  }

  /** The key at a path, else its value. */
  keySpan(path: Path): Span {
    return this.keys.get(id(path)) ?? this.span(path)
  }

  /** Takes a misspelt key for the one that was meant, so that it is not missed as well. */
  takeFor(path: Path, span: Span): void {
    this.keys.set(id(path), span)
  }

  /** Whether the job says anything there, right or wrong. */
  has(path: Path): boolean {
    return this.values.has(id(path)) || this.keys.has(id(path))
  }

  /** The text of the value as written. */
  written(path: Path): string {
    const span = this.values.get(id(path))
    return span ? this.text.slice(span.start, span.end) : ''
  }

  /** What to point at when something is missing inside: a flow map itself, a block map's own key. */
  private heading(path: Path): Span {
    const value = this.values.get(id(path))
    const key = this.keys.get(id(path))
    if (!value || this.text[value.start] === '{' || this.text[value.start] === '[') return value ?? this.span(path)
    return key ?? value
  }
}

function id(path: Path): string {
  return JSON.stringify(path)
}

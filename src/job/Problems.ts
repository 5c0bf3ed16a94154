import { JobError, type JobProblem } from './JobError.js'
import { problemAt, type Source, type Span, shortened } from './problemAt.js'
import type { Path, YamlSource } from './YamlSource.js'

/** Collects what is wrong with a job while it is read. */
export class Problems {
  private readonly list: { problem: JobProblem; order: number }[] = []

  constructor(readonly source: YamlSource) {}

  get count(): number {
    return this.list.length
  }

  /** Nobody reads on after so many, and each costs a search through the text. */
  get full(): boolean {
    return this.list.length >= 1000
  }

  /** At the value of a path, or at what should hold it. */
  add(path: Path, rule: string, remedy: string): void {
    const written = this.source.written(path)
    this.addAt(this.source.span(path), rule, remedy, shortened(written))
  }

  /** At the key of a path. */
  addAtKey(path: Path, rule: string, remedy: string): void {
    this.addAt(this.source.keySpan(path), rule, remedy)
  }

  addAt(span: Span, rule: string, remedy: string, value?: string): void {
    if (this.full) return
    this.list.push({ problem: problemAt(this.source, span, rule, remedy, value), order: span.start })
  }

  /** In a file that the job names at `path`. */
  addIn(source: Source, span: Span, rule: string, remedy: string, path: Path): void {
    if (this.full) return
    this.list.push({ problem: problemAt(source, span, rule, remedy), order: this.source.span(path).start })
  }

  /** The value at a path as written, in quotes, short enough for a sentence. */
  quoted(path: Path): string {
    const text = shortened(this.source.written(path))
    return text.startsWith('"') || text.startsWith("'") ? text : `"${text}"`
  }

  /** Throws everything found so far, in the order of the file. */
  throwIfAny(): void {
    if (this.list.length === 0) return
    // The parts of an alias are read once for each place that it stands in.
    const once = new Map(this.list.map((entry) => [entry.problem.message, entry]))
    const sorted = [...once.values()].sort((a, b) => a.order - b.order)
    throw new JobError(sorted.map(({ problem }) => problem))
  }
}

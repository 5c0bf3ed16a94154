/** One thing that is wrong in a job or in a file that it names. */
export interface JobProblem {
  /** As the caller named the job; for a table, the table's name as the job writes it. */
  readonly file: string
  /** Both from 1; column in UTF-16 units. */
  readonly line: number
  readonly column: number
  /** The offending text as written, shortened; empty where something is missing. */
  readonly value: string
  /** What is wrong, as a sentence. */
  readonly rule: string
  /** What to write or do instead. */
  readonly remedy: string
  /** `file:line:column  rule remedy`, the offending line, and a caret underline. */
  readonly message: string
}

/** A job that can't be run, with every problem that was found in it, in the order of the file. */
export class JobError extends Error {
  override readonly name = 'JobError'

  constructor(readonly problems: readonly JobProblem[]) {
    super(listed(problems))
  }
}

/** More than this many are a broken file, not a list to work through. */
const shown = 100

function listed(problems: readonly JobProblem[]): string {
  const messages = problems.slice(0, shown).map((problem) => problem.message)
  const more = problems.length - shown
  if (more > 0) messages.push(`and ${more} more problem${more > 1 ? 's' : ''}.`)
  return messages.join('\n\n')
}

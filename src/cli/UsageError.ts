/** The command line is wrong; the message says what to write. */
export class UsageError extends Error {
  override readonly name = 'UsageError'
}

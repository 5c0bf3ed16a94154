/** A stack, a medium or a point that has no spectrum; the message names the number. */
export class StackError extends Error {
  override readonly name = 'StackError'
}

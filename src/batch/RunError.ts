/** A job that is right but can't be run here and now; the message says why and what to do. */
export class RunError extends Error {
  override readonly name = 'RunError'
}

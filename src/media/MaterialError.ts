/** A material that does not exist, or one asked for outside what it is defined for. */
export class MaterialError extends Error {
  override readonly name = 'MaterialError'

  constructor(
    message: string,
    /** Known names that may have been meant, the nearest first. */
    readonly nearest: readonly string[] = [],
  ) {
    super(message)
  }
}

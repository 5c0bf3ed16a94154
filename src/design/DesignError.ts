/** A job whose lattice holds no stack; the message says which layer or limit, and what to write instead. */
export class DesignError extends Error {
  override readonly name = 'DesignError'
}

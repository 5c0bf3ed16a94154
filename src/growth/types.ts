/** One independent, normal error of growth, first order: d(layer parameter)/d(error), [width, then the medium's own] a layer. */
export interface GrowthError {
  readonly name: string
  /** One standard deviation, in the unit that `direction` is per. */
  readonly sd: number
  readonly direction: Float64Array
}

export interface Yield {
  readonly trials: number
  readonly passed: number
  readonly pct: number
  /** Wilson, 95 %. */
  readonly lowPct: number
  readonly highPct: number
  /** How many trials failed each demand, in the demands' order. */
  readonly failures: readonly number[]
}

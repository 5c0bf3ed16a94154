import { absorbingGradient } from './absorbingDerivatives.js'
import { wasmAvailable } from './kernel/instance.js'
import { wasmGradient } from './kernel/wasmGradient.js'
import { plainGradient } from './plainGradient.js'
import { checkStack } from './stackChecks.js'
import type { MediaTable, WaveStack } from './types.js'

/** What `gradientInto` writes: T of `points` entries, the others of points x layers, entry e * layers + j. */
export interface GradientOut {
  readonly T: Float64Array
  /** dT/d(width of layer j), 1/nm. */
  readonly dTdWidth: Float64Array
  /** dT/d(q of layer j), nm². */
  readonly dTdQ: Float64Array
  /** dT/d(mu of layer j). */
  readonly dTdMu: Float64Array
  /** The same by the imaginary parts, of media that absorb. */
  readonly dTdQIm?: Float64Array
  readonly dTdMuIm?: Float64Array
}

/** The share of the incoming flux whose derivatives are asked for. */
export type Share = 'R' | 'T'

/**
 * T and its derivatives by every layer's width, q and mu, for a lossless stack and a wave from the entry: one sweep
 * from exit to entry that keeps the vectors at every interface, one adjoint sweep back. With D = |2YA|² and
 * x(j - 1) = M(j) x(j), d ln T = - sum g(j - 1) dM(j) x(j), g(j) = g(j - 1) M(j), g(0) = (dD/dx)/D. It costs about three
 * spectra whatever the number of layers. The logarithm is differentiated, so that the derivatives of a T of 1e-250 are
 * right relative to it; where T underflows to 0 they are 0. For media that absorb see `absorbingGradient`. Throws as
 * `spectrumInto`.
 */
export function gradientInto(table: MediaTable, stack: WaveStack, out: GradientOut): void {
  checkStack(stack)
  if (table.qIm) {
    absorbingGradient(table, stack, out)
    return
  }
  // As in `spectrumInto`: two kernels, the same bits; the plain one refuses with a reason what the other one only marks.
  const wide = table.points * stack.medium.length >= 64
  if (wide && wasmAvailable && wasmGradient(table, stack, out)) return
  plainGradient(table, stack, out)
}

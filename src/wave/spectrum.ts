import { absorbingSpectrum } from './absorbing.js'
import { absorbingBlock } from './absorbingBlock.js'
import { wasmAvailable } from './kernel/instance.js'
import { wasmSpectrum } from './kernel/wasmSpectrum.js'
import { plainSpectrum } from './plainSpectrum.js'
import { checkStack, lead } from './stackChecks.js'
import type { MediaTable, Side, WaveStack } from './types.js'

const worthTheCopies = 64

/** What `spectrumInto` writes: at least `points` entries each. */
export interface SpectrumOut {
  readonly T: Float64Array
  readonly R: Float64Array
  /** -Infinity where T = 0; computed only when given. */
  readonly log10T?: Float64Array
  /** Share of the incident flux absorbed between the leads, and in each layer (e * layers + j); written only when given. */
  readonly A?: Float64Array
  readonly absorbed?: Float64Array
}

/**
 * Transmission and reflection at every point of the table; absorption too where it has imaginary parts
 * (`absorbingSpectrum`; T and R alone come from `absorbingBlock`, with nothing to check them by and 0 for the error). For a lossless stack:
 *
 * Two real vectors (u, v) are swept from the far side to the side the wave comes from: they start as (1, 0) and
 * (0, Y) in an open lead, the wave being first + i second; as (1, -kappa/mu) alone in a closed one; as (0, 1) alone at
 * a hard wall. Then u = A + B, v = iY(A - B), T = (Y_far/Y_near)/|A|², R = |B|²/|A|², each from its own numbers, so that
 * T + R = 1 is a test. A running power of two beside the vectors lets any width through. Layers run outside, blocks of
 * 128 energies inside. Two kernels do it with the same bits: WebAssembly where it runs, else plain TypeScript. Allocates
 * nothing once its scratch has seen as many media, points and layers.
 *
 * `from` 'exit': the wave comes from the exit's side. Returns the largest |T + R + A - 1|.
 * Throws RangeError where the lead the wave comes from is closed (q <= 0) or absorbs, for a negative width, and for a
 * result that is not finite, each with its number.
 */
export function spectrumInto(table: MediaTable, stack: WaveStack, out: SpectrumOut, from: Side = 'entry'): number {
  checkStack(stack)
  const near = lead(stack, from, true)
  const far = lead(stack, from, false)
  if (table.qIm) {
    if (out.A || out.absorbed) return absorbingSpectrum(table, stack, out, from, near, far)
    absorbingBlock(table, stack, out, from, near, far)
    return 0
  }
  out.A?.fill(0)
  out.absorbed?.fill(0)
  // Below some dozens of layers times points the copies into the kernel's memory cost more than it saves.
  const work = table.points * stack.medium.length
  if (work >= worthTheCopies && wasmAvailable) {
    const worst = wasmSpectrum(table, stack, out, from, near, far)
    if (worst < Infinity) return worst
    // Something is to be refused: the twin finds out what, and says it.
  }
  return plainSpectrum(table, stack, out, from, near, far)
}

import type { SpectrumOut } from '../spectrum.js'
import type { MediaTable, Side, WaveStack } from '../types.js'
import { kernel, views } from './instance.js'

/**
 * The spectrum of a lossless stack by the WebAssembly kernel; NaN or Infinity where a point must be refused. Copies the
 * table in and the results out.
 */
export function wasmSpectrum(
  table: MediaTable,
  stack: WaveStack,
  out: SpectrumOut,
  from: Side,
  near: number,
  far: number,
): number {
  views.load(table, stack)
  const worst = kernel!.spectrum(near, far, from === 'exit', out.log10T !== undefined)
  out.T.set(views.T)
  out.R.set(views.R)
  if (out.log10T) out.log10T.set(views.log10T)
  return worst
}

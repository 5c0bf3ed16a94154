import type { GradientOut } from '../gradient.js'
import type { MediaTable, WaveStack } from '../types.js'
import { kernel, views } from './instance.js'

/** The gradient of a lossless stack by the WebAssembly kernel; false where a point must be refused. */
export function wasmGradient(table: MediaTable, stack: WaveStack, out: GradientOut): boolean {
  views.load(table, stack)
  const k = kernel!
  const layers = stack.medium.length
  const { stride, dW, dQ, dMu } = views
  k.gradientBegin()
  for (let first = 0; first < table.points; first += stride) {
    if (k.gradientBlock(stack.entry, stack.exit, first) === 0) return false
    const left = (table.points - first) * layers
    const whole = left >= stride * layers
    out.dTdWidth.set(whole ? dW : dW.subarray(0, left), first * layers)
    out.dTdQ.set(whole ? dQ : dQ.subarray(0, left), first * layers)
    out.dTdMu.set(whole ? dMu : dMu.subarray(0, left), first * layers)
  }
  out.T.set(views.T)
  return true
}

import type { SpectrumOut } from '../spectrum.js'
import type { MediaTable, Side, WaveStack } from '../types.js'
import { kernelBase64 } from './bytes.js'

/** What spectrum.as exports. Addresses are bytes into its memory. */
interface Kernel {
  readonly memory: { readonly buffer: ArrayBuffer }
  reserve(media: number, points: number, layers: number): void
  qAt(): number
  muAt(): number
  TAt(): number
  RAt(): number
  logAt(): number
  mediumAt(): number
  widthAt(): number
  spectrum(
    media: number,
    points: number,
    layers: number,
    near: number,
    far: number,
    backwards: boolean,
    withLog: boolean,
  ): number
}

/** The part of the global WebAssembly that is used; Node's own types do not declare it. */
interface WebAssemblyApi {
  readonly Module: new (bytes: Uint8Array) => object
  readonly Instance: new (module: object, imports: object) => { readonly exports: unknown }
}

const kernel = instantiate()

/** Whether this machine runs the kernel (WebAssembly with 128-bit vectors, which every supported Node has). */
export const wasmAvailable = kernel !== null

// Views of the kernel's memory for the shape of the last call: made anew only when the shape changes.
let shape = { media: -1, points: -1, layers: -1 }
let q = new Float64Array(0)
let mu = q
let T = q
let R = q
let log10T = q
let width = q
let medium = new Int32Array(0)

/**
 * The spectrum of a lossless stack by the WebAssembly kernel; NaN or Infinity where a point must be refused. Copies the
 * table in and the results out. One instance and one memory a thread.
 */
export function wasmSpectrum(
  table: MediaTable,
  stack: WaveStack,
  out: SpectrumOut,
  from: Side,
  near: number,
  far: number,
): number {
  const { count, points } = table
  const layers = stack.medium.length
  if (count !== shape.media || points !== shape.points || layers !== shape.layers) layOut(count, points, layers)
  const cells = count * points
  q.set(table.q.length === cells ? table.q : table.q.subarray(0, cells))
  mu.set(table.mu.length === cells ? table.mu : table.mu.subarray(0, cells))
  medium.set(stack.medium)
  width.set(stack.width)
  const withLog = out.log10T !== undefined
  const worst = kernel!.spectrum(count, points, layers, near, far, from === 'exit', withLog)
  out.T.set(T)
  out.R.set(R)
  if (out.log10T) out.log10T.set(log10T)
  return worst
}

function layOut(media: number, points: number, layers: number): void {
  const k = kernel!
  k.reserve(media, points, layers)
  const { buffer } = k.memory
  q = new Float64Array(buffer, k.qAt(), media * points)
  mu = new Float64Array(buffer, k.muAt(), media * points)
  T = new Float64Array(buffer, k.TAt(), points)
  R = new Float64Array(buffer, k.RAt(), points)
  log10T = new Float64Array(buffer, k.logAt(), points)
  width = new Float64Array(buffer, k.widthAt(), layers)
  medium = new Int32Array(buffer, k.mediumAt(), layers)
  shape = { media, points, layers }
}

function instantiate(): Kernel | null {
  const api = (globalThis as { WebAssembly?: WebAssemblyApi }).WebAssembly
  if (api === undefined) return null
  try {
    const module = new api.Module(Buffer.from(kernelBase64, 'base64'))
    return new api.Instance(module, {}).exports as Kernel
  } catch {
    return null
  }
}

import type { MediaTable, WaveStack } from '../types.js'
import { kernelBase64 } from './bytes.js'

/** What kernel.as exports. Addresses are bytes into its memory. */
interface Kernel {
  readonly memory: { readonly buffer: ArrayBuffer }
  /** Returns the number of energies that a block of the gradient has. */
  reserve(media: number, points: number, layers: number): number
  qAt(): number
  muAt(): number
  TAt(): number
  RAt(): number
  logAt(): number
  mediumAt(): number
  widthAt(): number
  dWAt(): number
  dQAt(): number
  dMuAt(): number
  spectrum(near: number, far: number, backwards: boolean, withLog: boolean): number
  gradientBegin(): void
  gradientBlock(near: number, far: number, first: number): number
}

/** The part of the global WebAssembly that is used; Node's own types do not declare it. */
interface WebAssemblyApi {
  readonly Module: new (bytes: Uint8Array) => object
  readonly Instance: new (module: object, imports: object) => { readonly exports: unknown }
}

/** The kernel of this thread; null where WebAssembly or its 128-bit vectors are missing. */
export const kernel = instantiate()

export const wasmAvailable = kernel !== null

/** Views of the kernel's memory for the shape of the last call, made anew only when the shape changes. */
export class Views {
  T = new Float64Array(0)
  R = this.T
  log10T = this.T
  /** For the energies of one gradient block: `stride` times layers. */
  dW = this.T
  dQ = this.T
  dMu = this.T
  stride = 0
  private q = this.T
  private mu = this.T
  private width = this.T
  private medium = new Int32Array(0)
  private media = -1
  private points = -1
  private layers = -1

  /** Copies a table and a stack into the kernel's memory. */
  load(table: MediaTable, stack: WaveStack): void {
    const { count, points } = table
    const layers = stack.medium.length
    if (count !== this.media || points !== this.points || layers !== this.layers) this.layOut(count, points, layers)
    const cells = count * points
    this.q.set(table.q.length === cells ? table.q : table.q.subarray(0, cells))
    this.mu.set(table.mu.length === cells ? table.mu : table.mu.subarray(0, cells))
    this.medium.set(stack.medium)
    this.width.set(stack.width)
  }

  private layOut(media: number, points: number, layers: number): void {
    const k = kernel!
    this.stride = k.reserve(media, points, layers)
    const { buffer } = k.memory
    this.q = new Float64Array(buffer, k.qAt(), media * points)
    this.mu = new Float64Array(buffer, k.muAt(), media * points)
    this.T = new Float64Array(buffer, k.TAt(), points)
    this.R = new Float64Array(buffer, k.RAt(), points)
    this.log10T = new Float64Array(buffer, k.logAt(), points)
    this.width = new Float64Array(buffer, k.widthAt(), layers)
    this.medium = new Int32Array(buffer, k.mediumAt(), layers)
    this.dW = new Float64Array(buffer, k.dWAt(), this.stride * layers)
    this.dQ = new Float64Array(buffer, k.dQAt(), this.stride * layers)
    this.dMu = new Float64Array(buffer, k.dMuAt(), this.stride * layers)
    this.media = media
    this.points = points
    this.layers = layers
  }
}

export const views = new Views()

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

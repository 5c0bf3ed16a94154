import { wasmAvailable } from './kernel/instance.js'
import { spectrumInto } from './spectrum.js'

/** Which code computes spectra here. Kernels of different names give the same bits, or the checksum below differs. */
export const kernelName = wasmAvailable ? 'wasm-simd' : 'plain'

/**
 * A number (eight hexadecimal digits) made of every bit of a fixed calculation: random-looking stacks with wells,
 * barriers of any thickness and media on their edge. Machines whose numbers differ must not share a journal.
 */
export function kernelChecksum(): string {
  const points = 300
  const count = 9
  const table = { count, points, q: new Float64Array(count * points), mu: new Float64Array(count * points) }
  let state = 1
  const next = () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0
    return state / 4294967296
  }
  for (let m = 0; m < count; m++) {
    for (let e = 0; e < points; e++) {
      const lead = m === 0 || m === count - 1
      table.q[m * points + e] = lead ? 0.01 + next() : (e % 50 === m ? 0 : 1) * (next() - 0.6)
      table.mu[m * points + e] = 0.03 + 0.2 * next()
    }
  }
  const medium = Int32Array.from({ length: 40 }, (_, j) => 1 + ((j * j + j) % (count - 2)))
  const width = Float64Array.from({ length: 40 }, (_, j) => (j === 17 ? 700 : 6 * next()))
  const out = { T: new Float64Array(points), R: new Float64Array(points), log10T: new Float64Array(points) }
  spectrumInto(table, { entry: 0, exit: count - 1, medium, width }, out)
  let hash = 0x811c9dc5
  for (const row of [out.T, out.R, out.log10T]) {
    const bits = new DataView(row.buffer)
    for (let i = 0; i < bits.byteLength; i += 8) {
      const value = row[i / 8]
      bits.setFloat64(i, value, true)
      for (let b = 0; b < 8; b++) hash = Math.imul(hash ^ bits.getUint8(i + b), 0x01000193)
    }
  }
  return (hash >>> 0).toString(16).padStart(8, '0')
}

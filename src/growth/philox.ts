/**
 * Philox4x32-10: 128 random bits from a 128-bit counter and a 64-bit key, so that any number of any stream can be had without
 * those before it. Salmon, Moraes, Dror, Shaw, "Parallel random numbers: as easy as 1, 2, 3", SC11 (2011); constants and test
 * vectors from memory of its reference code.
 */
export function philox(counter: Uint32Array, key0: number, key1: number, out: Uint32Array): void {
  let a = counter[0]
  let b = counter[1]
  let c = counter[2]
  let d = counter[3]
  let k0 = key0
  let k1 = key1
  for (let round = 0; round < 10; round++) {
    const lowA = Math.imul(0xd2511f53, a)
    const highA = highProduct(0xd2511f53, a)
    const lowC = Math.imul(0xcd9e8d57, c)
    const highC = highProduct(0xcd9e8d57, c)
    a = highC ^ b ^ k0
    b = lowC
    c = highA ^ d ^ k1
    d = lowA
    k0 = (k0 + 0x9e3779b9) | 0
    k1 = (k1 + 0xbb67ae85) | 0
  }
  out[0] = a
  out[1] = b
  out[2] = c
  out[3] = d
}

/** Upper 32 bits of the product of two unsigned words, by halves: every partial product is exact in a double. */
function highProduct(x: number, y: number): number {
  const x0 = x & 0xffff
  const x1 = x >>> 16
  const y0 = y & 0xffff
  const y1 = y >>> 16
  const middle = x1 * y0 + ((x0 * y0) >>> 16)
  return (x1 * y1 + Math.floor(middle / 65536) + ((middle & 0xffff) + x0 * y1) / 65536) >>> 0
}

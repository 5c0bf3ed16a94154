/**
 * AssemblyScript. The kernel's memory and its numbers.
 *
 * Memory, from the end of the static data on, 16-byte aligned; one instance a thread, nothing shared:
 *   state   u1, v1, u2, v2, shift, Y of the far lead, factor of the last rescaling; gu1, gv1, gu2, gv2, T of the adjoint
 *           sweep: a row each
 *   slots   k, y, z; 1/k, 1/mu, q/mu, 1/(2q): a row each; kappaMax, yBound, muBound, kind, kinds (u8, one for four energies). One a slot,
 *           slot 0 for the media that one layer uses
 *   uses    i32 a medium: its slot; filled: i32 a slot
 *   T, R, log10T   `points` doubles each
 *   width   f64 a layer; medium: i32 a layer
 *   q, mu   `points` doubles a medium, as in a MediaTable
 *   store   for each layer u1, v1, u2, v2, c, S, dS/dq, and for each interface a factor: `stride` doubles each
 *   dW, dQ, dMu   for each energy of a block of `stride` one double a layer
 * A row is 128 doubles and a pair to spare. Energies are taken four by four: what lies behind the last one is computed
 * along, and never a result.
 */

export const block: i32 = 128
export const rowBytes: usize = 1040
export const stateRows: usize = 12
export const slotBytes: usize = 7 * rowBytes + 64
export const kappaMaxAt: usize = 7 * rowBytes
export const yBoundAt: usize = kappaMaxAt + 8
export const muBoundAt: usize = kappaMaxAt + 16
export const kindAt: usize = kappaMaxAt + 24
export const kindsAt: usize = kappaMaxAt + 32
export const storeRows: usize = 7
// Kinds of a medium within a block: q >= 0 everywhere, q < 0 everywhere, both.
export const open: i32 = 0
export const closed: i32 = 1
export const mixed: i32 = 2

export let state: usize = 0
export let slots: usize = 0
export let uses: usize = 0
export let filled: usize = 0
export let qBase: usize = 0
export let muBase: usize = 0
export let TBase: usize = 0
export let RBase: usize = 0
export let logBase: usize = 0
export let mediumBase: usize = 0
export let widthBase: usize = 0
export let storeBase: usize = 0
export let factorBase: usize = 0
export let dWBase: usize = 0
export let dQBase: usize = 0
export let dMuBase: usize = 0

export let mediaCount: i32 = 0
export let points: i32 = 0
export let layers: i32 = 0
export let stride: i32 = 0

/** Lays the memory out for so many media, points and layers, grows it where needed, and returns the stride. */
export function reserve(media: i32, pointCount: i32, layerCount: i32): i32 {
  mediaCount = media
  points = pointCount
  layers = layerCount
  // The store and the results of a block should stay in the second cache: 40000 doubles.
  stride = max(16, min(block, 40000 / (10 * (layerCount + 1)))) & ~3
  at = (__heap_base + 15) & ~15
  state = take(stateRows * rowBytes)
  slots = take((<usize>media + 1) * slotBytes)
  uses = take(<usize>media * 4)
  filled = take((<usize>media + 1) * 4)
  // What is read behind the end of a row, by groups of four, is 32 bytes at most.
  const row = <usize>pointCount * 8 + 32
  TBase = take(row)
  RBase = take(row)
  logBase = take(row)
  widthBase = take(<usize>layerCount * 8)
  mediumBase = take(<usize>layerCount * 4)
  qBase = take(<usize>media * <usize>pointCount * 8 + 32)
  muBase = take(<usize>media * <usize>pointCount * 8 + 32)
  const lane = <usize>stride * 8
  storeBase = take(storeRows * <usize>layerCount * lane)
  factorBase = take((<usize>layerCount + 1) * (lane + 4))
  dWBase = take(<usize>layerCount * lane)
  dQBase = take(<usize>layerCount * lane)
  dMuBase = take(<usize>layerCount * lane)
  const pages = <i32>((at + 65535) >> 16)
  if (pages > memory.size()) memory.grow(pages - memory.size())
  return stride
}

let at: usize = 0

function take(bytes: usize): usize {
  const start = at
  at += (bytes + 15) & ~15
  return start
}

export function qAt(): usize { return qBase }
export function muAt(): usize { return muBase }
export function TAt(): usize { return TBase }
export function RAt(): usize { return RBase }
export function logAt(): usize { return logBase }
export function mediumAt(): usize { return mediumBase }
export function widthAt(): usize { return widthBase }
export function dWAt(): usize { return dWBase }
export function dQAt(): usize { return dQBase }
export function dMuAt(): usize { return dMuBase }

/** q and mu of medium m from point `first` on. */
@inline export function qRow(m: i32, first: i32): usize {
  return qBase + ((<usize>m * <usize>points + <usize>first) << 3)
}
@inline export function muRow(m: i32, first: i32): usize {
  return muBase + ((<usize>m * <usize>points + <usize>first) << 3)
}
@inline export function mediumOf(layer: i32): i32 { return load<i32>(mediumBase + (<usize>layer << 2)) }
@inline export function widthOf(layer: i32): f64 { return load<f64>(widthBase + (<usize>layer << 3)) }

// Constants are loaded and spread over both lanes at once, which is quicker than building them in a register.
const constants = memory.data<f64>([
  0.3183098861837907, 6755399441055744.0, 3.1415926534682512, 1.2154201013012384e-10,
  -0.16666666666666666, 0.008333333333333316, -0.00019841269841254974, 2.755731921916323e-6,
  -2.505210761699557e-8, 1.605897731242445e-10, -7.643970295533013e-13, 2.7314447512062796e-15,
  0.04166666666666666, -0.0013888888888884767, 2.4801587298913547e-5, -2.7557318573365657e-7,
  2.0876681558822446e-9, -1.1466252257937559e-11, 4.646435932869834e-14, 0.5,
  1.0, 1.4426950408889634, 0.6931471805598903, 5.497923018708371e-14,
  0.16666666666666669, 0.008333333333330065, 0.00019841269863041851, 2.7557268478279004e-6,
  2.51003767988125e-8, 0.041666666666666664, 0.0013888888888886554, 2.48015873171361e-5,
  2.755728298260548e-7, 2.091123041977771e-9,
])

@inline export function C(i: usize): v128 { return v128.load64_splat(constants + i * 8) }
@inline export function add(a: v128, b: v128): v128 { return f64x2.add(a, b) }
@inline export function sub(a: v128, b: v128): v128 { return f64x2.sub(a, b) }
@inline export function mul(a: v128, b: v128): v128 { return f64x2.mul(a, b) }
@inline export function exponentOf(x: f64): i32 {
  return <i32>((reinterpret<i64>(x) >> 52) & 0x7ff) - 1023
}
@inline export function powerOfTwo(n: i32): f64 {
  return reinterpret<f64>((<i64>n + 1023) << 52)
}

/** x 2^n as `scaleByPowerOfTwo`. */
export function scaled(x: f64, n: f64): f64 {
  let value = x
  let left = <i32>n
  if (left > 1023) {
    value *= powerOfTwo(1023)
    left -= 1023
    if (left > 1023) {
      value *= powerOfTwo(1023)
      left = min(left - 1023, 1023)
    }
  } else if (left < -969) {
    value *= powerOfTwo(-969)
    left += 969
    if (left < -969) {
      value *= powerOfTwo(-969)
      left = max(left + 969, -1022)
    }
  }
  return value * powerOfTwo(left)
}

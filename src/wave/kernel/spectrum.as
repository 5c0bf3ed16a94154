/**
 * AssemblyScript. The spectrum of lossless stacks, two energies at a time: the same operations in the same order as
 * `plainSpectrum` and `layerFunctions`, so the same bits (no fused multiply-add, no relaxed instruction). Layers run
 * outside, energies inside, in blocks of 128 that stay in the first cache.
 *
 * Memory, from the end of the static data on, 16-byte aligned; one instance a thread, nothing shared:
 *   state   u1, v1, u2, v2, shift, Y of the far lead: 130 doubles each
 *   slots   k, y, z (as long), kappaMax, yBound, muBound, kind, kinds (u8, one for four energies): one a slot,
 *           slot 0 for the media that one layer uses
 *   uses    i32 a medium: its slot; filled: i32 a slot
 *   q, mu   one row of `points` doubles a medium, as in a MediaTable; T, R, log10T: `points` doubles
 *   medium  i32 a layer; width: f64 a layer
 * Energies are taken four by four: what lies behind the last one is computed along, and never a result.
 */

const block: i32 = 128
// 128 doubles and a pair to spare.
const rowBytes: usize = 1040
const slotBytes: usize = 3 * rowBytes + 64
const kappaMaxAt: usize = 3 * rowBytes
const yBoundAt: usize = kappaMaxAt + 8
const muBoundAt: usize = kappaMaxAt + 16
const kindAt: usize = kappaMaxAt + 24
const kindsAt: usize = kappaMaxAt + 32
// Kinds of a medium within a block: q >= 0 everywhere, q < 0 everywhere, both.
const open: i32 = 0
const closed: i32 = 1
const mixed: i32 = 2

const rounder: f64 = 6755399441055744.0

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

@inline function C(i: usize): v128 { return v128.load64_splat(constants + i * 8) }
@inline function add(a: v128, b: v128): v128 { return f64x2.add(a, b) }
@inline function sub(a: v128, b: v128): v128 { return f64x2.sub(a, b) }
@inline function mul(a: v128, b: v128): v128 { return f64x2.mul(a, b) }

let state: usize = 0
let slots: usize = 0
let uses: usize = 0
let filled: usize = 0
let qBase: usize = 0
let muBase: usize = 0
let TBase: usize = 0
let RBase: usize = 0
let logBase: usize = 0
let mediumBase: usize = 0
let widthBase: usize = 0

let points: i32 = 0
let slotCount: i32 = 1

/** Lays the memory out for so many media, points and layers, and grows it where needed. */
export function reserve(media: i32, pointCount: i32, layers: i32): void {
  let at = (__heap_base + 15) & ~15
  state = at
  at += 6 * rowBytes
  slots = at
  at += (<usize>media + 1) * slotBytes
  uses = at
  at += (<usize>media * 4 + 15) & ~15
  filled = at
  at += ((<usize>media + 1) * 4 + 15) & ~15
  const row = (<usize>pointCount * 8 + 63) & ~15
  TBase = at
  RBase = at + row
  logBase = at + 2 * row
  at += 3 * row
  widthBase = at
  at += (<usize>layers * 8 + 15) & ~15
  mediumBase = at
  at += (<usize>layers * 4 + 15) & ~15
  qBase = at
  at += (<usize>media * <usize>pointCount * 8 + 63) & ~15
  muBase = at
  at += (<usize>media * <usize>pointCount * 8 + 63) & ~15
  const pages = <i32>((at + 65535) >> 16)
  if (pages > memory.size()) memory.grow(pages - memory.size())
}

export function qAt(): usize { return qBase }
export function muAt(): usize { return muBase }
export function TAt(): usize { return TBase }
export function RAt(): usize { return RBase }
export function logAt(): usize { return logBase }
export function mediumAt(): usize { return mediumBase }
export function widthAt(): usize { return widthBase }

/**
 * T, R and, if asked for, log10 T of all points. `far` < 0: a hard wall. `backwards`: the wave comes from the exit.
 * Returns the largest |T + R - 1|; NaN where a point must be refused.
 */
export function spectrum(
  media: i32, pointCount: i32, layers: i32, near: i32, far: i32, backwards: bool, withLog: bool,
): f64 {
  points = pointCount
  assign(media, layers)
  let worst = f64x2.splat(0)
  for (let first = 0; first < pointCount; first += block) {
    const n = min(block, pointCount - first)
    sweep(layers, far, backwards, first, n)
    worst = f64x2.max(worst, finish(near, first, n, withLog))
  }
  return max(f64x2.extract_lane(worst, 0), f64x2.extract_lane(worst, 1))
}

// Media of several layers get a slot each; those of one share slot 0.
function assign(media: i32, layers: i32): void {
  for (let m = 0; m < media; m++) store<i32>(uses + (<usize>m << 2), 0)
  for (let j = 0; j < layers; j++) {
    const at = uses + (<usize>load<i32>(mediumBase + (<usize>j << 2)) << 2)
    store<i32>(at, load<i32>(at) + 1)
  }
  slotCount = 1
  for (let m = 0; m < media; m++) {
    const at = uses + (<usize>m << 2)
    store<i32>(at, load<i32>(at) > 1 ? slotCount++ : 0)
  }
}

function sweep(layers: i32, far: i32, backwards: bool, first: i32, n: i32): void {
  const end = state + (<usize>n << 3)
  start(far, first, n)
  for (let i = 0; i < slotCount; i++) store<i32>(filled + (<usize>i << 2), 0)
  let grown = 0.0
  for (let step = 0; step < layers; step++) {
    const j = backwards ? step : layers - 1 - step
    const m = load<i32>(mediumBase + (<usize>j << 2))
    const w = load<f64>(widthBase + (<usize>j << 3))
    const number = load<i32>(uses + (<usize>m << 2))
    const slot = slots + <usize>number * slotBytes
    const q = qBase + ((<usize>m * <usize>points + <usize>first) << 3)
    if (number == 0 || load<i32>(filled + (<usize>number << 2)) == 0) {
      store<i32>(filled + (<usize>number << 2), 1)
      fill(slot, q, muBase + ((<usize>m * <usize>points + <usize>first) << 3), n)
    }
    const x = load<f64>(slot, kappaMaxAt) * w
    const thick = x > 300
    const bound =
      (thick ? 0 : x * 1.5) +
      4 +
      <f64>exponentOf(1 + load<f64>(slot, muBoundAt) * w) +
      <f64>exponentOf(load<f64>(slot, yBoundAt))
    if (grown + bound > 900) {
      renormalise(n)
      grown = 0
    }
    grown += bound
    const kind = load<i32>(slot, kindAt)
    if (kind == open) crossOpen(state, end, slot, w)
    else if (thick) crossBoth(state, end, slot, q, w, true)
    else if (kind == closed) crossClosed(state, end, slot, w)
    else crossMixed(slot, q, w, n)
  }
  if (grown > 400) renormalise(n)
}

@inline function exponentOf(x: f64): i32 {
  return <i32>((reinterpret<i64>(x) >> 52) & 0x7ff) - 1023
}

function start(far: i32, first: i32, n: i32): void {
  const zero = f64x2.splat(0)
  const one = f64x2.splat(1)
  const q = qBase + ((<usize>max(far, 0) * <usize>points + <usize>first) << 3)
  const mu = muBase + ((<usize>max(far, 0) * <usize>points + <usize>first) << 3)
  const end = (<usize>n << 3) + 16
  for (let o: usize = 0; o < end; o += 16) {
    const p = state + o
    let u = zero
    let v = one
    let w = zero
    if (far >= 0) {
      const square = v128.load(q + o)
      const Y = f64x2.div(f64x2.sqrt(f64x2.abs(square)), v128.load(mu + o))
      const isOpen = f64x2.gt(square, zero)
      u = one
      v = v128.andnot(f64x2.neg(Y), isOpen)
      w = v128.and(Y, isOpen)
    }
    v128.store(p, u, 0)
    v128.store(p, v, rowBytes)
    v128.store(p, zero, 2 * rowBytes)
    v128.store(p, w, 3 * rowBytes)
    v128.store(p, zero, 4 * rowBytes)
    v128.store(p, w, 5 * rowBytes)
  }
}

// k, y = k/mu and z = mu/k of a medium, its bounds and its kind, over n points.
function fill(slot: usize, q: usize, mu: usize, n: i32): void {
  const zero = f64x2.splat(0)
  const least = f64x2.splat(1e-200)
  const one = f64x2.splat(1)
  let kappa = zero
  let yMax = one
  let muMax = one
  let anyClosed = zero
  let allClosed = v128.not(zero)
  const last = (<usize>n << 3) - 8
  // One pair more than there are, so that whole groups of four hold numbers: the last energy again.
  const end = (<usize>n << 3) + 16
  for (let o: usize = 0; o < end; o += 16) {
    let square = v128.load(q + o)
    let mass = v128.load(mu + o)
    if (o >= last) {
      square = v128.load64_splat(q + last)
      mass = v128.load64_splat(mu + last)
    }
    const isClosed = f64x2.lt(square, zero)
    const size = f64x2.pmax(f64x2.abs(square), least)
    const root = f64x2.sqrt(size)
    const d = f64x2.div(one, mul(root, mass))
    const y = mul(size, d)
    v128.store(slot + o, root)
    v128.store(slot + o, y, rowBytes)
    v128.store(slot + o, mul(mul(mass, mass), d), 2 * rowBytes)
    kappa = f64x2.pmax(kappa, v128.and(root, isClosed))
    yMax = f64x2.pmax(yMax, f64x2.abs(y))
    muMax = f64x2.pmax(muMax, f64x2.abs(mass))
    anyClosed = v128.or(anyClosed, isClosed)
    allClosed = v128.and(allClosed, isClosed)
  }
  store<f64>(slot, max(f64x2.extract_lane(kappa, 0), f64x2.extract_lane(kappa, 1)), kappaMaxAt)
  store<f64>(slot, max(f64x2.extract_lane(yMax, 0), f64x2.extract_lane(yMax, 1)), yBoundAt)
  store<f64>(slot, max(f64x2.extract_lane(muMax, 0), f64x2.extract_lane(muMax, 1)), muBoundAt)
  const kind = !v128.any_true(anyClosed) ? open : i64x2.all_true(allClosed) ? closed : mixed
  store<i32>(slot, kind, kindAt)
  if (kind != mixed) return
  for (let o: usize = 0; o <= last; o += 32) {
    const signs =
      i64x2.bitmask(f64x2.lt(v128.load(q + o), zero)) | (i64x2.bitmask(f64x2.lt(v128.load(q + o, 16), zero)) << 2)
    store<u8>(slot + (o >> 5), signs == 0 ? open : signs == 15 ? closed : mixed, kindsAt)
  }
}

// Four energies at a time, so that every constant is loaded once for two pairs.
function crossOpen(p: usize, end: usize, s: usize, w: f64): void {
  const ww = f64x2.splat(w)
  for (; p < end; p += 32) {
    const x0 = mul(v128.load(s), ww)
    const x1 = mul(v128.load(s, 16), ww)
    let c = C(0)
    let d = C(1)
    const t0 = sub(add(mul(x0, c), d), d)
    const t1 = sub(add(mul(x1, c), d), d)
    c = C(2)
    d = C(3)
    const r0 = sub(sub(x0, mul(t0, c)), mul(t0, d))
    const r1 = sub(sub(x1, mul(t1, c)), mul(t1, d))
    const a0 = mul(r0, r0)
    const a1 = mul(r1, r1)
    const b0 = mul(a0, a0)
    const b1 = mul(a1, a1)
    // Even and odd powers of a apart, each in powers of b = a².
    c = C(10)
    d = C(8)
    let e0 = add(d, mul(c, b0))
    let e1 = add(d, mul(c, b1))
    c = C(11)
    d = C(9)
    let f0 = add(d, mul(c, b0))
    let f1 = add(d, mul(c, b1))
    c = C(6)
    d = C(7)
    e0 = add(c, mul(e0, b0))
    e1 = add(c, mul(e1, b1))
    f0 = add(d, mul(f0, b0))
    f1 = add(d, mul(f1, b1))
    c = C(4)
    d = C(5)
    e0 = add(c, mul(e0, b0))
    e1 = add(c, mul(e1, b1))
    f0 = add(d, mul(f0, b0))
    f1 = add(d, mul(f1, b1))
    const s0 = add(r0, mul(mul(r0, a0), add(e0, mul(a0, f0))))
    const s1 = add(r1, mul(mul(r1, a1), add(e1, mul(a1, f1))))
    c = C(18)
    d = C(16)
    e0 = add(d, mul(c, b0))
    e1 = add(d, mul(c, b1))
    c = C(17)
    d = C(15)
    f0 = add(d, mul(c, b0))
    f1 = add(d, mul(c, b1))
    c = C(14)
    d = C(13)
    e0 = add(c, mul(e0, b0))
    e1 = add(c, mul(e1, b1))
    f0 = add(d, mul(f0, b0))
    f1 = add(d, mul(f1, b1))
    c = C(12)
    e0 = add(c, mul(e0, b0))
    e1 = add(c, mul(e1, b1))
    c = C(19)
    d = C(20)
    const c0 = sub(d, sub(mul(c, a0), mul(b0, add(e0, mul(a0, f0)))))
    const c1 = sub(d, sub(mul(c, a1), mul(b1, add(e1, mul(a1, f1)))))
    crossPair(p, c0, mul(v128.load(s, rowBytes), s0), mul(v128.load(s, 2 * rowBytes), s0))
    crossPair(p + 16, c1, mul(v128.load(s, rowBytes + 16), s1), mul(v128.load(s, 2 * rowBytes + 16), s1))
    s += 32
  }
}

// The matrix [c, -down; up, c] applied to both vectors of a pair of energies.
@inline function crossPair(p: usize, c: v128, up: v128, down: v128): void {
  const u1 = v128.load(p)
  const v1 = v128.load(p, rowBytes)
  v128.store(p, sub(mul(c, u1), mul(down, v1)))
  v128.store(p, add(mul(up, u1), mul(c, v1)), rowBytes)
  const u2 = v128.load(p, 2 * rowBytes)
  const v2 = v128.load(p, 3 * rowBytes)
  v128.store(p, sub(mul(c, u2), mul(down, v2)), 2 * rowBytes)
  v128.store(p, add(mul(up, u2), mul(c, v2)), 3 * rowBytes)
}

// The same with [c, -down; -up, c].
@inline function crossPairClosed(p: usize, c: v128, up: v128, down: v128): void {
  const u1 = v128.load(p)
  const v1 = v128.load(p, rowBytes)
  v128.store(p, sub(mul(c, u1), mul(down, v1)))
  v128.store(p, sub(mul(c, v1), mul(up, u1)), rowBytes)
  const u2 = v128.load(p, 2 * rowBytes)
  const v2 = v128.load(p, 3 * rowBytes)
  v128.store(p, sub(mul(c, u2), mul(down, v2)), 2 * rowBytes)
  v128.store(p, sub(mul(c, v2), mul(up, u2)), 3 * rowBytes)
}

function crossClosed(p: usize, end: usize, s: usize, w: f64): void {
  const ww = f64x2.splat(w)
  for (; p < end; p += 32) {
    const x0 = mul(v128.load(s), ww)
    const x1 = mul(v128.load(s, 16), ww)
    let c = C(21)
    let d = C(1)
    const n0 = add(mul(x0, c), d)
    const n1 = add(mul(x1, c), d)
    const t0 = sub(n0, d)
    const t1 = sub(n1, d)
    c = C(22)
    d = C(23)
    const r0 = sub(sub(x0, mul(t0, c)), mul(t0, d))
    const r1 = sub(sub(x1, mul(t1, c)), mul(t1, d))
    const a0 = mul(r0, r0)
    const a1 = mul(r1, r1)
    const b0 = mul(a0, a0)
    const b1 = mul(a1, a1)
    c = C(27)
    d = C(26)
    let e0 = add(d, mul(a0, c))
    let e1 = add(d, mul(a1, c))
    c = C(28)
    e0 = add(e0, mul(b0, c))
    e1 = add(e1, mul(b1, c))
    c = C(25)
    d = C(24)
    const o0 = add(r0, mul(mul(r0, a0), add(add(d, mul(a0, c)), mul(e0, b0))))
    const o1 = add(r1, mul(mul(r1, a1), add(add(d, mul(a1, c)), mul(e1, b1))))
    c = C(32)
    d = C(31)
    e0 = add(d, mul(a0, c))
    e1 = add(d, mul(a1, c))
    c = C(33)
    e0 = add(e0, mul(b0, c))
    e1 = add(e1, mul(b1, c))
    c = C(30)
    d = C(29)
    e0 = add(add(d, mul(a0, c)), mul(e0, b0))
    e1 = add(add(d, mul(a1, c)), mul(e1, b1))
    c = C(19)
    d = C(20)
    e0 = add(d, add(mul(c, a0), mul(b0, e0)))
    e1 = add(d, add(mul(c, a1), mul(b1, e1)))
    const m0 = i64x2.shl(n0, 52)
    const m1 = i64x2.shl(n1, 52)
    const p0 = i64x2.add(c, m0)
    const p1 = i64x2.add(c, m1)
    const q0 = i64x2.sub(c, m0)
    const q1 = i64x2.sub(c, m1)
    const h0 = add(p0, q0)
    const h1 = add(p1, q1)
    const d0 = sub(p0, q0)
    const d1 = sub(p1, q1)
    const s0 = add(mul(e0, d0), mul(o0, h0))
    const s1 = add(mul(e1, d1), mul(o1, h1))
    const c0 = add(mul(e0, h0), mul(o0, d0))
    const c1 = add(mul(e1, h1), mul(o1, d1))
    crossPairClosed(p, c0, mul(v128.load(s, rowBytes), s0), mul(v128.load(s, 2 * rowBytes), s0))
    crossPairClosed(p + 16, c1, mul(v128.load(s, rowBytes + 16), s1), mul(v128.load(s, 2 * rowBytes + 16), s1))
    s += 32
  }
}

// A block with a band edge in it: runs of four energies of one kind, and both kinds for the four at the edge.
function crossMixed(slot: usize, q: usize, w: f64, n: i32): void {
  const end = state + (<usize>n << 3)
  let p = state
  while (p < end) {
    const kind = load<u8>(slot + ((p - state) >> 5), kindsAt)
    let to = p + 32
    while (to < end && load<u8>(slot + ((to - state) >> 5), kindsAt) == kind) to += 32
    const s = slot + (p - state)
    if (kind == open) crossOpen(p, to, s, w)
    else if (kind == closed) crossClosed(p, to, s, w)
    else crossBoth(p, to, s, q + (p - state), w, false)
    p = to
  }
}

// Both kinds computed and one of them taken. `thick`: kw may pass 300, and the matrix is divided by 2^n where q < 0, n
// added to the shift.
function crossBoth(p: usize, end: usize, s: usize, q: usize, w: f64, thick: bool): void {
  const ww = f64x2.splat(w)
  const zero = f64x2.splat(0)
  const half = f64x2.splat(0.5)
  for (; p < end; p += 16) {
    const isClosed = f64x2.lt(v128.load(q), zero)
    const x = mul(v128.load(s), ww)
    let t = sub(add(mul(x, C(0)), C(1)), C(1))
    let r = sub(sub(x, mul(t, C(2))), mul(t, C(3)))
    let a = mul(r, r)
    let b = mul(a, a)
    let e = add(C(4), mul(add(C(6), mul(add(C(8), mul(C(10), b)), b)), b))
    let f = add(C(5), mul(add(C(7), mul(add(C(9), mul(C(11), b)), b)), b))
    const sine = add(r, mul(mul(r, a), add(e, mul(a, f))))
    e = add(C(12), mul(add(C(14), mul(add(C(16), mul(C(18), b)), b)), b))
    f = add(C(13), mul(add(C(15), mul(C(17), b)), b))
    const cosine = sub(C(20), sub(mul(C(19), a), mul(b, add(e, mul(a, f)))))
    const shifted = add(mul(x, C(21)), C(1))
    t = sub(shifted, C(1))
    r = sub(sub(x, mul(t, C(22))), mul(t, C(23)))
    a = mul(r, r)
    b = mul(a, a)
    e = add(add(C(26), mul(a, C(27))), mul(b, C(28)))
    const odd = add(r, mul(mul(r, a), add(add(C(24), mul(a, C(25))), mul(e, b))))
    e = add(add(C(31), mul(a, C(32))), mul(b, C(33)))
    e = add(add(C(29), mul(a, C(30))), mul(e, b))
    const even = add(C(20), add(mul(C(19), a), mul(b, e)))
    let rise = half
    let fall = zero
    if (thick) {
      const small = f64x2.lt(t, f64x2.splat(511))
      fall = v128.and(i64x2.sub(half, i64x2.shl(shifted, 53)), small)
      v128.store(p, add(v128.load(p, 4 * rowBytes), v128.and(t, isClosed)), 4 * rowBytes)
    } else {
      const bits = i64x2.shl(shifted, 52)
      rise = i64x2.add(half, bits)
      fall = i64x2.sub(half, bits)
    }
    const h = add(rise, fall)
    const d = sub(rise, fall)
    const c = v128.bitselect(add(mul(even, h), mul(odd, d)), cosine, isClosed)
    const sn = v128.bitselect(add(mul(even, d), mul(odd, h)), sine, isClosed)
    const product = mul(v128.load(s, rowBytes), sn)
    crossPair(p, c, v128.bitselect(f64x2.neg(product), product, isClosed), mul(v128.load(s, 2 * rowBytes), sn))
    s += 16
    q += 16
  }
}

function renormalise(n: i32): void {
  const end = state + (<usize>n << 3)
  const mask = i64x2.splat(0x7ff)
  const top = i64x2.splat(2046)
  // Adding these bits to a small integer's makes the double 2^52 + integer.
  const integer = i64x2.splat(0x4330000000000000)
  const zeroAt = f64x2.splat(4503599627370496.0 + 1023.0)
  for (let p = state; p < end; p += 16) {
    const u1 = v128.load(p)
    const v1 = v128.load(p, rowBytes)
    const u2 = v128.load(p, 2 * rowBytes)
    const v2 = v128.load(p, 3 * rowBytes)
    const size = f64x2.max(f64x2.max(f64x2.abs(u1), f64x2.abs(v1)), f64x2.max(f64x2.abs(u2), f64x2.abs(v2)))
    const biased = v128.and(i64x2.shr_u(size, 52), mask)
    const scale = i64x2.shl(i64x2.sub(top, biased), 52)
    v128.store(p, mul(u1, scale))
    v128.store(p, mul(v1, scale), rowBytes)
    v128.store(p, mul(u2, scale), 2 * rowBytes)
    v128.store(p, mul(v2, scale), 3 * rowBytes)
    const exponent = sub(v128.or(biased, integer), zeroAt)
    v128.store(p, add(v128.load(p, 4 * rowBytes), exponent), 4 * rowBytes)
  }
}

function finish(near: i32, first: i32, n: i32, withLog: bool): v128 {
  const zero = f64x2.splat(0)
  const one = f64x2.splat(1)
  const four = f64x2.splat(4)
  let worst = zero
  const qn = qBase + ((<usize>near * <usize>points + <usize>first) << 3)
  const mun = muBase + ((<usize>near * <usize>points + <usize>first) << 3)
  const T = TBase + (<usize>first << 3)
  const R = RBase + (<usize>first << 3)
  const L = logBase + (<usize>first << 3)
  const end = <usize>n << 3
  for (let o: usize = 0; o < end; o += 16) {
    const p = state + o
    const square = v128.load(qn + o)
    const isOpen = f64x2.gt(square, zero)
    const Y = f64x2.div(f64x2.sqrt(square), v128.load(mun + o))
    const Yfar = v128.load(p, 5 * rowBytes)
    const x = mul(Y, v128.load(p))
    const y = mul(Y, v128.load(p, 2 * rowBytes))
    const v1 = v128.load(p, rowBytes)
    const v2 = v128.load(p, 3 * rowBytes)
    const ar = add(x, v2)
    const ai = sub(y, v1)
    const br = sub(x, v2)
    const bi = add(y, v1)
    const a = add(mul(ar, ar), mul(ai, ai))
    const ratio = f64x2.div(mul(four, mul(Y, Yfar)), a)
    const r = f64x2.div(add(mul(br, br), mul(bi, bi)), a)
    const shift = v128.load(p, 4 * rowBytes)
    let t = ratio
    if (v128.any_true(f64x2.ne(shift, zero))) {
      t = f64x2.replace_lane(t, 0, scaled(f64x2.extract_lane(t, 0), -2 * f64x2.extract_lane(shift, 0)))
      t = f64x2.replace_lane(t, 1, scaled(f64x2.extract_lane(t, 1), -2 * f64x2.extract_lane(shift, 1)))
    }
    v128.store(T + o, t)
    v128.store(R + o, r)
    // A closed lead leaves NaN, by whatever the square root gave.
    let flux = v128.bitselect(f64x2.abs(sub(add(t, r), one)), f64x2.splat(NaN), isOpen)
    if (o + 8 == end) flux = f64x2.splat(f64x2.extract_lane(flux, 0))
    worst = f64x2.max(worst, flux)
    if (withLog) {
      store<f64>(L + o, decimal(f64x2.extract_lane(ratio, 0), f64x2.extract_lane(shift, 0)))
      store<f64>(L + o + 8, decimal(f64x2.extract_lane(ratio, 1), f64x2.extract_lane(shift, 1)))
    }
  }
  return worst
}

@inline function powerOfTwo(n: i32): f64 {
  return reinterpret<f64>((<i64>n + 1023) << 52)
}

// x 2^n as `scaleByPowerOfTwo`.
function scaled(x: f64, n: f64): f64 {
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

// log10(x) - 2 shift log10(2), as `log10` of elementary.ts.
function decimal(x: f64, shift: f64): f64 {
  const below = 2 * shift * 0.3010299956639812
  if (!(x > 0) || x == Infinity) return (x == 0 ? -Infinity : x > 0 ? x : NaN) - below
  let y = x
  let k = 0
  if (y < 2.2250738585072014e-308) {
    y *= 18014398509481984.0
    k = -54
  }
  const bits = reinterpret<i64>(y)
  const word = <i32>(bits >> 32)
  const carry = ((word & 0xfffff) + 0x95f64) & 0x100000
  k += (word >> 20) - 1023 + (carry >> 20)
  const high = (word & 0xfffff) | (carry ^ 0x3ff00000)
  const f = reinterpret<f64>((<i64>high << 32) | (bits & 0xffffffff)) - 1
  const s = f / (2 + f)
  const w = s * s
  const tail =
    w *
    (0.666666666666667 +
      w *
        (0.3999999999989938 +
          w *
            (0.28571428626031065 +
              w *
                (0.2222221112572281 +
                  w * (0.18182889786191042 + w * (0.15331699633543858 + w * 0.14616721179861816))))))
  const half = 0.5 * f * f
  const mantissa = f - (half - s * (half + tail))
  return <f64>k * 0.30102999566361177 + (<f64>k * 3.694239077158931e-13 + mantissa * 0.4342944819032518) - below
}

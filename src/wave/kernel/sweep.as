/** AssemblyScript. The two vectors of a block of energies on their way across the layers: the twin of `sweep.ts`. */
import {
  C, add, closed, exponentOf, kappaMaxAt, kindAt, kindsAt, mul, muBoundAt, muRow, open, qRow, rowBytes, state, sub, yBoundAt,
} from './layout'

@inline export function isThick(slot: usize, w: f64): bool { return load<f64>(slot, kappaMaxAt) * w > 300 }

/** Log2 of what one layer may multiply or divide the size of a vector by, as in `sweep.ts`. */
export function growth(slot: usize, w: f64): f64 {
  const exponential = isThick(slot, w) ? 0 : load<f64>(slot, kappaMaxAt) * w * 1.5
  return (
    exponential +
    4 +
    <f64>exponentOf(1 + load<f64>(slot, muBoundAt) * w) +
    <f64>exponentOf(load<f64>(slot, yBoundAt))
  )
}

/** Carries the vectors of n energies across a layer of width w. */
export function cross(slot: usize, q: usize, w: f64, n: i32): void {
  const kind = load<i32>(slot, kindAt)
  const end = state + (<usize>n << 3)
  if (kind == open) crossOpen(state, end, slot, w)
  else if (isThick(slot, w)) crossBoth(state, end, slot, q, w, true)
  else if (kind == closed) crossClosed(state, end, slot, w)
  else crossMixed(slot, q, w, n)
}

/** Start vectors in the far lead (`far` < 0: a hard wall), as `startVectors`. */
export function start(far: i32, first: i32, n: i32): void {
  const zero = f64x2.splat(0)
  const one = f64x2.splat(1)
  const q = qRow(max(far, 0), first)
  const mu = muRow(max(far, 0), first)
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
@inline export function crossPair(p: usize, c: v128, up: v128, down: v128): void {
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
@inline export function crossPairClosed(p: usize, c: v128, up: v128, down: v128): void {
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

/** Largest component of every energy to 1..2 by a power of two, which is kept as the factor. */
export function renormalise(n: i32): void {
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
    v128.store(p, scale, 6 * rowBytes)
  }
}


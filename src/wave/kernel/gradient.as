/**
 * AssemblyScript. T and its derivatives by every width, q and mu: the same operations in the same order as
 * `plainGradient`. A block of `stride` energies at a time, so that the store of the forward sweep stays in the second cache.
 */
import {
  C, TBase, add, closed, dMuBase, dQBase, dWBase, factorBase, kindAt, layers, mediumOf, mul, muRow, open, points, qRow,
  rowBytes, scaled, state, storeBase, storeRows, stride, sub, widthOf,
} from './layout'
import { assign, beginMedia, slotOf } from './media'
import { crossPair, crossPairClosed, growth, isThick, renormalise, start } from './sweep'

const factorRow: usize = 6 * rowBytes
const guRow: usize = 7 * rowBytes
const gvRow: usize = 8 * rowBytes
const huRow: usize = 9 * rowBytes
const hvRow: usize = 10 * rowBytes
const TRow: usize = 11 * rowBytes

/** Slots for the media of the stack: once before the blocks. */
export function gradientBegin(): void {
  assign()
}

/** The block from `first` on; false where a point must be refused. */
export function gradientBlock(near: i32, far: i32, first: i32): bool {
  const n = min(stride, points - first)
  beginMedia()
  forward(far, first, n)
  const good = startRow(near, first, n)
  backward(first, n)
  return good
}

@inline function lane(): usize { return <usize>stride << 3 }
@inline function storeAt(j: i32): usize { return storeBase + <usize>j * storeRows * lane() }
@inline function factorAt(j: i32): usize { return factorBase + <usize>j * lane() }
@inline function flagAt(j: i32): usize { return factorBase + <usize>(layers + 1) * lane() + (<usize>j << 2) }

function forward(far: i32, first: i32, n: i32): void {
  start(far, first, n)
  let grown = 0.0
  for (let j = layers - 1; j >= 0; j--) {
    const m = mediumOf(j)
    const w = widthOf(j)
    const slot = slotOf(m, first, n, true)
    const bound = growth(slot, w)
    if (grown + bound > 400) {
      rescale(j + 1, n)
      grown = 0
    } else store<i32>(flagAt(j + 1), 0)
    grown += bound
    const kind = load<i32>(slot, kindAt)
    const to = storeAt(j)
    const thick = isThick(slot, w)
    if (kind == open) layerOpen(to, slot, w, n)
    else if (kind == closed && !thick) layerClosed(to, slot, w, n)
    else layerMixed(to, slot, qRow(m, first), w, n, thick)
  }
  if (grown > 0) rescale(0, n)
  else store<i32>(flagAt(0), 0)
}

function rescale(at: i32, n: i32): void {
  renormalise(n)
  store<i32>(flagAt(at), 1)
  const end = <usize>n << 3
  for (let o: usize = 0; o < end; o += 16) v128.store(factorAt(at) + o, v128.load(state + o, factorRow))
}

// P and G of s = r (1 + a P), c = 1 - a/2 + a² G, q >= 0; b = a².
@inline function sineTail(a: v128, b: v128): v128 {
  const e = add(C(4), mul(add(C(6), mul(add(C(8), mul(C(10), b)), b)), b))
  const f = add(C(5), mul(add(C(7), mul(add(C(9), mul(C(11), b)), b)), b))
  return add(e, mul(a, f))
}
@inline function cosineTail(a: v128, b: v128): v128 {
  const e = add(C(12), mul(add(C(14), mul(add(C(16), mul(C(18), b)), b)), b))
  const f = add(C(13), mul(add(C(15), mul(C(17), b)), b))
  return add(e, mul(a, f))
}
// The same of s = r (1 + a P), c = 1 + a/2 + a² G, q < 0.
@inline function sinhTail(a: v128, b: v128): v128 {
  const e = add(add(C(26), mul(a, C(27))), mul(b, C(28)))
  return add(add(C(24), mul(a, C(25))), mul(e, b))
}
@inline function coshTail(a: v128, b: v128): v128 {
  const e = add(add(C(31), mul(a, C(32))), mul(b, C(33)))
  return add(add(C(29), mul(a, C(30))), mul(e, b))
}

// What is stored of a pair before it crosses a layer: the vectors, c, S and dS/dq, seven rows from `to` on.
@inline function keep(to: usize, p: usize, c: v128, S: v128, g: v128): void {
  const step = lane()
  v128.store(to, v128.load(p))
  v128.store(to + step, v128.load(p, rowBytes))
  v128.store(to + 2 * step, v128.load(p, 2 * rowBytes))
  v128.store(to + 3 * step, v128.load(p, 3 * rowBytes))
  v128.store(to + 4 * step, c)
  v128.store(to + 5 * step, S)
  v128.store(to + 6 * step, g)
}

// A pair where q >= 0 across a layer.
@inline function pairOpen(to: usize, p: usize, s: usize, ww: v128, halfCube: v128): void {
  const x = mul(v128.load(s), ww)
  const t = sub(add(mul(x, C(0)), C(1)), C(1))
  const r = sub(sub(x, mul(t, C(2))), mul(t, C(3)))
  const a = mul(r, r)
  const b = mul(a, a)
  const P = sineTail(a, b)
  const G = cosineTail(a, b)
  const sn = add(r, mul(mul(r, a), P))
  const cs = sub(C(20), sub(mul(C(19), a), mul(b, G)))
  const per = v128.load(s, 3 * rowBytes)
  const series = mul(halfCube, sub(sub(mul(a, G), P), C(19)))
  const S = mul(sn, per)
  const direct = mul(sub(mul(ww, cs), S), v128.load(s, 6 * rowBytes))
  keep(to, p, cs, S, v128.bitselect(series, direct, f64x2.eq(t, f64x2.splat(0))))
  crossPair(p, cs, mul(v128.load(s, rowBytes), sn), mul(v128.load(s, 2 * rowBytes), sn))
}

// The same where q < 0.
@inline function pairClosed(to: usize, p: usize, s: usize, ww: v128, halfCube: v128): void {
  const x = mul(v128.load(s), ww)
  const shifted = add(mul(x, C(21)), C(1))
  const t = sub(shifted, C(1))
  const r = sub(sub(x, mul(t, C(22))), mul(t, C(23)))
  const a = mul(r, r)
  const b = mul(a, a)
  const P = sinhTail(a, b)
  const G = coshTail(a, b)
  const odd = add(r, mul(mul(r, a), P))
  const even = add(C(20), add(mul(C(19), a), mul(b, G)))
  const half = f64x2.splat(0.5)
  const bits = i64x2.shl(shifted, 52)
  const rise = i64x2.add(half, bits)
  const fall = i64x2.sub(half, bits)
  const h = add(rise, fall)
  const d = sub(rise, fall)
  const ch = add(mul(even, h), mul(odd, d))
  const sh = add(mul(even, d), mul(odd, h))
  const per = v128.load(s, 3 * rowBytes)
  const series = mul(f64x2.neg(halfCube), add(sub(mul(a, G), P), C(19)))
  const S = mul(sh, per)
  const direct = mul(sub(mul(ww, ch), S), v128.load(s, 6 * rowBytes))
  keep(to, p, ch, S, v128.bitselect(series, direct, f64x2.eq(t, f64x2.splat(0))))
  crossPairClosed(p, ch, mul(v128.load(s, rowBytes), sh), mul(v128.load(s, 2 * rowBytes), sh))
}

function layerOpen(to: usize, slot: usize, w: f64, n: i32): void {
  const ww = f64x2.splat(w)
  const halfCube = f64x2.splat(0.5 * w * w * w)
  const end = <usize>n << 3
  for (let o: usize = 0; o < end; o += 16) pairOpen(to + o, state + o, slot + o, ww, halfCube)
}

function layerClosed(to: usize, slot: usize, w: f64, n: i32): void {
  const ww = f64x2.splat(w)
  const halfCube = f64x2.splat(0.5 * w * w * w)
  const end = <usize>n << 3
  for (let o: usize = 0; o < end; o += 16) pairClosed(to + o, state + o, slot + o, ww, halfCube)
}

// A band edge in the block: pairs of one kind are told apart, both kinds computed for a pair on the edge. Or a thick layer:
// both kinds computed for all, the matrix divided by 2^n where q < 0, n added to the shift.
function layerMixed(to: usize, slot: usize, q: usize, w: f64, n: i32, thick: bool): void {
  const ww = f64x2.splat(w)
  const halfCube = f64x2.splat(0.5 * w * w * w)
  const end = <usize>n << 3
  for (let o: usize = 0; o < end; o += 16) {
    const isClosed = f64x2.lt(v128.load(q + o), f64x2.splat(0))
    const signs = i64x2.bitmask(isClosed)
    if (thick || signs == 1 || signs == 2) pairBoth(to + o, state + o, slot + o, ww, halfCube, isClosed, thick)
    else if (signs == 0) pairOpen(to + o, state + o, slot + o, ww, halfCube)
    else pairClosed(to + o, state + o, slot + o, ww, halfCube)
  }
}

function pairBoth(to: usize, p: usize, s: usize, ww: v128, halfCube: v128, isClosed: v128, thick: bool): void {
  const x = mul(v128.load(s), ww)
  const per = v128.load(s, 3 * rowBytes)
  let t = sub(add(mul(x, C(0)), C(1)), C(1))
  let r = sub(sub(x, mul(t, C(2))), mul(t, C(3)))
  let a = mul(r, r)
  let b = mul(a, a)
  let P = sineTail(a, b)
  let G = cosineTail(a, b)
  const sn = add(r, mul(mul(r, a), P))
  const cs = sub(C(20), sub(mul(C(19), a), mul(b, G)))
  let series = mul(halfCube, sub(sub(mul(a, G), P), C(19)))
  let direct = mul(sub(mul(ww, cs), mul(sn, per)), v128.load(s, 6 * rowBytes))
  const gOpen = v128.bitselect(series, direct, f64x2.eq(t, f64x2.splat(0)))
  const shifted = add(mul(x, C(21)), C(1))
  t = sub(shifted, C(1))
  r = sub(sub(x, mul(t, C(22))), mul(t, C(23)))
  a = mul(r, r)
  b = mul(a, a)
  P = sinhTail(a, b)
  G = coshTail(a, b)
  const odd = add(r, mul(mul(r, a), P))
  const even = add(C(20), add(mul(C(19), a), mul(b, G)))
  let rise = f64x2.splat(0.5)
  let fall: v128
  if (thick) {
    fall = v128.and(i64x2.sub(rise, i64x2.shl(shifted, 53)), f64x2.lt(t, f64x2.splat(511)))
    v128.store(p, add(v128.load(p, 4 * rowBytes), v128.and(t, isClosed)), 4 * rowBytes)
  } else {
    const bits = i64x2.shl(shifted, 52)
    fall = i64x2.sub(rise, bits)
    rise = i64x2.add(rise, bits)
  }
  const h = add(rise, fall)
  const d = sub(rise, fall)
  const ch = add(mul(even, h), mul(odd, d))
  const sh = add(mul(even, d), mul(odd, h))
  series = mul(f64x2.neg(halfCube), add(sub(mul(a, G), P), C(19)))
  direct = mul(sub(mul(ww, ch), mul(sh, per)), v128.load(s, 6 * rowBytes))
  const gClosed = v128.bitselect(series, direct, f64x2.eq(t, f64x2.splat(0)))
  const c = v128.bitselect(ch, cs, isClosed)
  const both = v128.bitselect(sh, sn, isClosed)
  keep(to, p, c, mul(both, per), v128.bitselect(gClosed, gOpen, isClosed))
  const up = mul(v128.load(s, rowBytes), both)
  crossPair(p, c, v128.bitselect(f64x2.neg(up), up, isClosed), mul(v128.load(s, 2 * rowBytes), both))
}

// T and the row d ln D; false where the near lead is closed or T is not finite.
function startRow(near: i32, first: i32, n: i32): bool {
  const zero = f64x2.splat(0)
  const two = f64x2.splat(2)
  const qn = qRow(near, first)
  const mun = muRow(near, first)
  const end = <usize>n << 3
  let good = true
  for (let o: usize = 0; o < end; o += 16) {
    const p = state + o
    const square = v128.load(qn + o)
    const Y = f64x2.div(f64x2.sqrt(square), v128.load(mun + o))
    const Yfar = v128.load(p, 5 * rowBytes)
    const ar = add(mul(Y, v128.load(p)), v128.load(p, 3 * rowBytes))
    const ai = sub(mul(Y, v128.load(p, 2 * rowBytes)), v128.load(p, rowBytes))
    const a = add(mul(ar, ar), mul(ai, ai))
    let T = f64x2.div(mul(f64x2.splat(4), mul(Y, Yfar)), a)
    const shift = v128.load(p, 4 * rowBytes)
    if (v128.any_true(f64x2.ne(shift, zero))) {
      T = f64x2.replace_lane(T, 0, scaled(f64x2.extract_lane(T, 0), -2 * f64x2.extract_lane(shift, 0)))
      T = f64x2.replace_lane(T, 1, scaled(f64x2.extract_lane(T, 1), -2 * f64x2.extract_lane(shift, 1)))
    }
    v128.store(TBase + (<usize>first << 3) + o, T)
    v128.store(p, T, TRow)
    const right = v128.and(f64x2.gt(square, zero), f64x2.lt(T, f64x2.splat(Infinity)))
    const signs = i64x2.bitmask(right)
    if (signs != 3 && !(o + 8 == end && (signs & 1) != 0)) good = false
    const twice = f64x2.div(two, a)
    v128.store(p, mul(mul(twice, ar), Y), guRow)
    v128.store(p, f64x2.neg(mul(twice, ai)), gvRow)
    v128.store(p, mul(mul(twice, ai), Y), huRow)
    v128.store(p, mul(twice, ar), hvRow)
  }
  return good
}

function backward(first: i32, n: i32): void {
  if (load<i32>(flagAt(0)) == 1) scaleRow(0, n)
  for (let j = 0; j < layers; j++) {
    const m = mediumOf(j)
    derive(j, slotOf(m, first, n, true), qRow(m, first), muRow(m, first), widthOf(j), n)
    if (load<i32>(flagAt(j + 1)) == 1) scaleRow(j + 1, n)
  }
}

// The derivatives of one layer, and the row carried across it. The names are those of `plainGradient`.
function derive(j: i32, slot: usize, q: usize, muAt: usize, w: f64, n: i32): void {
  const ww = f64x2.splat(w)
  const step = lane()
  const across = <usize>layers << 3
  const end = <usize>n << 3
  const from = storeAt(j)
  let to = <usize>j << 3
  for (let o: usize = 0; o < end; o += 16) {
    const p = state + o
    const s = slot + o
    const at = from + o
    const mu = v128.load(muAt + o)
    const cos = v128.load(at + 4 * step)
    const S = v128.load(at + 5 * step)
    const down = mul(mu, S)
    const up = mul(v128.load(s, 5 * rowBytes), S)
    const gu = v128.load(p, guRow)
    const gv = v128.load(p, gvRow)
    const hu = v128.load(p, huRow)
    const hv = v128.load(p, hvRow)
    const a1 = v128.load(at)
    const b1 = v128.load(at + step)
    const a2 = v128.load(at + 2 * step)
    const b2 = v128.load(at + 3 * step)
    const byCos = add(add(mul(gu, a1), mul(gv, b1)), add(mul(hu, a2), mul(hv, b2)))
    const byDown = add(mul(gu, b1), mul(hu, b2))
    const byUp = add(mul(gv, a1), mul(hv, a2))
    const alpha = mul(byUp, v128.load(s, 4 * rowBytes))
    const beta = mul(mu, byDown)
    const delta = sub(mul(cos, alpha), mul(S, byCos))
    const T = v128.load(p, TRow)
    const minusT = f64x2.neg(T)
    const dW = mul(minusT, sub(mul(v128.load(q + o), delta), mul(cos, beta)))
    const ofQ = sub(mul(C(19), add(mul(S, alpha), mul(ww, delta))), mul(v128.load(at + 6 * step), beta))
    const dQ = mul(minusT, ofQ)
    const dMu = mul(T, add(mul(S, byDown), mul(up, alpha)))
    store<f64>(dWBase + to, f64x2.extract_lane(dW, 0))
    store<f64>(dQBase + to, f64x2.extract_lane(dQ, 0))
    store<f64>(dMuBase + to, f64x2.extract_lane(dMu, 0))
    to += across
    store<f64>(dWBase + to, f64x2.extract_lane(dW, 1))
    store<f64>(dQBase + to, f64x2.extract_lane(dQ, 1))
    store<f64>(dMuBase + to, f64x2.extract_lane(dMu, 1))
    to += across
    v128.store(p, add(mul(gu, cos), mul(gv, up)), guRow)
    v128.store(p, sub(mul(gv, cos), mul(gu, down)), gvRow)
    v128.store(p, add(mul(hu, cos), mul(hv, up)), huRow)
    v128.store(p, sub(mul(hv, cos), mul(hu, down)), hvRow)
  }
}

function scaleRow(at: i32, n: i32): void {
  const end = <usize>n << 3
  for (let o: usize = 0; o < end; o += 16) {
    const scale = v128.load(factorAt(at) + o)
    for (let row: usize = guRow; row <= hvRow; row += rowBytes) {
      const p = state + o + row
      v128.store(p, mul(v128.load(p), scale))
    }
  }
}

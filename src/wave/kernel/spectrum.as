/**
 * AssemblyScript. The spectrum of lossless stacks, two energies to a register: the same operations in the same order as
 * `plainSpectrum`, so the same bits (no fused multiply-add, no relaxed instruction). Layers run outside, energies inside,
 * in blocks of 128 that stay in the first cache.
 */
import {
  RBase, TBase, add, block, layers, logBase, mediumOf, mul, muRow, points, qRow, rowBytes, scaled, state, sub, widthOf,
} from './layout'
import { assign, beginMedia, slotOf } from './media'
import { cross, growth, renormalise, start } from './sweep'

/**
 * T, R and, if asked for, log10 T of all points. `far` < 0: a hard wall. `backwards`: the wave comes from the exit.
 * Returns the largest |T + R - 1|; NaN where a point must be refused.
 */
export function spectrum(near: i32, far: i32, backwards: bool, withLog: bool): f64 {
  assign()
  let worst = f64x2.splat(0)
  for (let first = 0; first < points; first += block) {
    const n = min(block, points - first)
    sweep(far, backwards, first, n)
    worst = f64x2.max(worst, finish(near, first, n, withLog))
  }
  return max(f64x2.extract_lane(worst, 0), f64x2.extract_lane(worst, 1))
}

function sweep(far: i32, backwards: bool, first: i32, n: i32): void {
  beginMedia()
  start(far, first, n)
  let grown = 0.0
  for (let step = 0; step < layers; step++) {
    const j = backwards ? step : layers - 1 - step
    const m = mediumOf(j)
    const w = widthOf(j)
    const slot = slotOf(m, first, n, false)
    const bound = growth(slot, w)
    if (grown + bound > 900) {
      renormalise(n)
      grown = 0
    }
    grown += bound
    cross(slot, qRow(m, first), w, n)
  }
  if (grown > 400) renormalise(n)
}

function finish(near: i32, first: i32, n: i32, withLog: bool): v128 {
  const zero = f64x2.splat(0)
  const one = f64x2.splat(1)
  const four = f64x2.splat(4)
  let worst = zero
  const qn = qRow(near, first)
  const mun = muRow(near, first)
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

/** AssemblyScript. What the layers of one medium share within a block: the twin of `BlockMedia`. */
import {
  C, closed, filled, kappaMaxAt, kindAt, kindsAt, layers, mediaCount, mediumOf, mixed, mul, muBoundAt, muRow, open,
  qRow, rowBytes, slotBytes, slots, uses, yBoundAt,
} from './layout'

let slotCount: i32 = 1

/** Media of several layers get a slot each; those of one share slot 0. */
export function assign(): void {
  for (let m = 0; m < mediaCount; m++) store<i32>(uses + (<usize>m << 2), 0)
  for (let j = 0; j < layers; j++) {
    const at = uses + (<usize>mediumOf(j) << 2)
    store<i32>(at, load<i32>(at) + 1)
  }
  slotCount = 1
  for (let m = 0; m < mediaCount; m++) {
    const at = uses + (<usize>m << 2)
    store<i32>(at, load<i32>(at) > 1 ? slotCount++ : 0)
  }
}

/** Forgets the previous block. */
export function beginMedia(): void {
  for (let i = 0; i < slotCount; i++) store<i32>(filled + (<usize>i << 2), 0)
}

/** The slot of medium m, filled for n points from `first` on; with what derivatives need if `slopes`. */
export function slotOf(m: i32, first: i32, n: i32, slopes: bool): usize {
  const number = load<i32>(uses + (<usize>m << 2))
  const slot = slots + <usize>number * slotBytes
  const flag = filled + (<usize>number << 2)
  if (number == 0 || load<i32>(flag) == 0) {
    store<i32>(flag, 1)
    fill(slot, qRow(m, first), muRow(m, first), n, slopes)
  }
  return slot
}

// k, y = k/mu and z = mu/k of a medium, its bounds and its kind, over n points.
function fill(slot: usize, q: usize, mu: usize, n: i32, slopes: bool): void {
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
    if (slopes) {
      const perK = mul(mass, d)
      const sign = v128.and(isClosed, f64x2.splat(-0.0))
      v128.store(slot + o, perK, 3 * rowBytes)
      v128.store(slot + o, mul(root, d), 4 * rowBytes)
      v128.store(slot + o, v128.xor(mul(y, root), sign), 5 * rowBytes)
      v128.store(slot + o, v128.xor(mul(C(19), mul(perK, perK)), sign), 6 * rowBytes)
    }
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


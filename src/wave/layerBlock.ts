import type { MediaTable, WaveStack } from './types.js'

/**
 * Layer functions for a block of energies. For a layer of width w in a medium with k = sqrt|q|, y = k/mu, z = mu/k
 *
 *   [u]        [   c    -z s ] [u]         c, s = cos kw, sin kw   and sign +   where q >= 0
 *   [v]left  = [ ±y s     c  ] [v]right    c, s = cosh kw, sinh kw and sign -   where q < 0
 *
 * |q| below 1e-200 counts as 1e-200: z s is then mu w and y s nothing, the limit at a band edge without a special case.
 * The angle is reduced modulo pi, which may turn the sign of a whole matrix: T, R and their derivatives do not see it.
 * sinh and cosh come from their odd and even series at r = kw - n ln 2 and from 2^n, 2^-n. Where kw may pass 300 in a
 * block, the matrix is divided by 2^n and n added to the energy's shift: the mantissas are the same bits either way.
 *
 * Polynomials: interpolation at Chebyshev nodes in 60 digits, absolute error below 1e-16. Every operation stands for
 * itself (no fused multiply-add) and no energy looks at another one, so that a kernel of two lanes can do the same.
 */

export const blockSize = 128

/** Widest kw whose matrix is taken undivided: cosh 300 = 2^432. */
export const thickest = 300

/** Media that more than one layer uses keep a slot for the whole block; the others share slot 0, filled just in time. */
export class BlockMedia {
  k = new Float64Array(blockSize)
  y = new Float64Array(blockSize)
  z = new Float64Array(blockSize)
  /** For derivatives: 1/k, 1/mu, q/mu and 1/(2q). */
  perK = new Float64Array(blockSize)
  perMu = new Float64Array(blockSize)
  ratio = new Float64Array(blockSize)
  halfPerQ = new Float64Array(blockSize)
  /** Largest k where q < 0, and a power of two above 1 + y and above mu, for each slot. */
  kappaMax = new Float64Array(1)
  yBound = new Float64Array(1)
  muBound = new Float64Array(1)
  private slot = new Int32Array(1)
  private slots = 1
  private filled = new Uint8Array(1)

  /** Gives every medium of the stack its slot; allocates only when there are more than ever before. */
  assign(table: MediaTable, stack: WaveStack): void {
    if (this.slot.length < table.count) this.slot = new Int32Array(table.count)
    const { slot } = this
    slot.fill(0, 0, table.count)
    const { medium } = stack
    this.slots = 1
    // First pass counts uses as 0, -1, -2 (at most); second numbers those used twice.
    for (let j = 0; j < medium.length; j++) if (slot[medium[j]] > -2) slot[medium[j]]--
    for (let m = 0; m < table.count; m++) slot[m] = slot[m] === -2 ? this.slots++ : 0
    if (this.filled.length < this.slots) {
      this.k = new Float64Array(this.slots * blockSize)
      this.y = new Float64Array(this.slots * blockSize)
      this.z = new Float64Array(this.slots * blockSize)
      this.perK = new Float64Array(this.slots * blockSize)
      this.perMu = new Float64Array(this.slots * blockSize)
      this.ratio = new Float64Array(this.slots * blockSize)
      this.halfPerQ = new Float64Array(this.slots * blockSize)
      this.kappaMax = new Float64Array(this.slots)
      this.yBound = new Float64Array(this.slots)
      this.muBound = new Float64Array(this.slots)
      this.filled = new Uint8Array(this.slots)
    }
  }

  /** Forgets the previous block. */
  begin(): void {
    this.filled.fill(0, 0, this.slots)
  }

  /** The slot of medium m, filled for points first .. first + n. */
  at(table: MediaTable, m: number, first: number, n: number): number {
    const slot = this.slot[m]
    if (slot !== 0 && this.filled[slot] === 1) return slot
    this.filled[slot] = 1
    const { k, y, z, perK, perMu, ratio, halfPerQ } = this
    const o = slot * blockSize
    const { q, mu } = table
    const t = m * table.points + first
    let kappa = 0
    let yMax = 1
    let muMax = 1
    for (let i = 0; i < n; i++) {
      const square = Math.max(Math.abs(q[t + i]), 1e-200)
      const mass = mu[t + i]
      const root = Math.sqrt(square)
      const d = 1 / (root * mass)
      k[o + i] = root
      y[o + i] = square * d
      z[o + i] = mass * mass * d
      perK[o + i] = mass * d
      perMu[o + i] = root * d
      const sign = q[t + i] < 0 ? -1 : 1
      ratio[o + i] = sign * (y[o + i] * root)
      halfPerQ[o + i] = sign * (0.5 * (perK[o + i] * perK[o + i]))
      if (q[t + i] < 0) kappa = Math.max(kappa, root)
      yMax = Math.max(yMax, Math.abs(y[o + i]))
      muMax = Math.max(muMax, Math.abs(mass))
    }
    this.kappaMax[slot] = kappa
    this.yBound[slot] = yMax
    this.muBound[slot] = muMax
    return slot
  }
}

// Adding and taking away 1.5 2^52 rounds to the inverseest integer, ties to even.
const rounder = 6755399441055744

// 2^n/2 and 2^-n/2.
const halfPowers = new Float64Array(512)
const halfInverses = new Float64Array(512)
halfPowers[0] = 0.5
halfInverses[0] = 0.5
for (let n = 1; n < 512; n++) {
  halfPowers[n] = halfPowers[n - 1] * 2
  halfInverses[n] = halfInverses[n - 1] * 0.5
}

/**
 * c and s of one layer at n points into `c` and `s`; q from entry t on, the medium's slot from entry o on. `shift` null:
 * undivided, kw must stay below `thickest` where q < 0. Else divided by 2^n, and n added to shift.
 *
 * `g`, where given, receives d/dq of S = sin(kw)/k (sinh for q < 0), divided as c and s are:
 * dS/dq = (w c - S)/(2q), whose terms cancel for thin layers. Where the angle needed no reduction the polynomials have
 * the difference: w³ (a G - P - 1/2)/2 with c = 1 - a/2 + a² G, s = r (1 + a P).
 */
export function layerFunctions(
  q: Float64Array,
  t: number,
  slots: Pick<BlockMedia, 'halfPerQ' | 'k' | 'perK'>,
  o: number,
  w: number,
  n: number,
  c: Float64Array,
  s: Float64Array,
  shift: Float64Array | null,
  g: Float64Array | null,
): void {
  const { k, perK, halfPerQ } = slots
  const halfCube = 0.5 * w * w * w
  for (let i = 0; i < n; i++) {
    const x = k[o + i] * w
    if (q[t + i] < 0) {
      const turns = x * Math.LOG2E + rounder - rounder
      const r = x - turns * 0.6931471805598903 - turns * 5.497923018708371e-14
      const a = r * r
      const a2 = a * a
      const p =
        0.16666666666666669 +
        a * 0.008333333333330065 +
        (0.00019841269863041851 + a * 2.7557268478279004e-6 + a2 * 2.51003767988125e-8) * a2
      const f =
        0.041666666666666664 +
        a * 0.0013888888888886554 +
        (2.48015873171361e-5 + a * 2.755728298260548e-7 + a2 * 2.091123041977771e-9) * a2
      const odd = r + r * a * p
      const even = 1 + (0.5 * a + a2 * f)
      let up: number
      let down: number
      if (shift === null) {
        up = halfPowers[turns]
        down = halfInverses[turns]
      } else {
        up = 0.5
        down = turns < 511 ? 2 * (halfInverses[turns] * halfInverses[turns]) : 0
        shift[i] += turns
      }
      const h = up + down
      const d = up - down
      c[i] = even * h + odd * d
      s[i] = even * d + odd * h
      if (g !== null) {
        g[i] = turns === 0 ? -halfCube * (a * f - p + 0.5) : (w * c[i] - s[i] * perK[o + i]) * halfPerQ[o + i]
      }
    } else {
      const turns = x * 0.3183098861837907 + rounder - rounder
      const r = x - turns * 3.1415926534682512 - turns * 1.2154201013012384e-10
      const a = r * r
      const a2 = a * a
      // Even and odd powers of a apart, each in powers of a².
      const p =
        -0.16666666666666666 +
        (-0.00019841269841254974 + (-2.505210761699557e-8 - 7.643970295533013e-13 * a2) * a2) * a2 +
        a *
          (0.008333333333333316 +
            (2.755731921916323e-6 + (1.605897731242445e-10 + 2.7314447512062796e-15 * a2) * a2) * a2)
      const f =
        0.04166666666666666 +
        (2.4801587298913547e-5 + (2.0876681558822446e-9 + 4.646435932869834e-14 * a2) * a2) * a2 +
        a * (-0.0013888888888884767 + (-2.7557318573365657e-7 - 1.1466252257937559e-11 * a2) * a2)
      s[i] = r + r * a * p
      c[i] = 1 - (0.5 * a - a2 * f)
      if (g !== null) {
        g[i] = turns === 0 ? halfCube * (a * f - p - 0.5) : (w * c[i] - s[i] * perK[o + i]) * halfPerQ[o + i]
      }
    }
  }
}

import { exponentOf, scaleByPowerOfTwo } from './bits.js'
import { complexRoot, root } from './complexLayer.js'
import { log10 } from './elementary.js'
import { blockSize, layerFunctions, thickest } from './layerBlock.js'
import { admittance, lead } from './pointSweep.js'
import type { SpectrumOut } from './spectrum.js'
import { refuseClosed, refuseResult } from './stackChecks.js'
import { applyLayer, computeLayer, growth, media, renormalise, shift, startVectors, u1, u2, v1, v2 } from './sweep.js'
import type { MediaTable, Side, WaveStack } from './types.js'

/**
 * T and R of stacks of which some media absorb, blocks of energies inside, layers outside: the two real vectors are the real and the
 * imaginary part of the wave, so that a layer that does not absorb is crossed as in `plainSpectrum`. One that does has k = a + ib and
 *
 *   cos kw = cos aw cosh bw - i sin aw sinh bw     sin kw = sin aw cosh bw + i cos aw sinh bw
 *
 * with the same polynomials. What is absorbed is not summed up here: `absorbingSpectrum` does, at three times the price.
 */
export function absorbingBlock(
  table: MediaTable,
  stack: WaveStack,
  out: SpectrumOut,
  from: Side,
  near: number,
  far: number,
): void {
  media.assign(table, stack)
  for (let first = 0; first < table.points; first += blockSize) {
    const n = Math.min(blockSize, table.points - first)
    sweep(table, stack, from, far, first, n)
    finish(table, near, far, first, n, out)
  }
}

/** What the polynomials are given: k alone is read where no slope is asked for. */
class Angles {
  k = new Float64Array(blockSize)
  readonly perK = new Float64Array(0)
  readonly halfPerQ = new Float64Array(0)
}

/** The complex media of a block: k = a + ib, k/mu and mu/k. */
class ComplexMedia {
  readonly a = new Angles()
  readonly b = new Angles()
  yRe = new Float64Array(blockSize)
  yIm = new Float64Array(blockSize)
  zRe = new Float64Array(blockSize)
  zIm = new Float64Array(blockSize)
  /** Largest b, and powers of two above 1 + |k/mu| and above |mu|. */
  bMax = new Float64Array(1)
  yBound = new Float64Array(1)
  muBound = new Float64Array(1)
  /** 0: not looked at, 1: nothing absorbs in this block, 2: filled. */
  state = new Uint8Array(1)

  begin(count: number): void {
    if (this.state.length < count) {
      const row = () => new Float64Array(count * blockSize)
      this.a.k = row()
      this.b.k = row()
      this.yRe = row()
      this.yIm = row()
      this.zRe = row()
      this.zIm = row()
      this.bMax = new Float64Array(count)
      this.yBound = new Float64Array(count)
      this.muBound = new Float64Array(count)
      this.state = new Uint8Array(count)
    }
    this.state.fill(0, 0, count)
  }

  absorbs(table: MediaTable, m: number, first: number, n: number): boolean {
    if (this.state[m] === 0) this.state[m] = this.fill(table, m, first, n) ? 2 : 1
    return this.state[m] === 2
  }

  private fill({ q, mu, qIm, muIm, points }: MediaTable, m: number, first: number, n: number): boolean {
    const t = m * points + first
    let real = true
    for (let i = 0; i < n && real; i++) real = qIm![t + i] === 0 && muIm![t + i] === 0
    if (real) return false
    const o = m * blockSize
    let bMax = 0
    let yMax = 1
    let muMax = 1
    for (let i = 0; i < n; i++) {
      complexRoot(q[t + i], qIm![t + i])
      const kRe = root.re
      const kIm = root.im
      const mRe = mu[t + i]
      const mIm = muIm![t + i]
      const mass = mRe * mRe + mIm * mIm
      const size = kRe * kRe + kIm * kIm
      this.a.k[o + i] = Math.abs(kRe)
      this.b.k[o + i] = Math.abs(kIm)
      // (kRe, kIm) has both parts of one sign but for media that amplify; the sign of sin kw follows theirs.
      this.yRe[o + i] = (kRe * mRe + kIm * mIm) / mass
      this.yIm[o + i] = (kIm * mRe - kRe * mIm) / mass
      this.zRe[o + i] = (mRe * kRe + mIm * kIm) / size
      this.zIm[o + i] = (mIm * kRe - mRe * kIm) / size
      bMax = Math.max(bMax, this.b.k[o + i])
      yMax = Math.max(yMax, Math.abs(this.yRe[o + i]) + Math.abs(this.yIm[o + i]))
      muMax = Math.max(muMax, Math.abs(mRe) + Math.abs(mIm))
    }
    this.bMax[m] = bMax
    this.yBound[m] = yMax
    this.muBound[m] = muMax
    return true
  }
}

const complex = new ComplexMedia()
const cosA = new Float64Array(blockSize)
const sinA = new Float64Array(blockSize)
const coshB = new Float64Array(blockSize)
const sinhB = new Float64Array(blockSize)
const propagating = new Float64Array(blockSize).fill(1)
const evanescent = new Float64Array(blockSize).fill(-1)

function sweep(table: MediaTable, stack: WaveStack, from: Side, far: number, first: number, n: number): void {
  const { medium, width } = stack
  const layers = medium.length
  startVectors(table, far, first, n)
  complex.begin(table.count)
  if (far >= 0 && complex.absorbs(table, far, first, n)) startComplex(table, far, first, n)
  let grown = 0
  for (let step = 0; step < layers; step++) {
    const j = from === 'entry' ? layers - 1 - step : step
    const m = medium[j]
    const w = width[j]
    const absorbs = complex.absorbs(table, m, first, n)
    const slot = absorbs ? 0 : media.at(table, m, first, n)
    const bound = absorbs ? complexGrowth(m, w) : growth(slot, w)
    if (grown + bound > 900) {
      renormalise(n)
      grown = 0
    }
    grown += bound
    if (absorbs) crossComplex(table, m, w, first, n)
    else {
      computeLayer(table, m, slot, w, first, n, false)
      applyLayer(table, m, slot, first, n)
    }
  }
  if (grown > 400) renormalise(n)
}

/** (1, iY) of a lead that absorbs. */
function startComplex(table: MediaTable, far: number, first: number, n: number): void {
  for (let i = 0; i < n; i++) {
    admittance(table, null, far * table.points + first + i)
    u1[i] = 1
    u2[i] = 0
    v1[i] = -lead.im
    v2[i] = lead.re
  }
}

function complexGrowth(m: number, w: number): number {
  const kw = complex.bMax[m] * w
  return (kw > thickest ? 0 : kw * 1.5) + 5 + exponentOf(1 + complex.muBound[m] * w) + exponentOf(complex.yBound[m])
}

function crossComplex(table: MediaTable, m: number, w: number, first: number, n: number): void {
  const o = m * blockSize
  const { a, b, yRe, yIm, zRe, zIm, bMax } = complex
  layerFunctions(propagating, 0, a, o, w, n, cosA, sinA, null, null)
  layerFunctions(evanescent, 0, b, o, w, n, coshB, sinhB, bMax[m] * w > thickest ? shift : null, null)
  const t = m * table.points + first
  for (let i = 0; i < n; i++) {
    // Of k = a + ib with both signs alike; a medium that amplifies has b < 0.
    const sh = table.qIm![t + i] < 0 ? -sinhB[i] : sinhB[i]
    const ch = coshB[i]
    const cRe = cosA[i] * ch
    const cIm = -(sinA[i] * sh)
    const sRe = sinA[i] * ch
    const sIm = cosA[i] * sh
    const dRe = zRe[o + i] * sRe - zIm[o + i] * sIm
    const dIm = zRe[o + i] * sIm + zIm[o + i] * sRe
    const pRe = yRe[o + i] * sRe - yIm[o + i] * sIm
    const pIm = yRe[o + i] * sIm + yIm[o + i] * sRe
    const uRe = u1[i]
    const uIm = u2[i]
    const vRe = v1[i]
    const vIm = v2[i]
    u1[i] = cRe * uRe - cIm * uIm - (dRe * vRe - dIm * vIm)
    u2[i] = cRe * uIm + cIm * uRe - (dRe * vIm + dIm * vRe)
    v1[i] = pRe * uRe - pIm * uIm + (cRe * vRe - cIm * vIm)
    v2[i] = pRe * uIm + pIm * uRe + (cRe * vIm + cIm * vRe)
  }
}

function finish(table: MediaTable, near: number, far: number, first: number, n: number, out: SpectrumOut): void {
  for (let i = 0; i < n; i++) {
    const t = near * table.points + first + i
    if (!(table.q[t] > 0) || table.qIm![t] !== 0) refuseClosed(table, first + i, near)
    let farY = 0
    if (far >= 0) {
      admittance(table, null, far * table.points + first + i)
      farY = lead.re
    }
    admittance(table, null, t)
    const x = lead.re * u1[i]
    const y = lead.re * u2[i]
    const ar = x + v2[i]
    const ai = y - v1[i]
    const br = x - v2[i]
    const bi = y + v1[i]
    const a = ar * ar + ai * ai
    const ratio = (4 * (lead.re * farY)) / a
    const T = shift[i] === 0 ? ratio : scaleByPowerOfTwo(ratio, -2 * shift[i])
    const R = (br * br + bi * bi) / a
    if (!(T + R < Infinity)) refuseResult(table, first + i)
    out.T[first + i] = T
    out.R[first + i] = R
    if (out.log10T) out.log10T[first + i] = log10(ratio) - 2 * shift[i] * 0.3010299956639812
  }
}

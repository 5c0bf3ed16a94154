import { exponentOf, highWord, powerOfTwo } from './bits.js'
import { BlockMedia, blockSize, layerFunctions, thickest } from './layerBlock.js'
import type { MediaTable } from './types.js'

/**
 * The two real vectors (u, v) of a block of energies on their way from the far lead to the near one. This module owns
 * the arrays (blockSize entries, valid until the next sweep begins); the true vectors are 2^shift times these.
 */

export const media = new BlockMedia()
export const u1 = new Float64Array(blockSize)
export const v1 = new Float64Array(blockSize)
export const u2 = new Float64Array(blockSize)
export const v2 = new Float64Array(blockSize)
export const shift = new Float64Array(blockSize)
/** Layer functions of the layer that `computeLayer` saw last. */
export const c = new Float64Array(blockSize)
export const s = new Float64Array(blockSize)
/** Its derivative of sin(kw)/k by q, where asked for. */
export const g = new Float64Array(blockSize)
/** What `renormalise` multiplied by. */
export const factor = new Float64Array(blockSize)

/**
 * Start vectors in the far lead: (1, 0) and (0, Y) where it is open, (1, -kappa/mu) alone where it is closed or on its
 * edge, (0, 1) alone at a hard wall (far < 0).
 */
export function startVectors(table: MediaTable, far: number, first: number, n: number): void {
  const { q, mu } = table
  const t = far * table.points + first
  media.begin()
  for (let i = 0; i < n; i++) {
    shift[i] = 0
    u2[i] = 0
    if (far < 0) {
      u1[i] = 0
      v1[i] = 1
      v2[i] = 0
    } else {
      const Y = Math.sqrt(Math.abs(q[t + i])) / mu[t + i]
      const open = q[t + i] > 0
      u1[i] = 1
      v1[i] = open ? 0 : -Y
      v2[i] = open ? Y : 0
    }
  }
}

/** Whether the matrix of this layer must be divided: kw above `thickest` somewhere in the block. */
export function isThick(slot: number, w: number): boolean {
  return media.kappaMax[slot] * w > thickest
}

/** Log2 of what one layer may multiply or divide the size of a vector by. */
export function growth(slot: number, w: number): number {
  const exponential = isThick(slot, w) ? 0 : media.kappaMax[slot] * w * 1.5
  return exponential + 4 + exponentOf(1 + media.muBound[slot] * w) + exponentOf(media.yBound[slot])
}

/** Fills c and s for a layer of width w in medium m, whose slot is given; g too with `slopes`. */
export function computeLayer(
  table: MediaTable,
  m: number,
  slot: number,
  w: number,
  first: number,
  n: number,
  slopes: boolean,
): void {
  const t = m * table.points + first
  const scaled = isThick(slot, w) ? shift : null
  layerFunctions(table.q, t, media, slot * blockSize, w, n, c, s, scaled, slopes ? g : null)
}

/** Carries the vectors across the layer that c and s hold. */
export function applyLayer(table: MediaTable, m: number, slot: number, first: number, n: number): void {
  const { q } = table
  const { y, z } = media
  const t = m * table.points + first
  const o = slot * blockSize
  for (let i = 0; i < n; i++) {
    const cos = c[i]
    const down = z[o + i] * s[i]
    const up = q[t + i] < 0 ? -(y[o + i] * s[i]) : y[o + i] * s[i]
    const a = u1[i]
    const b = v1[i]
    const d = u2[i]
    const e = v2[i]
    u1[i] = cos * a - down * b
    v1[i] = up * a + cos * b
    u2[i] = cos * d - down * e
    v2[i] = up * d + cos * e
  }
}

/** Brings the largest component of every energy to 1..2 by an exact power of two. */
export function renormalise(n: number): void {
  for (let i = 0; i < n; i++) {
    const size = Math.max(Math.max(Math.abs(u1[i]), Math.abs(v1[i])), Math.max(Math.abs(u2[i]), Math.abs(v2[i])))
    const exponent = (highWord(size) >> 20) - 1023
    const scale = powerOfTwo(-exponent)
    factor[i] = scale
    u1[i] *= scale
    v1[i] *= scale
    u2[i] *= scale
    v2[i] *= scale
    shift[i] += exponent
  }
}

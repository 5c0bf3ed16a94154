import { log10 } from '../wave/index.js'

/** Decibels that count as a residual of 1. */
export const unitDb = 3

/** 10 log10(T/t) over 3 dB; 0 at or below t. */
export function excess(T: number, t: number): number {
  return T > t ? (10 * log10(T / t)) / unitDb : 0
}

/** d(10 log10 T)/dT. */
export function decibelSlope(T: number): number {
  return 10 / (Math.LN10 * T)
}

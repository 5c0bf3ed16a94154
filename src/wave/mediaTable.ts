import type { MediaTable, WaveMedia } from './types.js'

/** An empty table for so many points; with imaginary parts where some of the media absorb. Filled with NaN. */
export function mediaTable({ count, lossless }: Pick<WaveMedia, 'count' | 'lossless'>, points: number): MediaTable {
  const row = () => new Float64Array(count * points).fill(Number.NaN)
  const real = { count, points, q: row(), mu: row() }
  return lossless ? real : { ...real, qIm: row(), muIm: row() }
}

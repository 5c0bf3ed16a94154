import type { MediaAtEnergy, MediaTable, WaveMedia } from '../../src/wave/index.js'

/** q and mu, or their slopes, of every medium; buffers poisoned first, so that an entry left out shows. */
export function tableOf(
  media: WaveMedia,
  energies: readonly number[],
  what: 'value' | 'slope' = 'value',
): Required<MediaTable> {
  const points = energies.length
  const poisoned = () => new Float64Array(media.count * points).fill(Number.NaN)
  const table = { count: media.count, points, q: poisoned(), mu: poisoned(), qIm: poisoned(), muIm: poisoned() }
  if (what === 'value') media.fill(Float64Array.from(energies), table)
  else media.fillSlope(Float64Array.from(energies), table)
  return table
}

export function atEnergy(media: WaveMedia, re: number, im: number): MediaAtEnergy {
  const poisoned = () => new Float64Array(media.count).fill(Number.NaN)
  const out = {
    qRe: poisoned(),
    qIm: poisoned(),
    muRe: poisoned(),
    muIm: poisoned(),
    dqRe: poisoned(),
    dqIm: poisoned(),
    dmuRe: poisoned(),
    dmuIm: poisoned(),
  }
  media.at(re, im, out)
  return out
}

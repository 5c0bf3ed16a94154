import type { MediaTable, WaveMedia, WaveSystem } from '../../src/wave/index.js'
import { hardWall } from '../../src/wave/index.js'

/** hbar²/2m0, eV nm² (CODATA 2022). */
export const C = 0.038099821109685836

export interface Region {
  V: number
  m: number
  alpha?: number
}

/** Electron media made here, apart from the model's, so that the core is tested alone. */
export function regionMedia(regions: readonly Region[], kPar = 0): WaveMedia {
  const mass = (r: Region, E: number) => r.m * (1 + (r.alpha ?? 0) * (E - r.V))
  return {
    count: regions.length,
    lossless: true,
    parameters: 3,
    fill(energies, table) {
      regions.forEach((r, m) => {
        for (let e = 0; e < energies.length; e++) {
          table.mu[m * table.points + e] = mass(r, energies[e])
          table.q[m * table.points + e] = (mass(r, energies[e]) / C) * (energies[e] - r.V) - kPar * kPar
        }
      })
    },
    fillSlope(energies, slope) {
      regions.forEach((r, m) => {
        const bend = r.m * (r.alpha ?? 0)
        for (let e = 0; e < energies.length; e++) {
          slope.mu[m * slope.points + e] = bend
          slope.q[m * slope.points + e] = (mass(r, energies[e]) + bend * (energies[e] - r.V)) / C
        }
      })
    },
    at(re, im, out) {
      regions.forEach((r, m) => {
        const bend = r.m * (r.alpha ?? 0)
        const d = re - r.V
        out.muRe[m] = r.m + bend * d
        out.muIm[m] = bend * im
        out.qRe[m] = (out.muRe[m] * d - out.muIm[m] * im) / C - kPar * kPar
        out.qIm[m] = (out.muRe[m] * im + out.muIm[m] * d) / C
        out.dmuRe[m] = bend
        out.dmuIm[m] = 0
        out.dqRe[m] = (out.muRe[m] + bend * d) / C
        out.dqIm[m] = (out.muIm[m] + bend * im) / C
      })
    },
    partials(energy, m, out) {
      const r = regions[m]
      const alpha = r.alpha ?? 0
      const d = energy - r.V
      // mu = m (1 + alpha d), q = mu d / C - kPar², d = E - V; parameters V, m, alpha.
      out[0] = -(r.m * (1 + 2 * alpha * d)) / C
      out[1] = -r.m * alpha
      out[2] = ((1 + alpha * d) * d) / C
      out[3] = 1 + alpha * d
      out[4] = (r.m * d * d) / C
      out[5] = r.m * d
    },
  }
}

/** A system of one medium a layer: 0 is the entry, 1 .. L the layers, L + 1 the exit. */
export function regionSystem(
  entry: Region,
  layers: readonly (Region & { d: number })[],
  exit: Region | 'hard wall',
  kPar = 0,
): WaveSystem {
  const regions: Region[] = [entry, ...layers]
  if (exit !== 'hard wall') regions.push(exit)
  return {
    media: regionMedia(regions, kPar),
    stack: {
      entry: 0,
      exit: exit === 'hard wall' ? hardWall : layers.length + 1,
      medium: Int32Array.from(layers, (_, j) => j + 1),
      width: Float64Array.from(layers, (l) => l.d),
    },
  }
}

/** The table of a system at these energies. */
export function tableOf(media: WaveMedia, energies: ArrayLike<number>): MediaTable {
  const points = energies.length
  const size = media.count * points
  const table = { count: media.count, points, q: new Float64Array(size), mu: new Float64Array(size) }
  media.fill(Float64Array.from(energies), table)
  return table
}

export function slopeOf(media: WaveMedia, energies: ArrayLike<number>): MediaTable {
  const points = energies.length
  const size = media.count * points
  const slope = { count: media.count, points, q: new Float64Array(size), mu: new Float64Array(size) }
  media.fillSlope(Float64Array.from(energies), slope)
  return slope
}

/** Output arrays that betray every entry left unwritten. */
export function poisoned(length: number): Float64Array {
  return new Float64Array(length).fill(Number.NaN)
}

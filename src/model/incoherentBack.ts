import { log10, type MediaTable, mediaTable, spectrumInto, type WaveStack, type WaveSystem } from '../wave/index.js'
import type { Spectrum } from './spectrum.js'

/** Intensities of one face, from either side. */
interface Face {
  readonly T: Float64Array
  readonly R: Float64Array
  readonly A: Float64Array
  /** Of a wave from the far side. */
  readonly farR: Float64Array
  readonly farA: Float64Array
}

/**
 * A thick lossless plate between a front (the stack) and a back face: what runs to and fro in it adds up by intensities, not amplitudes
 * (Smith, Modern Optical Engineering, equations 10.5 to 10.7, from memory of a public copy):
 *
 *     T = T1 T2/(1 - R1' R2)     R = R1 + T1² R2/(1 - R1' R2)     A = A1 + T1 R2 A1'/(1 - R1' R2)
 *
 * with the dashed ones for a wave from inside the plate. Where the plate carries no wave, T = 0 and the front stands alone. `from`
 * 'exit': the wave comes through the back face. `back`: number of the medium behind it.
 */
export function incoherentBack(
  system: WaveSystem,
  back: number,
  energies: Float64Array,
  from: 'entry' | 'exit',
): Spectrum {
  const { media, stack } = system
  const points = energies.length
  const table = mediaTable(media, points)
  media.fill(energies, table)
  const rear: WaveStack = { entry: stack.exit, exit: back, medium: new Int32Array(0), width: new Float64Array(0) }
  const [T, R, A, log10T] = [0, 1, 2, 3].map(() => new Float64Array(points).fill(Number.NaN))
  let fluxError = 0
  for (let e = 0; e < points; e++) {
    const one = column(table, e)
    if (from === 'entry') {
      const front = faceOf(one, stack, 'entry')
      const plate = one.q[stack.exit] > 0 ? faceOf(one, rear, 'entry') : null
      combine(e, front, plate)
    } else combine(e, faceOf(one, rear, 'exit'), one.q[stack.exit] > 0 ? faceOf(one, stack, 'exit') : null)
  }
  return { T, R, A, log10T, fluxError }

  /** `first` as the wave meets it. */
  function combine(e: number, first: Face, second: Face | null): void {
    const r = second === null ? 0 : second.R[0]
    const often = second === null ? 0 : 1 / (1 - first.farR[0] * r)
    const inside = first.T[0] * often
    T[e] = second === null ? 0 : inside * second.T[0]
    R[e] = first.R[0] + inside * r * first.T[0]
    A[e] = first.A[0] + inside * r * first.farA[0] + (second === null ? 0 : inside * second.A[0])
    log10T[e] = T[e] > 0 ? log10(T[e]) : Number.NEGATIVE_INFINITY
    fluxError = Math.max(fluxError, Math.abs(T[e] + R[e] + A[e] - 1))
  }
}

/** A face from the side `from`, and, where its other side carries a wave, from there. */
function faceOf(table: MediaTable, stack: WaveStack, from: 'entry' | 'exit'): Face {
  const row = () => new Float64Array(1)
  const near = { T: row(), R: row(), A: row() }
  spectrumInto(table, stack, near, from)
  const far = { T: row(), R: row(), A: row() }
  const other = from === 'entry' ? 'exit' : 'entry'
  if (table.q[stack[other]] > 0 && !(table.qIm && table.qIm[stack[other]] !== 0)) spectrumInto(table, stack, far, other)
  return { ...near, farR: far.R, farA: far.A }
}

function column({ count, points, q, mu, qIm, muIm }: MediaTable, e: number): MediaTable {
  const of = (row: Float64Array) => Float64Array.from({ length: count }, (_, m) => row[m * points + e])
  const real = { count, points: 1, q: of(q), mu: of(mu) }
  return qIm && muIm ? { ...real, qIm: of(qIm), muIm: of(muIm) } : real
}

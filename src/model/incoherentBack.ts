import { log10, type MediaTable, spectrumInto, type WaveStack } from '../wave/index.js'
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
 * 'exit': the wave comes through the back face. `back`: number of the medium behind it. Without `absorbed` A stays 0, and the error is not told.
 */
export function incoherentBack(
  table: MediaTable,
  stack: WaveStack,
  back: number,
  from: 'entry' | 'exit',
  absorbed = true,
): Spectrum {
  const { points } = table
  const rear: WaveStack = { entry: stack.exit, exit: back, medium: new Int32Array(0), width: new Float64Array(0) }
  const [T, R, A, log10T] = [0, 1, 2, 3].map(() => new Float64Array(points).fill(Number.NaN))
  const [firstFace, secondFace] = from === 'entry' ? [stack, rear] : [rear, stack]
  let fluxError = 0
  // Energies at which the plate carries a wave, and the others.
  const all = Array.from({ length: points }, (_, e) => e)
  const inside = all.filter((e) => table.q[stack.exit * points + e] > 0)
  const outside = all.filter((e) => !(table.q[stack.exit * points + e] > 0))
  if (inside.length > 0) {
    const part = inside.length === points ? table : columns(table, inside)
    combine(inside, faceOf(part, firstFace, from, absorbed), faceOf(part, secondFace, from, absorbed))
  }
  if (outside.length > 0) combine(outside, nearFace(columns(table, outside), firstFace, from, absorbed), null)
  return { T, R, A, log10T, fluxError }

  /** `first` as the wave meets it. */
  function combine(energies: readonly number[], first: Face, second: Face | null): void {
    energies.forEach((e, i) => {
      const r = second === null ? 0 : second.R[i]
      const often = second === null ? 0 : 1 / (1 - first.farR[i] * r)
      const passed = first.T[i] * often
      T[e] = second === null ? 0 : passed * second.T[i]
      R[e] = first.R[i] + passed * r * first.T[i]
      A[e] = first.A[i] + passed * r * first.farA[i] + (second === null ? 0 : passed * second.A[i])
      log10T[e] = T[e] > 0 ? log10(T[e]) : Number.NEGATIVE_INFINITY
      if (absorbed) fluxError = Math.max(fluxError, Math.abs(T[e] + R[e] + A[e] - 1))
    })
  }
}

/** A face from the side `from`, and, where its other side carries a wave, from there. */
function faceOf(table: MediaTable, stack: WaveStack, from: 'entry' | 'exit', absorbed: boolean): Face {
  const near = nearFace(table, stack, from, absorbed)
  const { points } = table
  const other = from === 'entry' ? 'exit' : 'entry'
  const open = Array.from({ length: points }, (_, e) => e).filter((e) => isOpen(table, stack[other], e))
  if (open.length === 0) return near
  const row = () => new Float64Array(open.length)
  const far = { T: row(), R: row(), A: row() }
  spectrumInto(
    open.length === points ? table : columns(table, open),
    stack,
    absorbed ? far : { T: far.T, R: far.R },
    other,
  )
  open.forEach((e, i) => {
    near.farR[e] = far.R[i]
    near.farA[e] = far.A[i]
  })
  return near
}

function nearFace(table: MediaTable, stack: WaveStack, from: 'entry' | 'exit', absorbed: boolean): Face {
  const row = () => new Float64Array(table.points)
  const near = { T: row(), R: row(), A: row() }
  spectrumInto(table, stack, absorbed ? near : { T: near.T, R: near.R }, from)
  return { ...near, farR: row(), farA: row() }
}

function isOpen({ points, q, qIm }: MediaTable, medium: number, e: number): boolean {
  return q[medium * points + e] > 0 && !(qIm && qIm[medium * points + e] !== 0)
}

function columns({ count, points, q, mu, qIm, muIm }: MediaTable, energies: readonly number[]): MediaTable {
  const of = (row: Float64Array) => {
    const out = new Float64Array(count * energies.length)
    for (let m = 0; m < count; m++)
      for (const [i, e] of energies.entries()) out[m * energies.length + i] = row[m * points + e]
    return out
  }
  const real = { count, points: energies.length, q: of(q), mu: of(mu) }
  return qIm && muIm ? { ...real, qIm: of(qIm), muIm: of(muIm) } : real
}

import { type MediaTable, mediaTable, type Side, spectrumInto, type WaveStack } from '../wave/index.js'
import { energiesOf } from './energiesOf.js'
import { incoherentBack } from './incoherentBack.js'
import { StackError } from './StackError.js'
import { platedSystem, systemOf } from './systemOf.js'
import type { ElectronStack, LightStack } from './types.js'

export interface SpectrumOptions {
  /** Where the wave comes from; for light the angle is that in this medium. */
  readonly from?: Side
}

/** One number a point, in the order of the points. */
export interface Spectrum {
  readonly T: Float64Array
  readonly R: Float64Array
  /** Absorbed between the leads, from the flux layer by layer; 0 in lossless stacks. */
  readonly A: Float64Array
  /** -Infinity where T = 0; finite where T itself is too small for a double. */
  readonly log10T: Float64Array
  /** Largest abs(T + R + A - 1). */
  readonly fluxError: number
}

/** A stack and its points, checked and laid out once, for many calls of spectrumInto(table, stack, out, from). */
export interface PreparedSpectrum {
  readonly table: MediaTable
  /** Its widths may be changed between calls. */
  readonly stack: WaveStack
  readonly from: Side
}

/**
 * Transmission and reflection of a stack at `points`: electron energies in eV, for light vacuum wavelengths in nm, in any order.
 * Throws StackError, naming the number, for a negative or non-finite width, a non-finite number, a point at or below the edge of
 * the side that the wave comes from, a wave from the side of a hard wall, absorption on that side, an angle of 90 degrees or
 * more, and an electron energy at which the one-band picture fails.
 */
export function spectrum(
  stack: ElectronStack | LightStack,
  points: ArrayLike<number>,
  options: SpectrumOptions = {},
): Spectrum {
  const { from: side = 'entry' } = options
  if (stack.kind === 'light' && stack.back) {
    const { system, back } = platedSystem(stack, side)
    const energies = energiesOf(side === 'entry' ? stack : { ...stack, exit: stack.back.exit }, points, side)
    const table = mediaTable(system.media, energies.length)
    system.media.fill(energies, table)
    return incoherentBack(table, system.stack, back, side)
  }
  const { table, stack: waves, from } = prepareSpectrum(stack, points, options)
  const row = () => new Float64Array(points.length).fill(Number.NaN)
  const out = { T: row(), R: row(), A: row(), log10T: row() }
  return { ...out, fluxError: spectrumInto(table, waves, out, from) }
}

/** Checks as spectrum does, see there for what it throws; and throws for a stack with an incoherent back face, which has no such layout. */
export function prepareSpectrum(
  stack: ElectronStack | LightStack,
  points: ArrayLike<number>,
  { from = 'entry' }: SpectrumOptions = {},
): PreparedSpectrum {
  if (stack.kind === 'light' && stack.back)
    throw new StackError('A stack with a `back` has no single layout. Call spectrum for it.')
  const { media, stack: waves } = systemOf(stack, from)
  const energies = energiesOf(stack, points, from)
  const table = mediaTable(media, energies.length)
  media.fill(energies, table)
  return { table, stack: waves, from }
}

import { hcEvNm } from '../media/index.js'
import type { Side } from '../wave/index.js'
import { electronMedia } from './electronMedia.js'
import { StackError } from './StackError.js'
import type { ElectronStack, LightStack } from './types.js'

/**
 * Energies (eV) of the points of a library call: electron energies in eV as they are, light in vacuum nm as hc/nm. Throws
 * StackError for a point that is not finite, an electron energy at or below the edge of the side that the wave comes from, a
 * wavelength that is not above 0, and a wavelength at which that side absorbs.
 */
export function energiesOf(stack: ElectronStack | LightStack, points: ArrayLike<number>, from: Side): Float64Array {
  for (let i = 0; i < points.length; i++) {
    if (!Number.isFinite(points[i])) throw new StackError(`Point ${i + 1} is ${points[i]}. Give finite numbers.`)
  }
  return stack.kind === 'electron' ? electronEnergies(stack, points, from) : photonEnergies(stack, points, from)
}

function electronEnergies(stack: ElectronStack, points: ArrayLike<number>, from: Side): Float64Array {
  const energies = Float64Array.from(points)
  const lead = stack[from]
  if (lead === 'hard wall') throw new StackError('No wave comes from the side of a hard wall.')
  const table = { count: 1, points: energies.length, q: energies.slice(), mu: energies.slice() }
  electronMedia([lead], stack.inPlaneKPerNm).fill(energies, table)
  const closed = table.q.findIndex((q) => !(q > 0))
  if (closed >= 0) {
    const inPlane = stack.inPlaneKPerNm ? ` with an in-plane wave number of ${stack.inPlaneKPerNm} /nm` : ''
    throw new StackError(
      `Point ${closed + 1} is ${energies[closed]} eV, at or below the edge of the ${from} (${lead.potentialEv} eV${inPlane}), where no ` +
        'wave can come from. Give energies above it.',
    )
  }
  return energies
}

function photonEnergies(stack: LightStack, points: ArrayLike<number>, from: Side): Float64Array {
  const { extinction } = stack[from]
  for (let i = 0; i < points.length; i++) {
    if (!(points[i] > 0)) throw new StackError(`Point ${i + 1} is ${points[i]} nm. A vacuum wavelength is above 0.`)
    if (typeof extinction !== 'function') continue
    const value = extinction(points[i])
    if (value !== 0) {
      throw new StackError(
        `Extinction of the ${from} is ${value} at ${points[i]} nm, and the wave comes from there. It must be 0.`,
      )
    }
  }
  return Float64Array.from(points, (nm) => hcEvNm / nm)
}

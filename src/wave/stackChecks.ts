import { hardWall, type MediaTable, type Side, type WaveStack } from './types.js'

/** Refuses a width that is negative or not finite, with its number. */
export function checkStack(stack: WaveStack): void {
  const { width } = stack
  for (let j = 0; j < width.length; j++) {
    if (!(width[j] >= 0 && width[j] < Infinity)) {
      throw new RangeError(`Layer ${j} is ${width[j]} nm wide. A width is finite and not negative.`)
    }
  }
}

/** The medium of the lead the wave comes from (`near`) or goes to; a hard wall can send no wave. */
export function lead(stack: WaveStack, from: Side, near: boolean): number {
  if ((from === 'entry') === near) return stack.entry
  if (near && stack.exit === hardWall) {
    throw new RangeError('The exit is a hard wall: no wave comes from there. Let the wave come from the entry.')
  }
  return stack.exit
}

/** For a lead that can send no wave at this point: closed, on its edge, or absorbing. */
export function refuseClosed(table: MediaTable, point: number, medium: number): never {
  const t = medium * table.points + point
  const absorbs = table.qIm !== undefined && table.qIm[t] !== 0
  throw new RangeError(
    `Point ${point}: q is ${table.q[t]}${absorbs ? ` + ${table.qIm[t]} i` : ''} /nm² in medium ${medium}, the lead the wave comes from. It must be real and above 0: ${absorbs ? 'that lead must not absorb.' : "take energies above that lead's edge."}`,
  )
}

/** Names the first medium whose numbers are not finite, or says that the result is not. */
export function refuseResult(table: MediaTable, point: number): never {
  for (let m = 0; m < table.count; m++) {
    const q = table.q[m * table.points + point]
    const mu = table.mu[m * table.points + point]
    if (!Number.isFinite(q) || !Number.isFinite(mu) || mu === 0) {
      throw new RangeError(`Point ${point}, medium ${m}: q is ${q} /nm² and mu is ${mu}. Both are finite, mu is not 0.`)
    }
  }
  throw new RangeError(`Point ${point}: the result is not finite. q and width are beyond what doubles can hold.`)
}

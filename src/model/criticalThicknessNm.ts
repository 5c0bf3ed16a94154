import { log } from '../wave/index.js'
import { StackError } from './StackError.js'

/** A layer that may relax, by the dislocations that can: at its one face, at both faces, or those of a whole superlattice. */
export type Position = 'uncapped' | 'buried' | 'superlattice'

/** Matthews and Blakeslee's coefficient of how many sides share the misfit. */
const sides: Readonly<Record<Position, number>> = { uncapped: 8, buried: 4, superlattice: 2 }

/**
 * Critical thickness (nm) of Matthews and Blakeslee, J. Crystal Growth 27, 118 (1974), formula from memory, for 60 degree
 * dislocations on (001):
 *
 *     h = b (1 - nu/4) / (kappa pi f (1 + nu)/2) (ln(h/b) + 1)       b = a/sqrt 2, nu = c12/(c11 + c12)
 *
 * The misfit f = |a - a_sub|/a_sub counts from the substrate. Infinity without misfit, 0 where the equation has no solution (the
 * misfit is too large for any thickness). Throws StackError for numbers that are no crystal's.
 */
export function criticalThicknessNm(
  layer: { readonly latticeNm: number; readonly c11: number; readonly c12: number },
  substrateNm: number,
  position: Position,
): number {
  const { latticeNm, c11, c12 } = layer
  if (!(latticeNm > 0 && substrateNm > 0 && c11 > 0 && c12 > 0)) {
    throw new StackError(`No critical thickness: lattice ${latticeNm} nm on ${substrateNm} nm, c11 ${c11}, c12 ${c12}.`)
  }
  const misfit = Math.abs(latticeNm - substrateNm) / substrateNm
  if (misfit === 0) return Number.POSITIVE_INFINITY
  const burgers = latticeNm / Math.sqrt(2)
  const poisson = c12 / (c11 + c12)
  const scale = (1 - poisson / 4) / (sides[position] * Math.PI * misfit * ((1 + poisson) / 2))
  return burgers * largestRoot(scale)
}

/** The larger solution of y = scale (ln y + 1); 0 when there is none, scale < 1. */
function largestRoot(scale: number): number {
  if (scale < 1) return 0
  // Newton on the convex y - scale (ln y + 1) from the right of its root descends to it.
  let y = 4 * scale * (1 + log(scale))
  for (;;) {
    const next = (scale * log(y)) / (1 - scale / y)
    if (!(next < y)) return y
    y = next
  }
}

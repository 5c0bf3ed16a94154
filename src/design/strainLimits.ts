import type { GrowthSpec } from '../job/index.js'
import { bandParameters } from '../media/index.js'
import { criticalThicknessNm, type Situation } from '../model/index.js'
import type { Stretch } from './Lattice.js'

/** What a machine, or its user, lets strain be. */
export interface StrainLimits {
  /** How far a stack is beyond the limits, relative to them and added up; 0: it bears its strain. */
  excess(stretches: readonly Stretch[]): number
}

/**
 * The limits of `growth.strain` (the mean over the stack, either sign) and `growth.critical` (each layer, as it is grown, against the
 * critical thickness of Matthews and Blakeslee for a buried layer). Null without any, and where nothing is strained.
 */
export function strainLimits(
  { strain, critical }: Pick<GrowthSpec, 'critical' | 'strain'>,
  situation: Situation,
): StrainLimits | null {
  if (situation.kind === 'light' || situation.substrateNm === null || (strain === null && !critical)) return null
  const { substrateNm } = situation
  const thickest = new Map<string, number>()
  const limitOf = ({ choice, key }: Stretch['medium']): number => {
    const known = thickest.get(key)
    if (known !== undefined) return known
    const limit =
      choice.kind === 'material'
        ? criticalThicknessNm(bandParameters(choice.material, choice.x, 300), substrateNm, 'buried')
        : Number.POSITIVE_INFINITY
    thickest.set(key, limit)
    return limit
  }
  return {
    excess: (stretches) => {
      let total = 0
      let sum = 0
      let beyond = 0
      for (const { medium, count } of stretches) {
        const nm = count * medium.widths.stepNm
        total += nm
        sum += (medium.resolved.strain ?? 0) * nm
        if (critical) beyond += Math.max(0, nm / limitOf(medium) - 1)
      }
      const mean = total > 0 ? Math.abs(sum / total) : 0
      return beyond + (strain === null ? 0 : Math.max(0, mean / strain - 1 - 1e-12))
    },
  }
}

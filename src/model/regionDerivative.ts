import { resolveRegion } from './resolveMedium.js'
import { StackError } from './StackError.js'
import type { ElectronSituation, MediumChoice, Region } from './types.js'

/**
 * d(potential, mass, alpha)/dx of an alloy at the job's conditions, the entry held; per unit of x. Zero for media without x.
 * Five-point difference: exact for polynomials to the fourth degree, and better than 1e-9 for the quotients in them. It reaches
 * 0.002 beyond x, which bandParameters allows at the ends too.
 */
export function regionDerivative(choice: MediumChoice, situation: ElectronSituation): Required<Region> {
  if (choice.kind !== 'material' || choice.x === null) return { potentialEv: 0, massRel: 0, alphaPerEv: 0 }
  const { material, x } = choice
  const at = (shift: number) => resolveRegion({ ...choice, x: x + shift }, situation).region
  const [far, near] = [2 * step, step].map((h) => ({ up: at(h), down: at(-h) }))
  const slope = (of: keyof Region) =>
    (8 * (near.up[of]! - near.down[of]!) - (far.up[of]! - far.down[of]!)) / (12 * step)
  const derivative = { potentialEv: slope('potentialEv'), massRel: slope('massRel'), alphaPerEv: slope('alphaPerEv') }
  if (!Number.isFinite(derivative.potentialEv + derivative.massRel + derivative.alphaPerEv)) {
    throw new StackError(`${material} x = ${x} has no finite derivative in x.`)
  }
  return derivative
}

const step = 1e-3

import type { Condition, Job, MediumOption } from '../job/index.js'
import { bandParameters, hbar2Over2m0 } from '../media/index.js'
import { resolveMedium } from './resolveMedium.js'
import { StackError } from './StackError.js'
import type { MediumChoice, Situation } from './types.js'

/**
 * The conditions and the strain of a job at one of its operating points. Layers are strained to `strained to`, else to the lead
 * at the substrate's side; a lead given by numbers, a hard wall and `none` strain nothing. The in-plane wave number is that of
 * the in-plane kinetic energy in the entry, of its own mass model. Throws StackError for a lead that leaves a
 * choice.
 */
export function situationOf(job: Pick<Job, 'stack' | 'growth'>, condition: Condition): Situation {
  const { stack, growth } = job
  const entry = onlyChoice(stack.entry, 'entry')
  const exit = stack.exit === 'hard wall' ? stack.exit : onlyChoice(stack.exit, 'exit')
  const rest: Situation = {
    temperatureK: condition.temperatureK,
    substrateNm: substrateNm(stack.strainedTo, growth.startsAt === 'entry' ? entry : exit),
    massModel: stack.massModel,
    entry,
    exit,
    inPlaneKPerNm: 0,
    biasV: condition.biasV,
  }
  if (condition.inPlaneEv === 0) return rest
  const { massRel, alphaPerEv } = resolveMedium(entry, rest).region
  const { inPlaneEv } = condition
  return { ...rest, inPlaneKPerNm: Math.sqrt((massRel * (1 + alphaPerEv * inPlaneEv) * inPlaneEv) / hbar2Over2m0) }
}

/** Lattice constants are those of 300 K at every temperature. */
function substrateNm(strainedTo: string | null, lead: MediumChoice | 'hard wall'): number | null {
  if (strainedTo === 'none') return null
  if (strainedTo !== null) return bandParameters(strainedTo, null, 300).latticeNm
  if (lead === 'hard wall' || lead.kind === 'numbers') return null
  return bandParameters(lead.material, lead.x, 300).latticeNm
}

function onlyChoice(option: MediumOption, lead: string): MediumChoice {
  if (option.kind === 'material') {
    const { material, x } = option
    return { kind: 'material', material, x: x === null ? null : only(x, `x of ${material}`, lead) }
  }
  return {
    kind: 'numbers',
    name: option.name,
    potentialEv: only(option.potentialEv, 'potential', lead),
    massRel: only(option.massRel, 'mass', lead),
    alphaPerEv: only(option.alphaPerEv, 'alpha', lead),
  }
}

function only(values: readonly number[], what: string, lead: string): number {
  if (values.length !== 1) {
    throw new StackError(`The ${what} of the ${lead} has ${values.length} values (${values.join(', ')}). Give one.`)
  }
  return values[0]
}

import type { Condition, Job, MediumOption } from '../job/index.js'
import { bandParameters, hbar2Over2m0, hcEvNm } from '../media/index.js'
import { resolveRegion } from './resolveMedium.js'
import { StackError } from './StackError.js'
import type { ElectronSituation, LightSituation, MediumChoice, Situation } from './types.js'

/**
 * The conditions and the strain of a job at one of its operating points. Layers are strained to `strained to`, else to the lead
 * at the substrate's side; a lead given by numbers, a hard wall and `none` strain nothing. The in-plane wave number is that of
 * the in-plane kinetic energy in the entry, of its own mass model. Throws StackError for a lead that leaves a
 * choice.
 */
export function situationOf(job: Pick<Job, 'kind' | 'scanEv' | 'stack' | 'growth'>, condition: Condition): Situation {
  return job.kind === 'electron' ? ofElectrons(job, condition) : ofLight(job, condition)
}

function ofLight(
  { scanEv, stack }: Pick<Job, 'scanEv' | 'stack'>,
  { angleDeg, polarisation }: Condition,
): LightSituation {
  const { entry, exit, back, referenceNm } = stack
  if (exit === 'hard wall') throw new StackError('A hard wall is a lead of electrons.')
  return {
    kind: 'light',
    entry: onlyChoice(entry, 'entry'),
    exit: onlyChoice(exit, 'exit'),
    back: back && onlyChoice(back.behind, 'medium behind the exit'),
    angleDeg,
    // Alike at normal incidence.
    polarisation: angleDeg === 0 ? 's' : polarisation,
    referenceNm: referenceNm!,
    rangeNm: [hcEvNm / scanEv[1], hcEvNm / scanEv[0]],
  }
}

function ofElectrons({ stack, growth }: Pick<Job, 'stack' | 'growth'>, condition: Condition): ElectronSituation {
  const entry = onlyChoice(stack.entry, 'entry')
  const exit = stack.exit === 'hard wall' ? stack.exit : onlyChoice(stack.exit, 'exit')
  const rest: ElectronSituation = {
    kind: 'electron',
    temperatureK: condition.temperatureK,
    substrateNm: substrateNm(stack.strainedTo, growth.startsAt === 'entry' ? entry : exit),
    massModel: stack.massModel,
    entry,
    exit,
    inPlaneKPerNm: 0,
    biasV: condition.biasV,
  }
  if (condition.inPlaneEv === 0) return rest
  const { massRel, alphaPerEv } = resolveRegion(entry, rest).region
  const { inPlaneEv } = condition
  return { ...rest, inPlaneKPerNm: Math.sqrt((massRel * (1 + alphaPerEv * inPlaneEv) * inPlaneEv) / hbar2Over2m0) }
}

/** Lattice constants are those of 300 K at every temperature. */
function substrateNm(strainedTo: string | null, lead: MediumChoice | 'hard wall'): number | null {
  if (strainedTo === 'none') return null
  if (strainedTo !== null) return bandParameters(strainedTo, null, 300).latticeNm
  if (lead === 'hard wall' || lead.kind !== 'material') return null
  return bandParameters(lead.material, lead.x, 300).latticeNm
}

function onlyChoice(option: MediumOption, lead: string): MediumChoice {
  if (option.kind === 'material') {
    const { material, x, own } = option
    const fixed = x === null ? null : only(x, `x of ${material}`, lead)
    return { kind: 'material', material, x: fixed, ...(own ? { own } : {}) }
  }
  if (option.kind === 'table') return option
  if (option.kind === 'index') {
    const { name, index, extinction } = option
    return { kind: 'index', name, index: only(index, 'index', lead), extinction: only(extinction, 'extinction', lead) }
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

import { bandParameters } from '../media/index.js'
import { resolveOptics } from './resolveOptics.js'
import { StackError } from './StackError.js'
import type { ElectronSituation, MediumChoice, ResolvedMedium, ResolvedRegion, Situation } from './types.js'

/** A medium at a job's situation. Throws as resolveRegion and resolveOptics do. */
export function resolveMedium(choice: MediumChoice, situation: Situation): ResolvedMedium {
  return situation.kind === 'electron' ? resolveRegion(choice, situation) : resolveOptics(choice, situation)
}

/**
 * A medium at the job's temperature and strain, its potential counted from the edge of the entry at the same conditions.
 *
 * Pseudomorphic strain on (001): parallel = (a_sub - a)/a, perpendicular = -2 (c12/c11) parallel; the conduction edge moves by
 * a_c Tr, the gap by (a_c + a_v) Tr, hydrostatic only. Two-band materials get alpha = 1/gap of the strained gap. Numbers stay
 * as written, alpha too; so do single numbers that the user has put in place of listed ones. Throws StackError where a material has no zero to count from (the entry is given by numbers) or no
 * gap is left, MaterialError for a material that does not exist.
 */
export function resolveRegion(choice: MediumChoice, situation: ElectronSituation): ResolvedRegion {
  if (choice.kind === 'index' || choice.kind === 'table') throw new StackError('A medium of light has no band edge.')
  if (choice.kind === 'numbers') {
    const { potentialEv, massRel, alphaPerEv } = choice
    return { kind: 'electron', region: { potentialEv, massRel, alphaPerEv }, monolayerNm: null, strain: null }
  }
  const { entry } = situation
  if (entry.kind !== 'material') {
    throw new StackError(
      `${choice.material} has no potential here: potentials count from the entry's edge, and the entry is given by numbers. ` +
        'Give the entry as a material, or every layer and lead by numbers.',
    )
  }
  const band = strainedBand(choice, situation)
  return {
    kind: 'electron',
    region: {
      potentialEv: choice.own?.potentialEv ?? band.edgeEv - strainedBand(entry, situation).edgeEv,
      massRel: choice.own?.massRel ?? band.massRel,
      alphaPerEv: choice.own?.alphaPerEv ?? (situation.massModel === 'two-band' ? 1 / band.gapEv : 0),
    },
    monolayerNm: band.monolayerNm,
    strain: band.strain,
  }
}

interface StrainedBand {
  readonly edgeEv: number
  readonly gapEv: number
  readonly massRel: number
  readonly monolayerNm: number
  readonly strain: number | null
}

type MaterialChoice = Extract<MediumChoice, { kind: 'material' }>

function strainedBand({ material, x }: MaterialChoice, { temperatureK, substrateNm }: ElectronSituation): StrainedBand {
  const band = bandParameters(material, x, temperatureK)
  const parallel = substrateNm === null ? 0 : (substrateNm - band.latticeNm) / band.latticeNm
  const perpendicular = -2 * (band.c12 / band.c11) * parallel
  const trace = 2 * parallel + perpendicular
  const gapEv = band.gapEv + (band.acEv + band.avEv) * trace
  if (!(gapEv > 0)) {
    throw new StackError(
      `${material}${x === null ? '' : ` x = ${x}`} has no gap left: ${gapEv} eV at a strain of ${parallel}. Broken gap.`,
    )
  }
  return {
    edgeEv: band.edgeEv + band.acEv * trace,
    gapEv,
    massRel: band.massRel,
    monolayerNm: (band.latticeNm * (1 + perpendicular)) / 2,
    strain: substrateNm === null ? null : parallel,
  }
}

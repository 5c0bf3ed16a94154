import type { Candidate, LayerReport } from '../deliver/index.js'
import { sheetOf, type Yield } from '../growth/index.js'
import type { Job } from '../job/index.js'
import { type PoleList, resonances, type WaveSystem } from '../wave/index.js'
import { pathError } from './audit.js'
import type { BoundJob } from './problem.js'
import { profileOf } from './profileOf.js'
import type { Listed } from './ranking.js'
import { reportEnergies } from './reportEnergies.js'
import { sliceNotes } from './sliceNotes.js'
import { spectrumOf } from './spectrumOf.js'
import { stackNotes } from './stackNotes.js'
import { strainNotes } from './strainNotes.js'

/** A peak narrower than this (eV) is left out of the path's check: energies as doubles don't resolve it. */
const needleEv = 1e-9

/**
 * Everything that the files say of one stack of the list. Figures that belong to one condition (poles, profile, sheet) are those of
 * the condition at which its peak is.
 */
export function candidateOf(job: Job, { design, target }: BoundJob, listed: Listed): Candidate {
  const assignment = Int32Array.from(listed.found.assignment)
  const layers = design.layers(assignment)
  const systems = design.systems(assignment)
  const evaluation = target.evaluate(systems)
  const situation = design.situations[evaluation.peakCondition]
  const system = systems[evaluation.peakCondition]
  const limits = target.limits(systems, evaluation)
  const { peak } = evaluation
  const sheet = sheetOf({ layers, situation, growth: job.growth, target, evaluation, limits })
  const poles = polesOf(system, job.scanEv)
  const energyEv = reportEnergies(job, poles.poles, peak)
  const spectra = systems.map((one, i) => ({
    condition: job.conditions[i].name,
    energyEv,
    ...spectrumOf(one, energyEv),
  }))
  const resolvable = peak !== null && peak.fwhmEv >= needleEv ? peak.energyEv : null
  const alloys = new Set(
    layers.flatMap(({ choice }) =>
      choice.kind === 'material' && choice.x !== null ? [`${choice.material} ${choice.x}`] : [],
    ),
  )
  return {
    rank: listed.rank,
    id: listed.found.score.id,
    listedAs: listed.listedAs,
    margin: listed.found.score.margin,
    totalNm: listed.found.score.totalNm,
    compositions: alloys.size,
    evaluation,
    yield: listed.yield,
    limitingDemand: limiting(job, listed.yield),
    worstLayer: sheet.worstLayer,
    worstShiftEv: sheet.worstShiftEv,
    fluxError: Math.max(...spectra.map(({ fluxError }) => fluxError)),
    pathError: Math.max(...systems.map((one) => pathError(one, job.scanEv, resolvable))),
    stack: design.text(assignment),
    layers: layers.map((layer, j): LayerReport => ({ ...layer, ...sheet.rows[j] })),
    spectra: spectra.map(({ fluxError: _, ...spectrum }) => spectrum),
    resonances: poles.poles,
    profile: profileOf(system, situation, layers, peak?.energyEv ?? null),
    notes: [
      ...stackNotes(job, layers, poles),
      ...(situation.kind === 'electron' ? strainNotes(layers, situation.substrateNm) : []),
      ...sliceNotes(job, { design, target }, layers, evaluation),
    ],
  }
}

/** Of both waves where there are two. */
function polesOf(system: WaveSystem, scanEv: readonly [number, number]): PoleList {
  const own = resonances(system, scanEv, { count: true })
  if (!system.beside) return own
  const other = resonances(system.beside, scanEv, { count: true })
  return {
    poles: [...own.poles, ...other.poles].sort((a, b) => a.energyEv - b.energyEv),
    counted: own.counted === null || other.counted === null ? null : own.counted + other.counted,
    complete: own.complete && other.complete,
  }
}

/** The demand that fails most often, the earlier where two do. */
function limiting(job: Job, grown: Yield | null): string | null {
  if (grown === null) return null
  const most = Math.max(...grown.failures)
  return most > 0 ? job.demands[grown.failures.indexOf(most)].id : null
}

import type { GrownLayer } from '../design/index.js'
import type { Yield } from '../growth/index.js'
import type { Evaluation } from '../target/index.js'
import type { Pole } from '../wave/index.js'

/** Everything that a night hands over: plain data, ready for tables and pictures. */

export interface LayerReport extends GrownLayer {
  /** Counted in grown layers from the substrate, from 1. */
  readonly fromSubstrate: number
  /** Shutter seconds; null where the job gives no rates. */
  readonly seconds: number | null
  /** Change of this layer alone that uses up the least slack, first order; null when unmet or without limits. */
  readonly toleranceNm: number | null
  /** Shift of the first peak for one more monolayer (or step; of a film one more nm); null without a peak. */
  readonly shiftEv: number | null
}

export interface SpectrumReport {
  readonly condition: string
  readonly energyEv: Float64Array
  readonly T: Float64Array
  readonly R: Float64Array
  /** Null where nothing absorbs. */
  readonly A: Float64Array | null
  readonly log10T: Float64Array
}

/** From the entry (z < 0) through the stack, which starts at z = 0, into the exit; at an interface two points with the same z. */
export interface ProfileReport {
  readonly zNm: Float64Array
  /** The band edge in eV; for light the index at the peak, or at the reference where there is none. */
  readonly edge: Float64Array
  /** abs(u)² at the peak, 1/nm; null without a peak. */
  readonly densityPerNm: Float64Array | null
}

export interface Candidate {
  readonly rank: number
  readonly id: string
  readonly listedAs: 'best' | 'family'
  readonly margin: number | null
  readonly totalNm: number
  readonly compositions: number
  readonly evaluation: Evaluation
  readonly yield: Yield | null
  /** Id of the demand that fails most often; null when none ever fails. */
  readonly limitingDemand: string | null
  /** Id of the layer whose one standard deviation shifts the peak most, and that shift. */
  readonly worstLayer: string | null
  readonly worstShiftEv: number | null
  readonly fluxError: number
  readonly pathError: number
  readonly stack: string
  readonly layers: readonly LayerReport[]
  readonly spectra: readonly SpectrumReport[]
  readonly resonances: readonly Pole[]
  readonly profile: ProfileReport
  /** What the reader must know of this stack: an incomplete resonance list, an energy below mid-gap, ... */
  readonly notes: readonly string[]
}

/** record.json */
export interface RunRecord {
  readonly engine: string
  readonly kernel: string
  readonly job_hash: string
  readonly resume_hash: string
  readonly seed: number
  readonly method: string
  readonly units: number
  readonly starts_in_best: number
  /** About the chance that one more start ends in a stack in which none has ended (Good, 1953); null for a complete search. */
  readonly unseen_share: number | null
  /** Of the best after each tenth of the units, so far as they are done; null where there was none. */
  readonly merit_after_tenths: readonly (number | null)[]
  readonly stacks: number
  readonly examined: number
  readonly cut: Readonly<Record<string, number>>
  readonly statement: string
  /** Ids of the listed stacks that no other one betters in yield, total width and number of compositions at once. */
  readonly non_dominated: readonly string[]
  readonly stopped_early: boolean
  readonly seconds: number
}

export interface JobResult {
  readonly name: string
  /** The folder that holds the results. */
  readonly folder: string
  readonly candidates: readonly Candidate[]
  readonly record: RunRecord
  readonly notes: readonly string[]
}

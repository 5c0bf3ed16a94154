import type { GrownLayer } from '../design/index.js'
import type { GrowthSpec } from '../job/index.js'
import { buildSystem, type Situation } from '../model/index.js'
import type { Evaluation, Limit, Target } from '../target/index.js'
import { ErrorModel } from './ErrorModel.js'
import { secondsPerUnit } from './feeds.js'

/** What a layer's line of the sheet adds to the layer. */
export interface SheetRow {
  /** Counted in grown layers from the substrate, from 1. */
  readonly fromSubstrate: number
  /** Shutter seconds at the summed rate of its cells; null where the job does not give them. */
  readonly seconds: number | null
  /** Change of this layer alone that uses up the least slack, first order; null when unmet or when it moves no limit. */
  readonly toleranceNm: number | null
  /** Shift of the peak for one more monolayer (or lattice step; of a film one more nm), from the stack that has it; null without a peak. */
  readonly shiftEv: number | null
}

export interface Sheet {
  /** One a layer, from entry to exit. */
  readonly rows: readonly SheetRow[]
  /** The layer whose one standard deviation shifts the peak most, and by how much, first order and without sign; null without a peak. */
  readonly worstLayer: string | null
  readonly worstShiftEv: number | null
}

export interface SheetTask {
  /** From entry to exit. */
  readonly layers: readonly GrownLayer[]
  /** That of the condition at which the peak is. */
  readonly situation: Situation
  readonly growth: Pick<GrowthSpec, 'startsAt' | 'sources' | 'spread'>
  readonly target: Pick<Target, 'maximumNear' | 'maximumSlope'>
  readonly evaluation: Evaluation
  readonly limits: readonly Limit[]
}

/**
 * The rows of a stack's layer sheet. A whole monolayer is no small change: its shift is that of a stack really one monolayer
 * thicker, in which the maximum nearest to the first-order forecast is taken for the same peak.
 */
export function sheetOf({ layers, situation, growth, target, evaluation, limits }: SheetTask): Sheet {
  const model = new ErrorModel(layers, growth)
  const { met, peak } = evaluation
  const system = buildSystem(situation, layers)
  const slope = peak ? target.maximumSlope(system, peak.energyEv) : null
  const perLayer = slope ? slope.length / layers.length : 0
  const energy = slope && peak ? target.maximumNear(system, peak.energyEv) : null

  const rows = layers.map((layer, j): SheetRow => {
    const perUnit = secondsPerUnit(model.feeds[j])
    const unitNm = layer.resolved.kind === 'light' ? 1 : layer.resolved.monolayerNm
    return {
      fromSubstrate: model.places[j],
      seconds: perUnit === null || unitNm === null ? null : perUnit * (layer.widthNm / unitNm),
      toleranceNm: met ? tolerance(j) : null,
      shiftEv: slope && energy !== null ? shift(j, slope[perLayer * j], energy) : null,
    }
  })
  if (!slope) return { rows, worstLayer: null, worstShiftEv: null }
  const shifts = layers.map((_, j) => Math.abs(slope[perLayer * j]) * model.layerSdNm[j])
  const worst = shifts.reduce((most, next, j) => (next > shifts[most] ? j : most), 0)
  return { rows, worstLayer: layers[worst].id, worstShiftEv: shifts[worst] }

  function tolerance(j: number): number | null {
    let least = Infinity
    for (const { slack, gradient } of limits) {
      const size = gradient.length / layers.length
      least = Math.min(least, slack / Math.abs(gradient[size * j]))
    }
    return least < Infinity ? least : null
  }

  function shift(j: number, slopeOfWidth: number, from: number): number | null {
    const { resolved, stepNm } = layers[j]
    const step = resolved.kind === 'light' ? 1 : (resolved.monolayerNm ?? stepNm)
    const thicker = layers.map((layer, i) => (i === j ? { ...layer, widthNm: layer.widthNm + step } : layer))
    const energy = target.maximumNear(buildSystem(situation, thicker), from + slopeOfWidth * step)
    return energy === null ? null : energy - from
  }
}

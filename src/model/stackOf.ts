import type { Condition, Job, LayerRow } from '../job/index.js'
import { exitRegion } from './buildSystem.js'
import { resolveMedium } from './resolveMedium.js'
import { StackError } from './StackError.js'
import { situationOf } from './situationOf.js'
import { slicedLayers } from './slicedLayers.js'
import { ownSlices, slicePlan } from './slicePlan.js'
import type { ElectronStack, LightStack, MediumChoice, ModelLayer, Situation } from './types.js'

/**
 * A stack of rows, entry to exit, at a condition of a job: its leads, temperature, strain and mass model. A width is the count
 * of the layer's own monolayers where the row has one, else the nm as written. Under a bias every layer is cut into its slices. Without `condition` the job's only one, or its
 * first. Throws StackError for a job of light, a condition that the job has not, and for a count and a width that contradict each other.
 */
export function stackOf(job: Job, rows: readonly LayerRow[], condition?: string): ElectronStack | LightStack {
  if (job.kind !== 'electron') throw new StackError(`The job is of kind ${job.kind}: its stacks are not computed yet.`)
  const situation = situationOf(job, conditionOf(job, condition))
  const { entry, inPlaneKPerNm } = situation
  const { regions, width } = slicedLayers(situation, modelLayers(job, rows, situation))
  return {
    kind: 'electron',
    entry: resolveMedium(entry, situation).region,
    layers: regions.map((region, s) => ({ ...region, widthNm: width[s] })),
    exit: exitRegion(situation),
    inPlaneKPerNm,
  }
}

/** Rows with an id of the job are cut as the job cuts that layer, others by their own width. */
function modelLayers(job: Job, rows: readonly LayerRow[], situation: Situation): ModelLayer[] {
  const plan = situation.biasV === 0 ? null : slicePlan(job.stack, situation)
  const biased = plan?.biased(rows.map(({ id }) => id ?? ''))
  return rows.map((row, i) => {
    const choice: MediumChoice = row.medium
    const widthNm = widthOf(row, resolveMedium(choice, situation).monolayerNm)
    return { choice, widthNm, slices: plan?.slices(row.id ?? '') || ownSlices(widthNm), biased: biased?.[i] ?? false }
  })
}

function conditionOf({ conditions }: Job, name: string | undefined): Condition {
  const found = name === undefined ? conditions[0] : conditions.find((condition) => condition.name === name)
  if (found) return found
  const names = conditions.map((condition) => `"${condition.name}"`).join(', ')
  throw new StackError(`The job has no condition "${name}". It has ${names}.`)
}

function widthOf({ where, ml, widthNm }: LayerRow, monolayerNm: number | null): number {
  if (ml === null) {
    if (widthNm === null) throw new StackError(`${where}  The layer has neither ml nor width_nm. Give one of them.`)
    return widthNm
  }
  if (monolayerNm === null)
    throw new StackError(`${where}  ml is ${ml}, but a medium given by numbers has no monolayer.`)
  const counted = ml * monolayerNm
  if (widthNm !== null && !(Math.abs(widthNm - counted) <= agreement * counted)) {
    throw new StackError(
      `${where}  ml is ${ml}, which is ${counted} nm of this layer, but width_nm is ${widthNm}. Leave one of the two empty.`,
    )
  }
  return counted
}

/** Relative: a table rounded to six digits still agrees with its own count. */
const agreement = 1e-5

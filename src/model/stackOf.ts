import type { Condition, Job, LayerRow, MediumOption, StackItem } from '../job/index.js'
import { exitRegion } from './buildSystem.js'
import { resolveRegion } from './resolveMedium.js'
import { resolveOptics } from './resolveOptics.js'
import { StackError } from './StackError.js'
import { situationOf } from './situationOf.js'
import { slicedLayers } from './slicedLayers.js'
import { ownSlices, slicePlan } from './slicePlan.js'
import type { ElectronSituation, ElectronStack, LightSituation, LightStack, MediumChoice, ModelLayer } from './types.js'

/**
 * A stack of rows, entry to exit, at a condition of a job: its leads, temperature, strain and mass model. A width is the count
 * of the layer's own monolayers where the row has one, else the nm as written. Under a bias every layer is cut into its slices. Without `condition` the job's only one, or its
 * first. A name that the job gives to a medium of light means that medium, whatever index stands beside it. Throws StackError for a
 * condition that the job has not, for one that is half s and half p, and for a count and a width that contradict each other.
 */
export function stackOf(job: Job, rows: readonly LayerRow[], condition?: string): ElectronStack | LightStack {
  const situation = situationOf(job, conditionOf(job, condition))
  if (situation.kind === 'light') return lightStack(job, rows, situation)
  const { entry, inPlaneKPerNm } = situation
  const { regions, width } = slicedLayers(situation, modelLayers(job, rows, situation))
  return {
    kind: 'electron',
    entry: resolveRegion(entry, situation).region,
    layers: regions.map((region, s) => ({ ...region, widthNm: width[s] })),
    exit: exitRegion(situation),
    inPlaneKPerNm,
  }
}

function lightStack(job: Job, rows: readonly LayerRow[], situation: LightSituation): LightStack {
  const { entry, exit, back, angleDeg, polarisation } = situation
  if (polarisation === 'mean')
    throw new StackError('This condition is half s and half p, and a stack has one of them. Average the two.')
  const own = namedOptics(job)
  // The library may ask anywhere.
  const medium = (choice: MediumChoice) => resolveOptics(choice, { ...situation, rangeNm: null }).medium
  return {
    kind: 'light',
    entry: medium(entry),
    layers: rows.map((row) => {
      const name = row.medium.kind === 'material' ? row.medium.material : row.medium.name
      return { ...medium(own.get(name ?? '') ?? row.medium), widthNm: widthOf(row, null) }
    }),
    exit: medium(exit),
    angleDeg,
    polarisation,
    ...(back === null ? {} : { back: { exit: medium(back) } }),
  }
}

/** The job's own media of light that are fixed, by name. */
function namedOptics({ stack }: Job): ReadonlyMap<string, MediumChoice> {
  const found = new Map<string, MediumChoice>()
  const note = (option: MediumOption | 'hard wall') => {
    if (option === 'hard wall' || option.kind === 'material' || option.kind === 'numbers') return
    if (option.kind === 'table') found.set(option.name, option)
    else if (option.name !== null && option.index.length === 1 && option.extinction.length === 1)
      found.set(option.name, { ...option, index: option.index[0], extinction: option.extinction[0] })
  }
  const visit = (items: readonly StackItem[]) => {
    for (const item of items) {
      if (item.kind === 'layer') item.media?.forEach(note)
      else {
        visit(item.period)
        visit(item.between)
      }
    }
  }
  note(stack.entry)
  note(stack.exit)
  visit(stack.layers)
  return found
}

/** Rows with an id of the job are cut as the job cuts that layer, others by their own width. */
function modelLayers(job: Job, rows: readonly LayerRow[], situation: ElectronSituation): ModelLayer[] {
  const plan = situation.biasV === 0 ? null : slicePlan(job.stack, situation)
  const biased = plan?.biased(rows.map(({ id }) => id ?? ''))
  return rows.map((row, i) => {
    const choice: MediumChoice = row.medium
    const widthNm = widthOf(row, resolveRegion(choice, situation).monolayerNm)
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

import type { MediumOption } from '../job/index.js'
import type { MediumChoice } from '../model/index.js'
import type { LayerReport } from './types.js'

/** Whole monolayers of the layer's own, or null where its width does not count them. */
export function mlOf(layer: LayerReport): number | null {
  return layer.resolved.monolayerNm !== null && layer.stepNm === layer.resolved.monolayerNm ? layer.count : null
}

/** `AlGaAs 0.35`, a name of the user's own, or the potential of media by numbers. */
export function mediumText(choice: MediumChoice): string {
  if (choice.kind === 'table') return choice.name
  if (choice.kind === 'numbers') return choice.name ?? `${short(choice.potentialEv * 1000)} meV`
  if (choice.kind === 'index') return choice.name ?? indexText(choice.index, choice.extinction)
  const name = choice.own?.name ?? choice.material
  return choice.x === null ? name : `${name} ${choice.x}`
}

/** The same for a lead of the job. */
export function leadText(lead: MediumOption | 'hard wall'): string {
  if (lead === 'hard wall') return lead
  if (lead.kind === 'table') return lead.name
  if (lead.kind === 'numbers') return lead.name ?? `${short(lead.potentialEv[0] * 1000)} meV`
  if (lead.kind === 'index') return lead.name ?? indexText(lead.index[0], lead.extinction[0])
  const name = lead.own?.name ?? lead.material
  return lead.x === null ? name : `${name} ${lead.x[0]}`
}

function indexText(index: number, extinction: number): string {
  return extinction === 0 ? `n ${short(index)}` : `n ${short(index)} + ${short(extinction)}i`
}

/** `12 ML`, or the width in nm of what has no monolayers. */
export function widthText(layer: LayerReport): string {
  const ml = mlOf(layer)
  return ml === null ? `${short(layer.widthNm)} nm` : `${ml} ML`
}

/** `79.87 meV`, `20 neV`: four digits in the unit that keeps them near the point. */
export function energyText(ev: number): string {
  const [name, perEv] = energyUnits.find(([, per]) => Math.abs(ev) * per >= 0.1) ?? energyUnits[0]
  return `${short(ev * perEv)} ${name}`
}

const energyUnits: readonly [name: string, perEv: number][] = [
  ['meV', 1e3],
  ['\u00b5eV', 1e6],
  ['neV', 1e9],
  ['peV', 1e12],
]

/** A number for the eye: four digits, no trailing zeros. */
export function short(value: number): string {
  return String(Number(value.toPrecision(4)))
}

import type { GrownLayer } from '../design/index.js'
import { bandParameters } from '../media/index.js'
import { criticalThicknessNm } from '../model/index.js'

/** Strain below this is that of nearly matched crystals (GaAs and AlAs) and no news. */
const small = 0.003

/**
 * Strained layers thicker than the critical thickness of Matthews and Blakeslee for a buried layer, and the mean strain of the stack:
 * sentences, none where strain is small. `substrateNm`: the lattice constant that all are strained to; null: none.
 */
export function strainNotes(layers: readonly GrownLayer[], substrateNm: number | null): string[] {
  if (substrateNm === null) return []
  const notes: string[] = []
  let total = 0
  let sum = 0
  let most = 0
  for (const { choice, resolved, widthNm } of layers) {
    const strain = resolved.strain ?? 0
    total += widthNm
    sum += strain * widthNm
    most = Math.max(most, Math.abs(strain))
    if (choice.kind !== 'material' || Math.abs(strain) < small) continue
    const limit = criticalThicknessNm(bandParameters(choice.material, choice.x, 300), substrateNm, 'buried')
    if (widthNm <= limit) continue
    const name = choice.x === null ? choice.material : `${choice.material} x = ${choice.x}`
    notes.push(
      `${name}, ${short(widthNm)} nm thick, is strained by ${percent(strain)} and thicker than its critical thickness of ` +
        `${short(limit)} nm (Matthews and Blakeslee, a buried layer): it may relax by dislocations.`,
    )
  }
  if (most >= small && total > 0)
    notes.push(`The mean strain of the stack is ${percent(sum / total)} over ${short(total)} nm.`)
  return notes
}

function percent(strain: number): string {
  return `${Number((100 * strain).toPrecision(3))} %`
}

function short(nm: number): string {
  return String(Number(nm.toPrecision(3)))
}

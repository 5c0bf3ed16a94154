import { createHash } from 'node:crypto'
import { canonicalJson } from '../job/index.js'
import type { MediumChoice } from '../model/index.js'
import type { Lattice, Stretch } from './Lattice.js'
import { listsOf } from './LayerLattice.js'
import { mediumIdentity } from './mediumIdentity.js'

/**
 * First 12 hex digits of SHA-256 over the canonical JSON of leads, what the layers are strained to, and the layers from entry to exit:
 * material and x, or numbers; the count of steps, and the step where it is not the layer's own monolayer. Names that the job gives to
 * numbers play no part.
 */
export function stackId(lattice: Lattice, stretches: readonly Stretch[]): string {
  const { entry, exit } = lattice.situations[0]
  const content = {
    leads: [mediumIdentity(entry), exit === 'hard wall' ? exit : mediumIdentity(exit)],
    strain: lattice.strainedTo && mediumIdentity(lattice.strainedTo),
    layers: stretches.map(({ medium, count }) => ({
      ...mediumIdentity(medium.choice),
      count,
      ...(medium.widths.monolayers ? {} : { stepNm: medium.widths.stepNm }),
    })),
  }
  return createHash('sha256').update(canonicalJson(content)).digest('hex').slice(0, 12)
}

/** `AlGaAs(0.35) 12 / GaAs 18 / AlGaAs(0.35) 12 ML`; the unit stands at each layer where they differ. */
export function stackText({ layers }: Lattice, stretches: readonly Stretch[]): string {
  const options = layers.flatMap((layer) => layer.options)
  const free = options.filter((option) => listsOf(option).some((list) => list !== undefined && list.length > 1))
  const ranging = new Set(free.map((option) => (option.kind === 'material' ? null : option.name)))
  const units = stretches.map(({ medium }) => (medium.widths.monolayers ? 'ML' : 'nm'))
  const single = units.every((unit) => unit === units[0])
  const parts = stretches.map(({ medium, count }, i) => {
    const width = medium.widths.monolayers ? count : Number((count * medium.widths.stepNm).toPrecision(6))
    return `${mediumText(medium.choice, ranging)} ${width}${single ? '' : ` ${units[i]}`}`
  })
  return single && parts.length > 0 ? `${parts.join(' / ')} ${units[0]}` : parts.join(' / ')
}

/** A name says enough unless its numbers are free. */
function mediumText(choice: MediumChoice, ranging: ReadonlySet<string | null>): string {
  if (choice.kind === 'material') {
    const { material, x, own } = choice
    return `${own?.name ?? material}${x === null ? '' : `(${x})`}`
  }
  if (choice.kind === 'table') return choice.name
  if (choice.kind === 'index') {
    const { name, index, extinction } = choice
    if (name !== null && !ranging.has(name)) return name
    return `${name ?? ''}(${rounded(index)}${extinction === 0 ? '' : ` + ${rounded(extinction)}i`})`
  }
  const { name, potentialEv, massRel, alphaPerEv } = choice
  if (name !== null && !ranging.has(name)) return name
  const alpha = alphaPerEv === 0 ? '' : `, ${rounded(alphaPerEv)} /eV`
  return `${name ?? ''}(${rounded(potentialEv * 1000)} meV, ${rounded(massRel)}${alpha})`
}

/** Enough digits to tell lattice values apart, without the tail of a decimal fraction. */
function rounded(value: number): number {
  return Number(value.toPrecision(9))
}

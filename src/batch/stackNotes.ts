import type { GrownLayer } from '../design/index.js'
import type { Job, Override } from '../job/index.js'
import { materialNotes } from '../media/index.js'
import type { PoleList } from '../wave/index.js'

function overrideNote(
  material: string,
  { name, potentialEv, massRel, alphaPerEv, index, extinction }: Override,
): string {
  const numbers = [
    potentialEv === undefined ? '' : `an edge of ${Number((1000 * potentialEv).toPrecision(9))} meV`,
    massRel === undefined ? '' : `a mass of ${massRel}`,
    alphaPerEv === undefined ? '' : `alpha ${alphaPerEv} /eV`,
    index === undefined ? '' : `an index of ${index}`,
    extinction === undefined ? '' : `an extinction of ${extinction}`,
  ]
  return `${name} is ${material} with ${numbers.filter((text) => text !== '').join(', ')} of the job's instead of the listed.`
}

/** What the reader must know of one stack: sentences, none when all is well. */
export function stackNotes(job: Job, layers: readonly GrownLayer[], poles: PoleList): string[] {
  const notes: string[] = []
  if (!poles.complete) {
    notes.push(
      `The list of resonances may be incomplete: ${poles.poles.length} were found, and a count by another way gives ` +
        `${poles.counted ?? 'none'}.`,
    )
  }
  for (const { choice } of layers) {
    if (choice.kind !== 'material' || job.kind === 'light') continue
    for (const { temperatureK } of job.conditions) notes.push(...materialNotes(choice.material, choice.x, temperatureK))
  }
  for (const { choice } of layers)
    if (choice.kind === 'material' && choice.own) notes.push(overrideNote(choice.material, choice.own))
  return [...new Set(notes)]
}

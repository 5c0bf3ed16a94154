import type { GrownLayer } from '../design/index.js'
import type { Job } from '../job/index.js'
import { materialNotes } from '../media/index.js'
import type { PoleList } from '../wave/index.js'

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
  return [...new Set(notes)]
}

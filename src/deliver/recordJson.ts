import type { Job } from '../job/index.js'
import { cautions } from './cautions.js'
import type { JobResult } from './types.js'

/**
 * record.json: how the list came about, then what a reader must know of it: `notes` on the job as a whole, `candidate_notes` by the
 * id of the stack, `cautions`. (The tables keep to their columns, so the sentences live here and under the pictures.)
 */
export function recordJson(job: Job, result: JobResult): string {
  const noted = result.candidates.filter(({ notes }) => notes.length > 0)
  const record = {
    ...result.record,
    notes: result.notes,
    candidate_notes: Object.fromEntries(noted.map(({ id, notes }) => [id, notes])),
    cautions: cautions(job.kind),
  }
  return `${JSON.stringify(record, null, 2)}\n`
}

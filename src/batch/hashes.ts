import { createHash } from 'node:crypto'
import { canonicalJson, type Job, jobContent, resumeContent } from '../job/index.js'
import { engineVersion } from './engine.js'

/** SHA-256 of all that the results show of a job. */
export function jobHash(job: Job): string {
  return sha256(jobContent(job))
}

/** SHA-256 of what the search sees of a job, and of the engine: units of equal hashes are the same units. */
export function resumeHash(job: Job): string {
  return sha256(`${engineVersion}\n${resumeContent(job)}`)
}

/** The seed of all units: the resume hash without the engine. */
export function searchSeed(job: Job): string {
  return sha256(resumeContent(job))
}

/** What a yield depends on beside the stack and the number of trials, shortened: it marks yields in a journal. */
export function yieldHash(job: Job): string {
  return sha256(`${resumeHash(job)}\n${canonicalJson(job.demands)}`).slice(0, 12)
}

function sha256(text: string): string {
  return createHash('sha256').update(text).digest('hex')
}

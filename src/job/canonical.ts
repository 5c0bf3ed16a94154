import type { Demand, Job } from './job.js'

/** JSON with sorted keys, no white space and the shortest numbers that read back the same; -0 is 0. Throws on a non-finite number. */
export function canonicalJson(value: unknown): string {
  if (typeof value === 'number') {
    if (!Number.isFinite(value)) throw new RangeError(`${value} has no place in canonical JSON`)
    return JSON.stringify(value === 0 ? 0 : value)
  }
  if (value === null || typeof value !== 'object') return JSON.stringify(value ?? null)
  if (Array.isArray(value)) return `[${value.map(canonicalJson).join(',')}]`
  const entries = Object.entries(value)
    .filter(([, part]) => part !== undefined)
    .sort(([a], [b]) => (a < b ? -1 : a > b ? 1 : 0))
  return `{${entries.map(([key, part]) => `${JSON.stringify(key)}:${canonicalJson(part)}`).join(',')}}`
}

/**
 * What the search sees of a job, as canonical JSON: everything but `name`, `note`, `deliver`, `trials`, `accept` and the layout of
 * the text; the rows of the files that it names stand in for the files.
 */
export function resumeContent(job: Job): string {
  const { trials: _trials, assumed: _assumed, ...growth } = job.growth
  return canonicalJson({
    format: job.format,
    kind: job.kind,
    conditions: job.conditions,
    stack: job.stack,
    scanEv: job.scanEv,
    resolutionEv: job.resolutionEv,
    demands: job.demands.map(asSearched),
    growth,
    search: job.search,
  })
}

/** The whole filled job as canonical JSON: what the results show comes from this and nothing else. */
export function jobContent(job: Job): string {
  const { file: _file, text: _text, files: _files, notes: _notes, ...filled } = job
  return canonicalJson(filled)
}

function asSearched({ accept: _accept, ...demand }: Demand): unknown {
  if (demand.kind !== 'curve') return demand
  const { file: _file, ...rest } = demand
  return rest
}

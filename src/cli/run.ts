import { availableParallelism } from 'node:os'
import { join } from 'node:path'
import { runJob } from '../batch/index.js'
import type { JobResult } from '../deliver/index.js'
import type { Job } from '../job/index.js'
import { candidateTable } from './candidateTable.js'
import { colours, print, say, sayError } from './console.js'
import { exitCode } from './exitCodes.js'
import { jobFiles } from './jobFiles.js'
import { ProgressLine } from './ProgressLine.js'
import { readJobs } from './readJobs.js'
import { UsageError } from './UsageError.js'

/** As commander hands them over. */
export interface RunArguments {
  readonly threads?: string
  readonly results: string
  readonly until?: string
  readonly fresh?: boolean
  readonly json?: boolean
  readonly quiet?: boolean
  readonly strict?: boolean
}

/** Runs the jobs one after another; returns the exit code. */
export async function run(args: readonly string[], options: RunArguments): Promise<number> {
  const threads = threadsOf(options.threads)
  const until = options.until === undefined ? undefined : nextTime(options.until, new Date())
  const { jobs, wrong } = await readJobs(jobFiles(args))
  const stop = new AbortController()
  const interrupt = () => {
    if (stop.signal.aborted) process.exit(exitCode.interrupted)
    stop.abort(new Interrupted())
  }
  for (const signal of interrupting) process.on(signal, interrupt)
  let failed = false
  let unmet = false
  try {
    for (const job of jobs) {
      const line = new ProgressLine()
      try {
        const result = await runJob(job, {
          threads,
          resultsDir: options.results,
          fresh: options.fresh,
          until,
          signal: stop.signal,
          progress: options.quiet ? undefined : (progress) => line.show(progress),
        })
        line.end()
        report(job, result, options)
        unmet ||= !result.candidates.some(({ evaluation }) => evaluation.met)
      } catch (error) {
        line.end()
        if (stop.signal.aborted) {
          say(`Interrupted. Every finished unit of ${job.name} is kept; the same command goes on.`)
          return exitCode.interrupted
        }
        failed = true
        sayError(`${job.file}  ${(error as Error).message}`)
      }
    }
  } finally {
    for (const signal of interrupting) process.off(signal, interrupt)
  }
  if (failed) return exitCode.failed
  if (wrong) return exitCode.wrong
  return options.strict && unmet ? exitCode.unmet : exitCode.done
}

/** Ctrl-C, a shutdown, a terminal that is closed. */
const interrupting = ['SIGINT', 'SIGTERM', 'SIGHUP'] as const

class Interrupted extends Error {}

function report(job: Job, result: JobResult, { json, quiet }: RunArguments): void {
  const { candidates, record, folder, notes } = result
  const met = candidates.filter(({ evaluation }) => evaluation.met).length
  if (!quiet) {
    say(colours.bold(job.name))
    for (const note of notes) say(`note  ${note}`)
    if (candidates.length > 0) say(candidateTable(result, job.kind))
    say(`${limitsText(job, met, candidates.length)} ${sentence(record.statement)}`)
    if (record.stopped_early)
      say(`Stopped early, after ${record.units} units; the same command without --until goes on.`)
    say(`Results: ${folder}`)
  }
  if (!json) {
    print(join(folder, 'candidates.csv'))
    return
  }
  const best = candidates.at(0)
  print(
    JSON.stringify({
      name: result.name,
      folder,
      listed: candidates.length,
      meets: met,
      best: best && {
        id: best.id,
        meets: best.evaluation.met,
        merit: best.evaluation.merit,
        margin: best.margin,
        yield_pct: best.yield?.pct ?? null,
        stack: best.stack,
      },
      record,
    }),
  )
}

function limitsText(job: Job, met: number, listed: number): string {
  if (job.demands.every(({ kind }) => kind === 'curve'))
    return 'The job states goals and no limits: the list is in the order of the merit.'
  return `${met} of ${listed} listed meet all limits.`
}

function sentence(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1)
}

function threadsOf(text: string | undefined): number {
  if (text === undefined) return availableParallelism()
  const threads = Number(text)
  if (!Number.isInteger(threads) || threads < 1 || threads > 256) {
    throw new UsageError(`--threads "${text}" is no number of threads. Write a whole number from 1 to 256.`)
  }
  return threads
}

/** The next moment at which the clock shows this. */
export function nextTime(text: string, now: Date): Date {
  const match = /^([01]?\d|2[0-3]):([0-5]\d)$/.exec(text)
  if (!match) throw new UsageError(`--until "${text}" is no time of day. Write it like 06:30.`)
  const then = new Date(now)
  then.setHours(Number(match[1]), Number(match[2]), 0, 0)
  if (then <= now) then.setDate(then.getDate() + 1)
  return then
}

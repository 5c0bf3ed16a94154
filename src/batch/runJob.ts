import { performance } from 'node:perf_hooks'
import { type Candidate, type JobResult, type RunRecord, writeResults } from '../deliver/index.js'
import type { Yield } from '../growth/index.js'
import type { Job } from '../job/index.js'
import { Archive, type Found, type SliceResult, startBoundOf, type UnitResult } from '../search/index.js'
import { kernelChecksum, kernelName } from '../wave/index.js'
import { worstFluxError, worstPathError } from './audit.js'
import { candidateOf } from './candidateOf.js'
import { engineVersion } from './engine.js'
import { jobHash, resumeHash, yieldHash } from './hashes.js'
import { Journal } from './Journal.js'
import { type Method, methodOf } from './methodOf.js'
import { nonDominated } from './nonDominated.js'
import { OrderedFold } from './OrderedFold.js'
import { type BoundJob, problemOf } from './problem.js'
import { Pace, type Progress } from './progress.js'
import { familyHeads, grownFirst, listOf, mostListed, type Ranked, trialsOf } from './ranking.js'
import { resultsFolder } from './resultsFolder.js'
import { takeLock } from './runLock.js'
import { WorkerPool } from './WorkerPool.js'

export interface RunOptions {
  /** Worker threads, at least 1; default 1. The answer does not depend on it. */
  readonly threads?: number
  /** Where the folder of the results is made; default `results`. */
  readonly resultsDir?: string
  /** Start anew: the old journal is renamed. */
  readonly fresh?: boolean
  /** Stop the search early enough to have results by then. */
  readonly until?: Date
  /** Called after every piece of work. */
  readonly progress?: (progress: Progress) => void
  /** Ends the run at once; finished units are kept. */
  readonly signal?: AbortSignal
}

/**
 * Runs a job to its results, going on with what earlier runs of the same job finished. The files depend on the job alone: not on
 * threads, interruptions or machines.
 *
 * @throws DesignError for a job without makeable stacks; RunError when its folder is in use or was computed by a machine whose
 * arithmetic differs; the signal's reason when it was interrupted; what the file system says
 */
export async function runJob(job: Job, options: RunOptions = {}): Promise<JobResult> {
  const bound = problemOf(job)
  const folder = resultsFolder(options.resultsDir ?? 'results', job.name)
  const unlock = takeLock(folder)
  try {
    const run = new Run(job, bound, folder, options)
    try {
      return await run.finish()
    } finally {
      await run.close()
    }
  } finally {
    unlock()
  }
}

class Run {
  private readonly archive: Archive
  private readonly fold: OrderedFold
  private readonly yields = new Map<string, Yield>()
  private readonly journal: Journal
  private readonly method: Method
  private readonly total: number
  /** Of a complete search: its first round, and what cut how many assignments. */
  private round: readonly Found[] | null = null
  private readonly cuts = new Map<number, SliceResult['cut']>()
  private readonly yieldOf: string
  private pool: WorkerPool | null = null
  /** Of all work in the journal, over all threads and sittings. */
  private workSeconds = 0

  constructor(
    private readonly job: Job,
    private readonly bound: BoundJob,
    private readonly folder: string,
    private readonly options: RunOptions,
  ) {
    this.method = methodOf(job.search, bound.problem)
    this.total = this.method.units
    this.archive = new Archive(bound.problem.compare, this.total)
    this.fold = new OrderedFold((result) => this.archive.add(result))
    this.yieldOf = yieldHash(job)
    const head = {
      format: 1,
      name: job.name,
      engine: engineVersion,
      kernel: kernelName,
      checksum: kernelChecksum(),
      resume_hash: resumeHash(job),
    } as const
    this.journal = Journal.open(folder, head, options.fresh ?? false, (entry) => {
      if ('unit' in entry && !this.method.plan) this.fold.offer(entry.unit)
      else if ('round' in entry) this.round = entry.round
      else if ('slice' in entry && this.method.plan) this.fold.offer(this.asUnit(entry.slice))
      else if ('grown' in entry && entry.grown.of === this.yieldOf) this.keepYield(entry.grown.id, entry.grown.yield)
      if ('seconds' in entry) this.workSeconds += entry.seconds
    })
  }

  async finish(): Promise<JobResult> {
    await this.search()
    const ranked = await this.grow()
    return this.deliver(ranked)
  }

  async close(): Promise<void> {
    this.journal.close()
    await this.pool?.close()
  }

  private async search(): Promise<void> {
    const pace = new Pace(this.fold.count, this.total)
    this.tell('search', pace)
    if (this.fold.count === this.total) return
    const { signal } = this.options
    if (this.method.plan && this.round === null) {
      await this.workers().each<readonly Found[]>(
        [{ round: true }],
        (round, seconds) => {
          this.journal.append({ round, seconds })
          this.workSeconds += seconds
          this.round = round
        },
        undefined,
        signal,
      )
    }
    const missing = this.fold.missing(this.total)
    const keep = (entry: { unit: UnitResult } | { slice: SliceResult }, seconds: number) => {
      this.journal.append({ ...entry, seconds })
      this.workSeconds += seconds
      this.fold.offer('unit' in entry ? entry.unit : this.asUnit(entry.slice))
      pace.finish()
      this.tell('search', pace)
    }
    const stop = this.deadline()
    if (this.method.plan) {
      const startBound = startBoundOf(this.round ?? [])
      const tasks = tasksOf(missing, (slice) => ({ slice, startBound }))
      await this.workers().each<SliceResult>(tasks, (slice, seconds) => keep({ slice }, seconds), stop, signal)
    } else {
      const tasks = tasksOf(missing, (unit) => ({ unit }))
      await this.workers().each<UnitResult>(tasks, (unit, seconds) => keep({ unit }, seconds), stop, signal)
    }
  }

  /** A slice as the archive takes it; what cut how many is counted apart. */
  private asUnit({ slice, found, examined, cut }: SliceResult): UnitResult {
    const total = Object.values(cut).reduce((sum, count) => sum + count, 0)
    this.cuts.set(slice, cut)
    return { unit: slice, found, examined, cut: total, stop: 'every stack accounted for' }
  }

  /** Yields of the first stacks of the order and of the heads of other families, from the journal or grown now. */
  private async grow(): Promise<Ranked[]> {
    const { job, bound, archive } = this
    const { effort } = job.search
    const ordered = archive.best(Number.POSITIVE_INFINITY)
    const first = ordered.slice(0, grownFirst(effort))
    const heads = familyHeads(bound.design, ordered, job.deliver.candidates)
    const chosen = [...new Set([...ordered.slice(0, Math.max(first.length, job.deliver.candidates)), ...heads])]
    if (!this.hasLimits()) return chosen.map((found) => ({ found, yield: null }))

    const grown = new Set([...first, ...heads])
    const trials = ({ score }: Found) => trialsOf(score, job.growth.trials, effort)
    const wanted = [...grown].filter((found) => !this.yieldIn(found, trials(found)))
    const pace = new Pace(grown.size - wanted.length, grown.size)
    if (wanted.length > 0) {
      this.tell('yield', pace)
      const ids = new Map(wanted.map((found) => [found.assignment, found.score.id]))
      const tasks = wanted.map((found) => ({ grow: found.assignment, trials: trials(found) }))
      await this.workers().each<Yield>(
        tasks,
        (result, seconds, task) => {
          const id = ids.get((task as { grow: readonly number[] }).grow)!
          this.journal.append({ grown: { id, of: this.yieldOf, yield: result }, seconds })
          this.workSeconds += seconds
          this.keepYield(id, result)
          pace.finish()
          this.tell('yield', pace)
        },
        undefined,
        this.options.signal,
      )
    }
    return chosen.map((found) => ({ found, yield: grown.has(found) ? this.yieldIn(found, trials(found)) : null }))
  }

  private deliver(ranked: readonly Ranked[]): JobResult {
    const { job, bound, folder } = this
    this.tell('results', new Pace(0, 1))
    const notes = [...job.notes, ...bound.design.notes, ...this.journal.notes]
    const { candidates, refused } = this.soundList(ranked)
    for (const { id, fluxError, pathError } of refused) {
      notes.push(`Stack ${id} is not listed: its check fails (flux error ${fluxError}, path error ${pathError}).`)
    }
    const result: JobResult = { name: job.name, folder, candidates, record: this.record(candidates), notes }
    writeResults(folder, job, result)
    return result
  }

  /** The list; a stack with a number that its own check contradicts leaves it, and the next takes its place. */
  private soundList(ranked: readonly Ranked[]): { candidates: Candidate[]; refused: Candidate[] } {
    const { job, bound } = this
    const wanted = Math.min(job.deliver.candidates, mostListed)
    const byYield = job.demands.every(({ kind }) => kind !== 'curve')
    const refused: Candidate[] = []
    for (;;) {
      const left = ranked.filter(({ found }) => !refused.some(({ id }) => id === found.score.id))
      const candidates = listOf(left, bound.design, wanted, byYield).map((listed) => candidateOf(job, bound, listed))
      const unsound = candidates.filter((one) => !(one.fluxError <= worstFluxError && one.pathError <= worstPathError))
      if (unsound.length === 0) return { candidates, refused }
      refused.push(...unsound)
    }
  }

  private record(candidates: readonly Candidate[]): RunRecord {
    const { job, bound, archive, method } = this
    const stacks = bound.design.stackCount()
    return {
      engine: engineVersion,
      kernel: kernelName,
      job_hash: jobHash(job),
      resume_hash: resumeHash(job),
      seed: job.search.seed,
      method: method.plan ? 'complete' : 'sampled',
      units: archive.units,
      starts_in_best: method.plan ? 0 : archive.startsInBest,
      unseen_share: method.plan ? null : archive.unseenShare,
      merit_after_tenths: archive.meritAfterTenths.map((merit) => (Number.isNaN(merit) ? null : merit)),
      stacks,
      examined: archive.examined,
      cut: method.plan ? this.cutByName() : { 'point terms': archive.cut },
      statement: this.statement(stacks),
      non_dominated: nonDominated(candidates),
      stopped_early: archive.units < this.total,
      seconds: Number(this.workSeconds.toFixed(3)),
    }
  }

  private statement(stacks: number): string {
    const { archive, method, total } = this
    if (method.plan === null) {
      return (
        `sampled: ${archive.units} independent starts among ${stacks} stacks; ${archive.startsInBest} of them ended in the best stack. ` +
        `One more would end in a stack not seen before with a chance of about ${share(archive.unseenShare)}. ` +
        'A stack that several starts looked at counts for each. Nothing is claimed of stacks that no start came to.'
      )
    }
    if (archive.units < total) {
      return `complete search stopped early: ${archive.units} of ${total} slices of ${stacks} stacks are done. Nothing is claimed of the others.`
    }
    return (
      `complete: each of the ${stacks} stacks was looked at or cut by a lower bound of its merit (${method.plan.statement}). ` +
      'No other makeable stack comes before the first 256 of the order.'
    )
  }

  /** Over the slices that are folded in. */
  private cutByName(): Record<string, number> {
    const sums: Record<string, number> = {}
    for (let slice = 0; slice < this.archive.units; slice++) {
      for (const [name, count] of Object.entries(this.cuts.get(slice) ?? {})) sums[name] = (sums[name] ?? 0) + count
    }
    return sums
  }

  /** Whether there is anything that growth can miss: a curve is a goal, not a limit. */
  private hasLimits(): boolean {
    return this.job.demands.some(({ kind, accept }) => kind !== 'curve' || accept?.rms !== undefined)
  }

  private workers(): WorkerPool {
    this.pool ??= new WorkerPool(this.job, Math.max(1, this.options.threads ?? 1))
    return this.pool
  }

  /** Says when the search must end so that yields and writing are done by `until`. */
  private deadline(): () => boolean {
    const { until } = this.options
    if (!until) return () => false
    const limits = this.hasLimits()
    let reserve: number | null = null
    return () => {
      const best = this.archive.best(1).at(0)
      // Late by one unit is better than a morning without any candidate.
      if (!best) return false
      reserve ??= limits ? this.yieldSeconds(best) : 5
      return Date.now() + 1000 * reserve >= until.getTime()
    }
  }

  /** What growing the first stacks takes, from a few trials of the best one, and something for writing. */
  private yieldSeconds(best: Found): number {
    const { job, bound } = this
    const systems = () => bound.design.systems(Int32Array.from(best.assignment))
    const start = performance.now()
    const probes = 16
    for (let i = 0; i < probes; i++) bound.accepted.meets(systems())
    const each = (performance.now() - start) / 1000 / probes
    const trials =
      grownFirst(job.search.effort) * trialsOf({ ...best.score, met: true }, job.growth.trials, job.search.effort)
    return 5 + (1.3 * each * trials) / Math.max(1, this.options.threads ?? 1)
  }

  private keepYield(id: string, grown: Yield): void {
    this.yields.set(`${id} ${grown.trials}`, grown)
  }

  private yieldIn({ score }: Found, trials: number): Yield | null {
    return this.yields.get(`${score.id} ${trials}`) ?? null
  }

  private tell(phase: Progress['phase'], pace: Pace): void {
    const best = this.archive.best(1).at(0)?.score
    this.options.progress?.({
      name: this.job.name,
      phase,
      ...pace.now,
      bestMerit: best?.merit ?? null,
      bestMeets: best?.met ?? false,
      bestMargin: best?.margin ?? null,
    })
  }
}

/** In per cent, two digits. */
function share(part: number | null): string {
  return part === null ? '100 %' : `${Number((100 * part).toPrecision(2))} %`
}

function* tasksOf<T>(numbers: Iterable<number>, taskOf: (number: number) => T): Iterable<T> {
  for (const number of numbers) yield taskOf(number)
}

import { availableParallelism } from 'node:os'
import { performance } from 'node:perf_hooks'
import { type FirstLook, firstLook, methodOf, problemOf } from '../batch/index.js'
import { spectralUnit } from '../deliver/index.js'
import type { Design } from '../design/index.js'
import { energiesAround, type Job } from '../job/index.js'
import { type CompletePlan, runSlice, type SearchProblem } from '../search/index.js'
import { contradictions } from '../target/index.js'
import { colours, print, sayError } from './console.js'
import { countText } from './countText.js'
import { exitCode } from './exitCodes.js'
import { gradientRows } from './gradientRows.js'
import { jobFiles } from './jobFiles.js'
import { readJobs } from './readJobs.js'

/** As commander hands them over. */
export interface CheckArguments {
  readonly gradients?: boolean
}

/** Reads and explains jobs; writes nothing. */
export async function check(args: readonly string[], { gradients }: CheckArguments): Promise<number> {
  const { jobs, wrong } = await readJobs(jobFiles(args))
  let failed = false
  for (const job of jobs) {
    try {
      print(explanation(job, gradients ?? false))
    } catch (error) {
      failed = true
      sayError(`${job.file}  ${(error as Error).message}`)
    }
  }
  return wrong || failed ? exitCode.wrong : exitCode.done
}

function explanation(job: Job, gradients: boolean): string {
  const bound = problemOf(job)
  const { design, problem } = bound
  const { plan, units } = methodOf(job.search, problem)
  const start = performance.now()
  const look = firstLook(job, bound)
  const unitSeconds = (performance.now() - start) / 1000
  const threads = availableParallelism()
  const points = job.demands.reduce((sum, demand) => sum + pointsOf(demand), 0) * job.conditions.length
  const rows: [string, string][] = [
    ['conditions', job.conditions.map((condition) => conditionText(condition, job.kind)).join('; ')],
    ['scan', spectralUnit(job.kind).rangeText(job.scanEv)],
    ['demands', job.demands.map(({ id, kind }) => `${id} ${kind}`).join(', ')],
    ...variableRows(design),
    ['stacks', `${countText(design.stackCount())} different ones on the lattice`],
    ['monolayers', monolayers(design)],
    [
      'method',
      plan
        ? `complete, ${units} slices: ${plan.statement}`
        : `sampled, effort ${job.search.effort}: ${units} units, seed ${job.search.seed}`,
    ],
    ['points', `${points} energies a stack, beside its extremes`],
    [
      'time',
      plan
        ? `at most about ${duration(secondsOf(problem, plan) / threads)} for the search with ${threads} threads, then the yields`
        : `about ${duration((unitSeconds * units) / threads)} for the search with ${threads} threads (a unit took ${short(unitSeconds)} s here), then the yields`,
    ],
    ['first look', `${look.stack}: ${look.meets ? 'meets all limits' : `merit ${short(look.merit)}`}`],
    ...(gradients ? gradientRows(bound, job.scanEv) : []),
  ]
  const warnings = [...contradictions(job).map(({ sentence }) => sentence), ...tooSensitive(job, look)]
  const notes = [
    ...warnings.map((warning) => `  ${colours.yellow('warning')}  ${warning}`),
    ...[...job.notes, ...design.notes].map((note) => `  note  ${note}`),
  ]
  const width = Math.max(...rows.map(([name]) => name.length))
  return [
    `${job.name}  (${job.file})`,
    ...(job.note === '' ? [] : [`  ${job.note}`]),
    ...rows.filter(([, text]) => text !== '').map(([name, text]) => `  ${name.padEnd(width)}  ${text}`),
    ...notes,
    '',
  ].join('\n')
}

/** One monolayer that moves the peak out of its window can't be grown reliably. */
function tooSensitive({ kind, demands }: Job, { mostSensitive, stack }: FirstLook): string[] {
  const peak = demands.find((demand) => demand.kind === 'peak')
  if (!peak || !mostSensitive) return []
  const { layer, shiftEv } = mostSensitive
  const allowed = Math.abs(energiesAround(peak, peak.within)[1] - energiesAround(peak, 0)[1])
  if (Math.abs(shiftEv) <= allowed) return []
  const unit = spectralUnit(kind)
  const at = energiesAround(peak, 0)[0]
  return [
    `${kind === 'electron' ? 'One monolayer (or step)' : 'One nm'} more of layer ${layer} moves the peak by ${unit.shiftText(shiftEv, at)}, but ` +
      `${peak.id} allows ${unit.shiftText(allowed, at).replace('-', '')} (stack ${stack}). ` +
      (kind === 'electron'
        ? 'A wider window, or wider wells, would be grown more surely.'
        : 'A wider window would be coated more surely.'),
  ]
}

/** A complete search by the time of a short slice, whose bound is looser than that of a real one. */
function secondsOf(problem: SearchProblem, plan: CompletePlan): number {
  const slices = Math.ceil(plan.assignments / 256)
  const start = performance.now()
  runSlice(problem, { ...plan, slices }, slices >> 1, null)
  return ((performance.now() - start) / 1000) * slices
}

function variableRows({ places }: Design): [string, string][] {
  if (places.length === 0) return [['variables', 'none: everything is fixed']]
  return places.map(({ name, choices }, i) => [i === 0 ? 'variables' : ' ', `${name}: ${choices} choices`])
}

/** nm per ML of every medium that the layers of the first and last choices have. */
function monolayers(design: Design): string {
  const found = new Map<string, number>()
  const { places } = design
  const most = Math.max(
    1,
    ...places.map(({ choices, ordered, name }) => (ordered && name.endsWith('width') ? 1 : choices)),
  )
  for (let choice = 0; choice < Math.min(most, 200); choice++) {
    const assignment = Int32Array.from(places, ({ choices }) => Math.min(choice, choices - 1))
    for (const { choice: medium, resolved } of design.layers(design.repair(assignment))) {
      if (medium.kind !== 'material' || resolved.monolayerNm === null) continue
      found.set(`${medium.material}${medium.x === null ? '' : `(${medium.x})`}`, resolved.monolayerNm)
    }
  }
  return [...found].map(([name, nm]) => `${name} ${nm.toFixed(5)} nm`).join(', ')
}

function pointsOf(demand: Job['demands'][number]): number {
  if (demand.kind === 'pass' || demand.kind === 'block') return demand.pointsEv.length
  return demand.kind === 'curve' ? demand.rows.length : 0
}

function conditionText(condition: Job['conditions'][number], kind: Job['kind']): string {
  const { name, temperatureK, biasV, inPlaneEv, angleDeg, polarisation } = condition
  const tilted = polarisation === 'mean' ? 'half s, half p' : `${polarisation}-polarised`
  const optical = angleDeg === 0 ? ['normal incidence'] : [`${short(angleDeg)} degrees`, tilted]
  const parts = kind === 'light' ? optical : [`${short(temperatureK)} K`]
  if (biasV !== 0) parts.push(`${short(biasV * 1000)} mV`)
  if (inPlaneEv !== 0) parts.push(`${short(inPlaneEv * 1000)} meV in plane`)
  return name === '' ? parts.join(', ') : `${name}: ${parts.join(', ')}`
}

function duration(seconds: number): string {
  if (seconds < 90) return `${short(seconds)} s`
  return seconds < 5400 ? `${Math.round(seconds / 60)} min` : `${short(seconds / 3600)} h`
}

function short(value: number): string {
  return String(Number(value.toPrecision(3)))
}

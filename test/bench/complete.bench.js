/**
 * What complete search costs: seconds on one core of the built library, step by step, for the bench tasks that a minute allows (all but
 * c and f; e only a few of its slices). Run by `npm run bench`, after `npm run build`. The best merit squared stands beside the one that
 * general optimisers reached.
 */
import { performance } from 'node:perf_hooks'
import { fileURLToPath } from 'node:url'

const dist = new URL(process.env.BENCH_DIST ?? '../../dist/', import.meta.url)
const { readJob } = await import(new URL('job/index.js', dist))
const { problemOf } = await import(new URL('batch/problem.js', dist))
const { firstRound, planComplete, runSlice, startBoundOf } = await import(new URL('search/index.js', dist))

const known = { a: 0.007783, b: 0.006412, d: 0.000342, e: 0.001166 }
/** Of the slices of a task only every so many. */
const stride = { a: 1, b: 1, d: 1, e: 12 }

for (const task of Object.keys(known)) {
  const job = await readJob(fileURLToPath(new URL(`tasks/${task}.yaml`, import.meta.url)))
  const times = []
  const timed = (work) => {
    const start = performance.now()
    const result = work()
    times.push(((performance.now() - start) / 1000).toFixed(2))
    return result
  }
  const { problem } = problemOf(job)
  const plan = timed(() => planComplete(problem))
  const round = timed(() => firstRound(problem, plan, 'bench'))
  const bound = startBoundOf(round)
  const numbers = Array.from({ length: plan.slices }, (_, i) => i).filter((i) => i % stride[task] === 0)
  const slices = timed(() => numbers.map((slice) => runSlice(problem, plan, slice, bound)))
  const found = [round, ...slices.map((slice) => slice.found)].flat()
  const best = Math.min(...found.map(({ score }) => score.merit)) ** 2
  const [planned, first, rest] = times
  const share = numbers.length < plan.slices ? `${numbers.length} of ${plan.slices} slices` : 'all slices'
  console.log(
    `${task}: ${plan.stacks.toExponential(2)} stacks, plan ${planned} s, first round ${first} s, ${share} ${rest} s; ` +
      `best merit squared ${best.toFixed(6)} (${known[task]})`,
  )
}

/**
 * Time of sampled search to the best known merit of the bench tasks, one core of the built library: independent units after one another
 * until one has it, ten seeds a task. Run by `npm run bench`, after `npm run build`. Beside it stands what scipy's general optimisers
 * took on one core (see tasks): several to tens of seconds, where they came to it at all.
 */
import { performance } from 'node:perf_hooks'
import { fileURLToPath } from 'node:url'

const dist = new URL(process.env.BENCH_DIST ?? '../../dist/', import.meta.url)
const { readJob } = await import(new URL('job/index.js', dist))
const { problemOf } = await import(new URL('batch/problem.js', dist))
const { runUnit } = await import(new URL('search/index.js', dist))

/** Merit squared. */
const known = { c: 0.001534, d: 0.000342, e: 0.001166, f: 0.002801 }
const seeds = Number(process.env.BENCH_SEEDS ?? 10)
const limit = Number(process.env.BENCH_SECONDS ?? 5)

for (const [task, square] of Object.entries(known)) {
  const { problem } = problemOf(await readJob(fileURLToPath(new URL(`tasks/${task}.yaml`, import.meta.url))))
  runUnit(problem, 0, 'warm-up')
  const times = []
  for (let seed = 0; seed < seeds; seed++) {
    const start = performance.now()
    const spent = () => (performance.now() - start) / 1000
    let time = Number.POSITIVE_INFINITY
    for (let unit = 0; time === Number.POSITIVE_INFINITY && spent() < limit; unit++) {
      const { merit } = runUnit(problem, unit, `seed ${seed}`).found[0].score
      if (merit * merit < square + 1e-6) time = spent()
    }
    times.push(time)
  }
  times.sort((a, b) => a - b)
  const within = times.filter((time) => time <= limit)
  const median = times[Math.floor((times.length - 1) / 2)]
  console.log(
    `${task}: ${square} by ${within.length} of ${seeds} seeds within ${limit} s, median ${median.toFixed(2)} s, ` +
      within.map((time) => time.toFixed(1)).join(' '),
  )
}

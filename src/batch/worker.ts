import { performance } from 'node:perf_hooks'
import { workerData } from 'piscina'
import type { Job } from '../job/index.js'
import { BoundWork, type Done, type Task } from './BoundWork.js'

/** Runs in the threads of the pool: one job a pool, bound once a thread. */
const work = new BoundWork(workerData as Job)

export default function run(task: Task): Done<unknown> {
  const start = performance.now()
  const result = work.do(task)
  return { result, seconds: (performance.now() - start) / 1000 }
}

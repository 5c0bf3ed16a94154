import { existsSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import { Piscina } from 'piscina'
import type { Job } from '../job/index.js'
import type { Done, Task, TaskResult } from './BoundWork.js'

/** Threads that work on one job. */
export class WorkerPool {
  private readonly pool: Piscina

  constructor(
    job: Job,
    readonly threads: number,
  ) {
    this.pool = new Piscina({
      filename: workerFile(),
      workerData: job,
      // Equal, or workers above the least stop and start between tasks.
      minThreads: threads,
      maxThreads: threads,
      concurrentTasksPerWorker: 1,
    })
  }

  /**
   * Does the tasks in their order, one more at a time than there are threads, and hands each result to `done` as it ends. Stops
   * handing out once `stop` says so; what runs then still ends and counts. `signal` ends it at once.
   *
   * @throws what a task throws, or the reason of the signal
   */
  async each<T extends TaskResult>(
    tasks: Iterable<Task>,
    done: (result: T, seconds: number, task: Task) => void,
    stop: () => boolean = () => false,
    signal?: AbortSignal,
  ): Promise<void> {
    const iterator = tasks[Symbol.iterator]()
    const serve = async () => {
      while (!stop()) {
        signal?.throwIfAborted()
        const { value: task, done: none } = iterator.next()
        if (none) return
        const { result, seconds }: Done<T> = await this.pool.run(task)
        signal?.throwIfAborted()
        done(result, seconds, task)
      }
    }
    const servers = Array.from({ length: this.threads + 1 }, serve)
    let abort = () => {}
    const aborted = new Promise<never>((_, reject) => {
      abort = () => reject(signal?.reason)
      signal?.addEventListener('abort', abort, { once: true })
    })
    try {
      await Promise.race([Promise.all(servers), aborted])
    } finally {
      signal?.removeEventListener('abort', abort)
      for (const server of servers) server.catch(() => {})
    }
  }

  /** Ends the threads at once. */
  async close(): Promise<void> {
    await this.pool.destroy()
  }
}

/** Threads run the built package, also where the sources are run. */
function workerFile(): string {
  const beside = fileURLToPath(new URL('./worker.js', import.meta.url))
  return existsSync(beside) ? beside : fileURLToPath(new URL('../../dist/batch/worker.js', import.meta.url))
}

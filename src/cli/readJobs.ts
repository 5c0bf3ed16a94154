import { type Job, JobError, readJob } from '../job/index.js'
import { say } from './console.js'

/** The jobs of some files that are right; what is wrong with the others is said. Two of one name would share a folder. */
export async function readJobs(files: readonly string[]): Promise<{ jobs: Job[]; wrong: boolean }> {
  const jobs: Job[] = []
  let wrong = false
  for (const file of files) {
    try {
      const job = await readJob(file)
      const other = jobs.find(({ name }) => name === job.name)
      if (other) {
        wrong = true
        say(
          `${file}  The name "${job.name}" is that of ${other.file} too: both would write into one folder. Change one of them.`,
        )
      } else jobs.push(job)
    } catch (error) {
      if (!(error instanceof JobError)) throw error
      wrong = true
      say(error.message)
    }
  }
  return { jobs, wrong }
}

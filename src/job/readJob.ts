import { dirname } from 'node:path'
import { JobError } from './JobError.js'
import type { Job } from './job.js'
import { problemAt } from './problemAt.js'
import { assembleJob } from './readJobText.js'
import { readRegularFile, tablesIn } from './tableFile.js'

/**
 * Reads a job file, checks it and fills in the defaults. Tables are looked for in its folder. Throws JobError that holds every
 * problem: file, line, column, value, rule, remedy.
 */
export async function readJob(path: string): Promise<Job> {
  const read = readRegularFile(path, true)
  if (typeof read === 'string') {
    const [rule, remedy] = unreadable[read]
    throw new JobError([problemAt({ file: path, text: '' }, { start: 0, end: 0 }, rule, remedy)])
  }
  return assembleJob(read.text, path, tablesIn(dirname(path)))
}

const unreadable = {
  absent: ['There is no such file, or it may not be read.', 'Check the path.'],
  link: ['The link leads nowhere.', 'Check the path.'],
  special: ['This is no regular file.', 'Name a job file.'],
  large: ['The file is larger than 1 MB.', 'A job has a few lines. Is this the right file?'],
  binary: ['This is no text in UTF-8.', 'Save the job as UTF-8. Is this the right file?'],
} as const

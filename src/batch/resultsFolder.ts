import { lstatSync, mkdirSync } from 'node:fs'
import { join } from 'node:path'
import { RunError } from './RunError.js'

/**
 * The folder of a job's results, made when absent.
 *
 * @throws RunError where its name is a file or a link, through which results would land elsewhere
 */
export function resultsFolder(resultsDir: string, name: string): string {
  const folder = join(resultsDir, name)
  mkdirSync(resultsDir, { recursive: true })
  const found = lstatSync(folder, { throwIfNoEntry: false })
  if (found && !found.isDirectory()) {
    throw new RunError(
      `${folder} is ${found.isSymbolicLink() ? 'a link' : 'a file'}, not a folder. Move it, or give --results.`,
    )
  }
  mkdirSync(folder, { recursive: true })
  return folder
}

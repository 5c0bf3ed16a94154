import { existsSync, readdirSync, readFileSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import { describe, expect, test } from 'vitest'
import { JobError, readJob } from '../../src/job/index.js'

/**
 * One folder a mistake: `job.yaml` (and its tables) with the message that it gets, `expected.txt`, in which the folder is left
 * out of file names. A new case is a new folder.
 */
const cases = fileURLToPath(new URL('../cases/', import.meta.url))

describe('a job with a mistake gets the message that says what to write', () => {
  for (const name of readdirSync(cases).filter((name) => name.startsWith('jobs-'))) {
    test(name.slice('jobs-'.length).replaceAll('-', ' '), async () => {
      const folder = `${cases}${name}/`
      // The processor's time: another program's load is no fault of the reader.
      const start = process.cpuUsage()
      const error = await readJob(`${folder}job.yaml`).catch((error: unknown) => error)
      const spentMs = process.cpuUsage(start).user / 1000
      expect(error).toBeInstanceOf(JobError)
      const said = (error as JobError).message.replaceAll(folder, '')
      expect(existsSync(`${folder}expected.txt`)).toBe(true)
      expect(`${said}\n`).toBe(readFileSync(`${folder}expected.txt`, 'utf8'))
      expect(spentMs).toBeLessThan(1000)
    })
  }
})

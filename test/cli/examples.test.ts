import { mkdirSync, readdirSync, readFileSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { describe, expect, it } from 'vitest'
import { command, emptyFolder } from './commandLine.js'

const jobs = fileURLToPath(new URL('../../jobs', import.meta.url))

describe('the example jobs at brief effort', () => {
  for (const name of readdirSync(jobs).filter((file) => file.endsWith('.yaml'))) {
    it(`${name} runs to a candidate that meets all its limits`, { timeout: 600_000 }, async () => {
      const folder = emptyFolder()
      for (const file of readdirSync(jobs, { recursive: true }) as string[]) {
        if (/\.(yaml|csv)$/.test(file)) {
          mkdirSync(join(folder, file, '..'), { recursive: true })
          writeFileSync(
            join(folder, file),
            readFileSync(join(jobs, file), 'utf8').replace(/effort: \w+/, 'effort: brief'),
          )
        }
      }
      const { code, stderr, stdout } = await command(['run', name, '--strict', '--json', '--quiet'], folder)
      expect(code, stderr).toBe(0)
      expect(JSON.parse(stdout).meets).toBeGreaterThan(0)
    })
  }
})

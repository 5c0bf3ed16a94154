import { spawnSync } from 'node:child_process'
import { readdirSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import { describe, expect, it } from 'vitest'
import { materialNames, opticalNames } from '../../src/media/index.js'
import { command, emptyFolder, smallJob, withJob } from './commandLine.js'

const jobs = fileURLToPath(new URL('../../jobs', import.meta.url))

describe('check', () => {
  it('explains every example job, its stacks counted, and writes nothing', async () => {
    const folder = emptyFolder()
    const { code, stdout, stderr } = await command(['check', jobs], folder)
    expect(code, stderr).toBe(0)
    expect(stdout).toContain('cold-collector-80')
    expect(stdout).toMatch(/stacks +630 different ones/)
    // Half of the lattice constant of GaAs at 300 K, 0.565325 nm (Vurgaftman et al., J. Appl. Phys. 89, 5815, 2001).
    expect(stdout).toContain('GaAs 0.28266 nm')
    expect(readdirSync(folder)).toEqual([])
  })

  it('warns of demands that contradict one another, and of a peak that one monolayer moves out of its window', async () => {
    const tight = smallJob.replace('within: 5 meV', 'within: 1 meV').replace('block: 5..60 meV', 'block: 5..90 meV')
    const { code, stdout } = await command(['check', 'job.yaml'], withJob(tight))
    expect(code).toBe(0)
    expect(stdout).toContain('warning  d1 and d2 contradict one another.')
    expect(stdout).toMatch(
      /warning {2}One monolayer \(or step\) more of layer well moves the peak by -5\.\d+ meV, but d1 allows 1 meV/,
    )
    expect((await command(['check', 'job.yaml'], withJob())).stdout).not.toContain('contradict')
  })

  it('with --gradients tells the digits of every derivative', async () => {
    const { code, stdout } = await command(['check', '--gradients', 'job.yaml'], withJob())
    expect(code).toBe(0)
    const [, energy, width] = /complex steps: energy ([\d.]+), width ([\d.]+)/.exec(stdout)!.map(Number)
    expect(Math.min(energy, width)).toBeGreaterThan(11)
    const fit = [.../\S+\.(?:x|width) ([\d.]+)/g[Symbol.matchAll](stdout.split('differences: ')[1])].map(([, digits]) =>
      Number(digits),
    )
    expect(fit).toHaveLength(3)
    expect(Math.min(...fit)).toBeGreaterThan(6)
  })

  it('exits with 2 where a job is wrong, and still explains the right ones', async () => {
    const folder = withJob()
    const { code, stdout, stderr } = await command(['check', 'job.yaml', 'absent.yaml'], folder)
    expect(code).toBe(2)
    expect(stdout).toContain('small')
    expect(stderr).toContain('absent.yaml')
  })
})

describe('new', () => {
  it('writes a job that check explains as it is, and never over a file', async () => {
    const folder = emptyFolder()
    const { code, stdout } = await command(['new', 'my-filter'], folder)
    expect([code, stdout]).toEqual([0, 'my-filter.yaml\n'])
    const check = await command(['check', 'my-filter.yaml'], folder)
    expect(check.code, check.stderr).toBe(0)
    expect(check.stdout).toMatch(/stacks +630 different ones/)
    const again = await command(['new', 'my-filter'], folder)
    expect([again.code, again.stderr]).toEqual([2, expect.stringContaining('is here already')])
    expect((await command(['new', '../elsewhere'], folder)).code).toBe(2)
    expect(readdirSync(folder)).toEqual(['my-filter.yaml'])
  })

  it('writes one of light, whose filter meets its demands', async () => {
    const folder = emptyFolder()
    expect((await command(['new', 'my-coating', '--kind', 'light'], folder)).code).toBe(0)
    const check = await command(['check', 'my-coating.yaml'], folder)
    expect(check.code, check.stderr).toBe(0)
    expect(check.stdout).toContain('scan        560..720 nm')
    expect(check.stdout).toContain('meets all limits')
    expect((await command(['new', 'other', '--kind', 'sound'], folder)).code).toBe(2)
  })
})

describe('materials', () => {
  it('minds no reader that has read enough', () => {
    const main = fileURLToPath(new URL('../../dist/cli/main.js', import.meta.url))
    const { stdout, stderr } = spawnSync('sh', ['-c', `"${process.execPath}" "${main}" schema | head -c 10`], {
      encoding: 'utf8',
    })
    expect([stdout, stderr]).toEqual(['{\n  "$schem'.slice(0, 10), ''])
  })

  it('lists every material', async () => {
    const { stdout } = await command(['materials'], emptyFolder())
    for (const name of [...materialNames, ...opticalNames]) expect(stdout).toContain(name)
  })

  it('gives each number of one with its source', async () => {
    const { stdout } = await command(['materials', 'GaAs'], emptyFolder())
    expect(stdout).toMatch(/lattice constant at 300 K +0\.565325 +nm +\S/)
    const silver = await command(['materials', 'Ag'], emptyFolder())
    expect(silver.stdout).toMatch(/index at 2\.26 eV +0\.06 +Johnson and Christy/)
    expect(silver.stdout).toContain('Meant for 321..1937 nm')
    expect(silver.stdout).toContain('50 %')
  })
})

describe('schema', () => {
  it('is a JSON Schema', async () => {
    const { stdout } = await command(['schema'], emptyFolder())
    expect(JSON.parse(stdout)).toMatchObject({ $schema: expect.stringContaining('json-schema.org') })
  })
})

import { existsSync, mkdirSync, readdirSync, readFileSync, symlinkSync, writeFileSync } from 'node:fs'
import { hostname } from 'node:os'
import { join } from 'node:path'
import { parse } from 'csv-parse/sync'
import { describe, expect, it } from 'vitest'
import { nextTime } from '../../src/cli/run.js'
import { command, smallJob, start, tablesAndPictures, unitsIn, withJob } from './commandLine.js'

const pause = (ms: number) => new Promise((resolve) => setTimeout(resolve, ms))

/** Waits until a journal holds so many units, or the process has ended. */
async function until(folder: string, units: number, ended: () => boolean): Promise<void> {
  while (!ended() && !(existsSync(join(folder, 'journal.ndjson')) && unitsIn(folder) >= units)) await pause(5)
}

/** record.json but for the computing time. */
function untimedRecord(folder: string): Record<string, unknown> {
  const { seconds: _, ...record } = JSON.parse(readFileSync(join(folder, 'record.json'), 'utf8'))
  return record
}

describe('a run', () => {
  const whole = withJob()
  const undisturbed = command(['run', 'job.yaml', '--threads', '1'], whole)
  const results = join(whole, 'results', 'small')

  it('leaves the list, a folder a candidate, the job and the record, and prints where the table is', async () => {
    const { code, stdout, stderr } = await undisturbed
    expect(code, stderr).toBe(0)
    expect(stdout).toBe(`${join('results', 'small', 'candidates.csv')}\n`)
    expect(readdirSync(results).sort()).toEqual([
      ...['candidate-01', 'candidate-02', 'candidate-03', 'candidate-04'],
      ...['candidates.csv', 'job.yaml', 'journal.ndjson', 'record.json'],
    ])
    expect(readFileSync(join(results, 'job.yaml'), 'utf8')).toBe(smallJob)
    const record = JSON.parse(readFileSync(join(results, 'record.json'), 'utf8'))
    expect(record).toMatchObject({ method: 'sampled', units: 64, stacks: 36, seed: 11, stopped_early: false })
    expect(record.starts_in_best).toBeGreaterThan(0)
    expect(record.unseen_share).toBeLessThan(1)
    expect(record.merit_after_tenths.length).toBe(10)
    const rows: { id: string }[] = parse(readFileSync(join(results, 'candidates.csv')), { columns: true })
    const ids = rows.map(({ id }) => id)
    expect(record.non_dominated.length).toBeGreaterThan(0)
    expect(ids).toEqual(expect.arrayContaining(record.non_dominated))
    expect(stderr).toContain('AlGaAs(0.35) 11 / GaAs 18 / AlGaAs(0.35) 11 ML')
  })

  it('gives the same bytes with two threads', async () => {
    await undisturbed
    const folder = withJob()
    expect((await command(['run', 'job.yaml', '--threads', '2'], folder)).code).toBe(0)
    expect(tablesAndPictures(join(folder, 'results', 'small'))).toEqual(tablesAndPictures(results))
    expect(untimedRecord(join(folder, 'results', 'small'))).toEqual(untimedRecord(results))
  })

  it('gives the same bytes after three kills, and loses no finished unit', async () => {
    await undisturbed
    const folder = withJob()
    const place = join(folder, 'results', 'small')
    let kept = 0
    for (const units of [3, 17, 40]) {
      const { child, ended } = start(['run', 'job.yaml', '--threads', '2'], folder)
      let over = false
      ended.then(() => {
        over = true
      })
      await until(place, units, () => over)
      child.kill('SIGKILL')
      await ended
      expect(over).toBe(true)
      expect(unitsIn(place)).toBeGreaterThanOrEqual(Math.max(kept, units))
      kept = unitsIn(place)
      expect(existsSync(join(place, 'run.lock'))).toBe(true)
    }
    expect((await command(['run', 'job.yaml', '--threads', '2'], folder)).code).toBe(0)
    expect(unitsIn(place)).toBe(64)
    expect(tablesAndPictures(place)).toEqual(tablesAndPictures(results))
    expect(untimedRecord(place)).toEqual(untimedRecord(results))
    expect(existsSync(join(place, 'run.lock'))).toBe(false)
  })

  it('that Ctrl-C ends says so, exits with 130, and goes on where it was', async () => {
    const folder = withJob()
    const place = join(folder, 'results', 'small')
    const { child, ended } = start(['run', 'job.yaml', '--threads', '1'], folder)
    await until(place, 2, () => child.exitCode !== null)
    child.kill('SIGINT')
    const { code, stderr } = await ended
    expect(code).toBe(130)
    expect(stderr).toContain('Interrupted. Every finished unit of small is kept')
    expect(existsSync(join(place, 'run.lock'))).toBe(false)
    const kept = unitsIn(place)
    expect(kept).toBeGreaterThanOrEqual(2)
    expect(kept).toBeLessThan(64)
    await undisturbed
    expect((await command(['run', 'job.yaml', '--threads', '2', '--quiet'], folder)).code).toBe(0)
    expect(unitsIn(place)).toBe(64)
    expect(tablesAndPictures(place)).toEqual(tablesAndPictures(results))
  })

  it('does no unit again when only note, layout, trials and the length of the list change', async () => {
    await undisturbed
    const folder = withJob()
    const place = join(folder, 'results', 'small')
    await command(['run', 'job.yaml'], folder)
    const changed = `# A remark.\n${smallJob.replace('candidates: 4', 'candidates: 2').replace('trials: 64', 'trials: 32')}`
    writeFileSync(join(folder, 'job.yaml'), changed)
    const { code, stderr } = await command(['run', 'job.yaml'], folder)
    expect(code, stderr).toBe(0)
    expect(unitsIn(place)).toBe(64)
    // Two, and one of another family.
    expect(readdirSync(place).filter((name) => name.startsWith('candidate-'))).toHaveLength(3)
    expect(readFileSync(join(place, 'candidates.csv'), 'utf8')).toContain(',32,')
  })

  it('keeps what was searched before when the job has changed, or when asked to start afresh', async () => {
    const folder = withJob()
    const place = join(folder, 'results', 'small')
    await command(['run', 'job.yaml'], folder)
    writeFileSync(join(folder, 'job.yaml'), smallJob.replace('seed: 11', 'seed: 12'))
    const { stderr } = await command(['run', 'job.yaml'], folder)
    expect(stderr).toContain('The job has changed since its last run')
    await command(['run', 'job.yaml', '--fresh'], folder)
    expect(readdirSync(place).filter((name) => name.startsWith('journal-'))).toHaveLength(2)
  })

  it('with --json prints one object a job', async () => {
    const { stdout } = await command(['run', 'job.yaml', '--json', '--quiet'], whole)
    const [line, ...rest] = stdout
      .trimEnd()
      .split('\n')
      .map((text) => JSON.parse(text))
    expect(rest).toEqual([])
    expect(line).toMatchObject({ name: 'small', listed: 4, meets: 4, best: { meets: true, merit: 0 } })
  })

  it('with --quiet says nothing on stderr', async () => {
    const { stderr } = await command(['run', 'job.yaml', '--quiet'], whole)
    expect(stderr).toBe('')
  })
})

describe('a complete search', () => {
  /** 115 101 assignments in four slices, judged at few points; a rule on widths keeps them from being taken as pairs of halves. */
  const job = smallJob
    .replace(
      /stack:[\s\S]*target:/,
      `stack:
  entry: { potential: 0 meV, mass: 0.067 }
  layers:
    - { id: front, potential: 0.2..0.4 eV step 100 meV, mass: 0.08, width: 1..6 nm step 0.25 nm }
    - { id: well, potential: 0 meV, mass: 0.067, width: 2..9 nm step 0.25 nm }
    - { id: rear, potential: 0.2..0.4 eV step 100 meV, mass: 0.08, width: 1..6 nm step 0.25 nm }
  exit: { potential: 0 meV, mass: 0.067 }
  rising: [front, well]
target:`,
    )
    .replace(/- \{ peak[^\n]*/, '- { block: 100..200 meV, below: 1e-3, points: 8 }')
    .replace(/growth:[\s\S]*trials: 64/, 'growth:\n  trials: 8')
    .replace('method: sampled', 'method: complete')

  it('that is killed goes on to the same statement and the same bytes', { timeout: 240_000 }, async () => {
    const folder = withJob(job)
    const place = join(folder, 'results', 'small')
    const { child, ended } = start(['run', 'job.yaml', '--threads', '2'], folder)
    const slices = () =>
      existsSync(join(place, 'journal.ndjson'))
        ? readFileSync(join(place, 'journal.ndjson'), 'utf8').split('"entry":{"slice"').length - 1
        : 0
    while (child.exitCode === null && slices() < 1) await pause(20)
    child.kill('SIGKILL')
    await ended
    expect(slices()).toBeGreaterThan(0)
    expect(slices()).toBeLessThan(4)
    const resumed = await command(['run', 'job.yaml', '--threads', '2'], folder)
    expect(resumed.code, resumed.stderr).toBe(0)
    const whole = withJob(job)
    expect((await command(['run', 'job.yaml', '--threads', '1'], whole)).code).toBe(0)
    const recordOf = (at: string) => JSON.parse(readFileSync(join(at, 'results', 'small', 'record.json'), 'utf8'))
    const { method, statement, units } = recordOf(folder)
    expect([method, units]).toEqual(['complete', 4])
    expect(statement).toMatch(/^complete: each of the \d{5} stacks/)
    expect(statement).toBe(recordOf(whole).statement)
    expect(tablesAndPictures(place)).toEqual(tablesAndPictures(join(whole, 'results', 'small')))
  })
})

describe('exit codes', () => {
  it('2: a wrong job is reported, the right ones run', async () => {
    const folder = withJob()
    writeFileSync(join(folder, 'wrong.yaml'), smallJob.replace('80 meV', '80').replace('name: small', 'name: wrong'))
    const { code, stderr, stdout } = await command(['run', '.', '--threads', '2'], folder)
    expect(code).toBe(2)
    expect(stderr).toContain('wrong.yaml:15:')
    expect(stdout).toContain('candidates.csv')
    expect(readdirSync(join(folder, 'results'))).toEqual(['small'])
  })

  it('2: for a file that is not there, an unknown option, a wrong number or time', async () => {
    const folder = withJob()
    const wrong = [
      [['run', 'absent.yaml'], 'absent.yaml'],
      [['run', 'job.yaml', '--thread', '2'], '--threads'],
      [['run', 'job.yaml', '--threads', '0'], 'from 1 to 256'],
      [['run', 'job.yaml', '--until', '25:00'], '06:30'],
      [['materials', 'AlGaAS'], 'Did you mean AlGaAs'],
      [['walk'], 'unknown command'],
    ] as const
    for (const [args, words] of wrong) {
      const { code, stderr } = await command(args, folder)
      expect(code, args.join(' ')).toBe(2)
      expect(stderr).toContain(words)
    }
    expect(existsSync(join(folder, 'results'))).toBe(false)
  })

  it('3: with --strict, when no candidate meets its limits', async () => {
    const folder = withJob(smallJob.replace('below: 2e-2', 'below: 1e-9'))
    expect((await command(['run', 'job.yaml', '--strict', '--quiet'], folder)).code).toBe(3)
    expect((await command(['run', 'job.yaml', '--quiet'], folder)).code).toBe(0)
  })

  it('4: when the folder is in use, or is a link out of the results', async () => {
    const folder = withJob()
    const place = join(folder, 'results', 'small')
    mkdirSync(place, { recursive: true })
    writeFileSync(join(place, 'run.lock'), JSON.stringify({ pid: process.pid, host: hostname(), since: 'now' }))
    const used = await command(['run', 'job.yaml', '--quiet'], folder)
    expect(used.code).toBe(4)
    expect(used.stderr).toContain('Another run has this folder')

    const linked = withJob()
    mkdirSync(join(linked, 'results'))
    mkdirSync(join(linked, 'elsewhere'))
    symlinkSync(join(linked, 'elsewhere'), join(linked, 'results', 'small'))
    const { code, stderr } = await command(['run', 'job.yaml', '--quiet'], linked)
    expect(code).toBe(4)
    expect(stderr).toContain('is a link')
    expect(readdirSync(join(linked, 'elsewhere'))).toEqual([])
  })
})

describe('the time of --until', () => {
  const evening = new Date(2026, 11, 1, 22, 15)
  it('is the next moment at which the clock shows it', () => {
    expect(nextTime('06:30', evening)).toEqual(new Date(2026, 11, 2, 6, 30))
    expect(nextTime('23:00', evening)).toEqual(new Date(2026, 11, 1, 23, 0))
  })
})

import { execFileSync } from 'node:child_process'
import { mkdirSync, mkdtempSync, rmSync, symlinkSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, describe, expect, test } from 'vitest'
import { JobError, readJob, readJobText } from '../../src/job/index.js'

const folder = mkdtempSync(join(tmpdir(), 'job-'))
afterAll(() => rmSync(folder, { recursive: true }))

const text = `format: 1
name: halm-80
kind: electron
stack: { entry: GaAs, layers: [{ material: AlAs, width: 5 ML }], exit: GaAs }
target: { scan: 5..200 meV, demands: [{ curve: goal.csv }] }
`
const table = 'energy_meV,T\n80,0.9\n'

describe('text that no engineer wrote is a job error within a second', () => {
  const bombs: Record<string, string> = {
    'a megabyte of digits': `format: ${'9'.repeat(990_000)}`,
    'a megabyte of one quantity': text.replace('5..200 meV', `${'1'.repeat(900_000)} meV`),
    'half a million brackets': `a: ${'['.repeat(500_000)}`,
    'a hundred thousand maps in maps': '{a: '.repeat(100_000),
    'a line of dashes': '- '.repeat(400_000),
    'a line of question marks': '? '.repeat(400_000),
    'a line of colons': ': '.repeat(400_000),
    'a line of anchors': '&a '.repeat(200_000),
    'indentation without end': Array.from({ length: 1200 }, (_, i) => `${' '.repeat(i)}a:`).join('\n'),
    'fifty thousand keys': Array.from({ length: 50_000 }, (_, i) => `k${i}: 1`).join('\n'),
    'fifty thousand times one key': 'a: 1\n'.repeat(50_000),
    'ten thousand aliases': `a: &a 1\nb: [${'*a, '.repeat(10_000)}]`,
    'quotes without end': '"'.repeat(900_000),
    tabs: '\t'.repeat(900_000),
    'block scalars': 'a: |\n'.repeat(150_000),
    'a key of a megabyte': `${'k'.repeat(990_000)}: 1`,
    'every byte': Array.from({ length: 65_536 }, (_, i) => String.fromCharCode((i * 7919) & 0xff)).join(''),
    'half of a surrogate pair': 'name: \ud800',
    'a repeat of repeats': text.replace(
      '[{ material: AlAs, width: 5 ML }]',
      `${'[{ repeat: 1000, period: '.repeat(10)}[{ material: AlAs, width: 5 ML }]${' }]'.repeat(10)}`,
    ),
    'a YAML of another version': `%YAML 1.1\n---\n${text}`,
    'keys of every object': text + ['constructor', 'toString', 'hasOwnProperty'].map((key) => `${key}: 1\n`).join(''),
    'two megabytes': `# ${'x'.repeat(2_000_000)}\n${text}`,
  }
  for (const [name, bomb] of Object.entries(bombs)) {
    test(name, () => {
      // The processor's time: another program's load is no fault of the reader.
      const start = process.cpuUsage()
      const error = errorOf(() => readJobText(bomb, 'bomb.yaml', { 'goal.csv': table }))
      expect(process.cpuUsage(start).user / 1000).toBeLessThan(1000)
      expect(error.message.length).toBeLessThan(50_000)
      for (const { line, column, rule, remedy } of error.problems) {
        expect(line).toBeGreaterThan(0)
        expect(column).toBeGreaterThan(0)
        expect(rule).not.toBe('')
        expect(remedy).not.toBe('')
      }
    })
  }

  test('a file that is too large or no text', async () => {
    writeFileSync(join(folder, 'large.yaml'), `# ${'x'.repeat(1_100_000)}\n${text}`)
    writeFileSync(join(folder, 'binary.yaml'), Buffer.from([0xff, 0xfe, 0x41, 0, 0x80]))
    await expect(readJob(join(folder, 'large.yaml'))).rejects.toThrow('larger than 1 MB')
    await expect(readJob(join(folder, 'binary.yaml'))).rejects.toThrow('no text in UTF-8')
  })

  test('nothing of Object.prototype is touched', () => {
    errorOf(() => readJobText('__proto__: { polluted: 1 }\nconstructor: { prototype: { polluted: 1 } }\n', 'a.yaml'))
    expect(({} as { polluted?: number }).polluted).toBeUndefined()
  })
})

describe('tables come from the folder of the job and nowhere else', () => {
  const job = (name: string) => text.replace('goal.csv', name)
  const write = (name: string, content: string) => writeFileSync(join(folder, name), content)

  test('a table in a folder below is read', async () => {
    mkdirSync(join(folder, 'goals'))
    write('goals/goal.csv', table)
    write('job.yaml', job('goals/goal.csv'))
    expect((await readJob(join(folder, 'job.yaml'))).files['goals/goal.csv']).toBe(table)
  })

  test('links, pipes and devices are refused and never waited for', async () => {
    write('real.csv', table)
    symlinkSync(join(folder, 'real.csv'), join(folder, 'link.csv'))
    symlinkSync(tmpdir(), join(folder, 'elsewhere'))
    execFileSync('mkfifo', [join(folder, 'pipe.csv')])
    for (const [name, says] of [
      ['link.csv', 'symbolic link'],
      [`elsewhere/goal.csv`, 'symbolic link'],
      ['pipe.csv', 'no regular file'],
      ['"~/goal.csv"', 'leads out of the folder'],
      ['a/../../goal.csv', 'leads out of the folder'],
      ['"C:/goal.csv"', 'leads out of the folder'],
      ['"a\\0b.csv"', 'no name of a file'],
      ['""', 'no name of a file'],
      [`${'long'.repeat(100)}.csv`, 'no name of a file'],
    ]) {
      write('job.yaml', job(name))
      await expect(readJob(join(folder, 'job.yaml')), name).rejects.toThrow(says)
    }
    await expect(readJob(join(folder, 'pipe.csv'))).rejects.toThrow('no regular file')
    await expect(readJob('/dev/zero')).rejects.toThrow('no regular file')
  })

  test('a job may itself be reached by a link; its tables lie where it is called from', async () => {
    write('job.yaml', job('real.csv'))
    symlinkSync('job.yaml', join(folder, 'linked.yaml'))
    expect((await readJob(join(folder, 'linked.yaml'))).name).toBe('halm-80')
  })

  test('a table that is no table says in which line', () => {
    for (const [csv, says] of [
      ['energy_meV,T\n80,"0.9\n', 'goal.csv:'],
      [`energy_meV,T\n80,${'9'.repeat(400)}\n`, 'is no number'],
      ['energy_meV,T\n80,1e999\n', 'is no number'],
      ['energy_meV,T\n80,NaN\n', 'is no number'],
      ['energy_meV;T\n80;0,9\n', 'goal.csv:'],
      ['wavelength_nm,T\n633,1\n', 'belongs to light'],
      ['energy_meV,T,weight\n80,0.5,0\n', 'Every row has weight 0'],
      ['energy_meV,T\n', 'no rows'],
      [`energy_meV,T\n${'80,0.5\n'.repeat(30_000)}`, 'more than 20000 rows'],
      ['\u0000\u0001', 'goal.csv:'],
    ]) {
      const error = errorOf(() => readJobText(text, 'job.yaml', { 'goal.csv': csv }))
      expect(error.message, csv.slice(0, 40)).toContain(says)
    }
  })
})

function errorOf(action: () => unknown): JobError {
  try {
    action()
  } catch (error) {
    if (error instanceof JobError) return error
    throw error
  }
  throw new Error('The job was read.')
}

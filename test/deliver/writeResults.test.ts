import { spawnSync } from 'node:child_process'
import {
  existsSync,
  mkdirSync,
  mkdtempSync,
  readdirSync,
  readFileSync,
  rmSync,
  statSync,
  symlinkSync,
  writeFileSync,
} from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import ts from 'typescript'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { writeFileWhole, writeResults } from '../../src/deliver/index.js'
import { sampleCandidate, sampleJob, sampleResult } from './sampleNight.js'

let base = ''
let folder = ''

beforeEach(() => {
  base = mkdtempSync(join(tmpdir(), 'deliver-'))
  folder = join(base, 'results', 'cold-collector-80')
})

afterEach(() => rmSync(base, { recursive: true, force: true }))

const files = ['layers.csv', 'profile.csv', 'profile.svg', 'resonances.csv', 'spectrum.csv', 'transmission.svg']

function many(count: number) {
  return sampleResult(Array.from({ length: count }, (_, i) => sampleCandidate({ rank: i + 1 })))
}

describe('writeResults', () => {
  it('leaves the tables, the pictures, the job as it was written and the record, and nothing else', () => {
    const job = sampleJob()
    writeResults(folder, job, many(2))
    expect(readdirSync(folder).sort()).toEqual([
      ...['candidate-01', 'candidate-02', 'candidates.csv', 'job.yaml', 'record.json'],
    ])
    expect(readdirSync(join(folder, 'candidate-02')).sort()).toEqual(files)
    expect(readFileSync(join(folder, 'job.yaml'), 'utf8')).toBe(job.text)
  })

  it('puts into record.json how the list came about, the notes and the cautions', () => {
    const result = sampleResult([sampleCandidate({ notes: ['The barriers lie below mid-gap at 5 meV.'] })])
    writeResults(folder, sampleJob(), result)
    const record = JSON.parse(readFileSync(join(folder, 'record.json'), 'utf8'))
    expect(record).toMatchObject(result.record)
    expect(record.notes).toEqual(result.notes)
    expect(record.candidate_notes).toEqual({ [result.candidates[0].id]: result.candidates[0].notes })
    expect(record.cautions.join(' ')).toMatch(/not a safety component.*toxic/)
  })

  it('gives the same bytes when it is called again', () => {
    const read = () => files.map((name) => readFileSync(join(folder, 'candidate-01', name), 'utf8'))
    writeResults(folder, sampleJob(), many(1))
    const first = read()
    writeResults(folder, sampleJob(), many(1))
    expect(read()).toEqual(first)
  })

  it('removes the candidates of an earlier, longer list', () => {
    writeResults(folder, sampleJob(), many(3))
    writeResults(folder, sampleJob(), many(1))
    expect(readdirSync(folder).filter((name) => name.startsWith('candidate-'))).toEqual(['candidate-01'])
  })

  it("keeps what others put there: files in an old candidate's folder, folders with other names, the journal", () => {
    writeResults(folder, sampleJob(), many(2))
    writeFileSync(join(folder, 'candidate-02', 'measured.csv'), 'mine')
    writeFileSync(join(folder, 'journal.ndjson'), '{}')
    mkdirSync(join(folder, 'candidate-x'))
    mkdirSync(join(folder, 'candidate-3'))
    writeResults(folder, sampleJob(), many(1))
    expect(readdirSync(join(folder, 'candidate-02'))).toEqual(['measured.csv'])
    for (const name of ['journal.ndjson', 'candidate-x', 'candidate-3']) {
      expect(existsSync(join(folder, name)), name).toBe(true)
    }
  })

  it('neither follows nor removes a link that is named like an old candidate', () => {
    const outside = join(base, 'outside')
    mkdirSync(outside)
    writeFileSync(join(outside, 'layers.csv'), 'precious')
    mkdirSync(folder, { recursive: true })
    symlinkSync(outside, join(folder, 'candidate-07'))
    writeResults(folder, sampleJob(), many(1))
    expect(readFileSync(join(outside, 'layers.csv'), 'utf8')).toBe('precious')
    expect(existsSync(join(folder, 'candidate-07'))).toBe(true)
  })

  it("refuses to write through a link that stands where a candidate's folder goes", () => {
    const outside = join(base, 'outside')
    mkdirSync(outside)
    mkdirSync(folder, { recursive: true })
    symlinkSync(outside, join(folder, 'candidate-01'))
    expect(() => writeResults(folder, sampleJob(), many(1))).toThrow(/candidate-01 is a link.*Move it away/)
    expect(readdirSync(outside)).toEqual([])
  })

  it('has no record.json while it is not whole, so that a folder with one can be trusted', () => {
    writeResults(folder, sampleJob(), many(1))
    rmSync(join(folder, 'candidate-01'), { recursive: true })
    symlinkSync(base, join(folder, 'candidate-01'))
    expect(() => writeResults(folder, sampleJob(), many(1))).toThrow()
    expect(existsSync(join(folder, 'record.json'))).toBe(false)
  })
})

describe('writeFileWhole', () => {
  it('replaces a link and leaves what it pointed to alone', () => {
    const target = join(base, 'target')
    const link = join(base, 'link')
    writeFileSync(target, 'old')
    symlinkSync(target, link)
    writeFileWhole(link, 'new')
    expect(readFileSync(target, 'utf8')).toBe('old')
    expect(readFileSync(link, 'utf8')).toBe('new')
  })

  it('keeps the old file and leaves no part behind when it fails', () => {
    const place = join(base, 'taken')
    mkdirSync(join(place, 'full'), { recursive: true })
    expect(() => writeFileWhole(place, 'text')).toThrow()
    expect(statSync(place).isDirectory()).toBe(true)
    expect(readdirSync(base)).toEqual(['taken'])
  })

  it('writes over a part that a killed run has left', () => {
    const path = join(base, 'a.csv')
    writeFileSync(`${path}.part`, 'half a li')
    writeFileWhole(path, 'whole')
    expect(readdirSync(base)).toEqual(['a.csv'])
    expect(readFileSync(path, 'utf8')).toBe('whole')
  })

  it('never shows half a file under its name, whenever the writer is killed', { timeout: 30_000 }, () => {
    // A writer that writes one text after another for ever, killed at moments spread over its work: what stands there is whole.
    const path = join(base, 'big.csv')
    const source = readFileSync(new URL('../../src/deliver/writeFileWhole.ts', import.meta.url), 'utf8')
    const { module, target } = { module: ts.ModuleKind.ESNext, target: ts.ScriptTarget.ES2022 }
    const endless = `for (let i = 0; ; i++) writeFileWhole(process.argv[2], String(i % 10).repeat(2_000_000) + 'end')`
    writeFileSync(join(base, 'writer.mjs'), ts.transpile(`${source}\n${endless}`, { module, target }))
    for (const timeout of [300, 350, 400, 450, 500]) {
      spawnSync(process.execPath, [join(base, 'writer.mjs'), path], { timeout, killSignal: 'SIGKILL' })
      if (existsSync(path)) expect(readFileSync(path, 'utf8')).toMatch(/^(\d)\1{1999999}end$/)
    }
    expect(existsSync(path)).toBe(true)
  })
})

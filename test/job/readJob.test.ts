import { readdirSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import { describe, expect, test } from 'vitest'
import { type Job, JobError, type LayerSpec, type PeriodSpec, readJob, readJobText } from '../../src/job/index.js'

const root = fileURLToPath(new URL('../../', import.meta.url))
const bench = fileURLToPath(new URL('../bench/tasks/', import.meta.url))

const plain = `
format: 1
name: halm-80
kind: electron
stack:
  entry: GaAs
  layers:
    - { id: outer, material: AlGaAs, x: 0.3, width: 6..20 ML }
    - { id: well, material: GaAs, width: 5 nm }
    - { like: outer }
  exit: GaAs
target:
  scan: 5..200 meV
  demands:
    - { peak: 80 meV, within: 5 meV }
`

describe('a job in order', () => {
  test('the main example means what the contract says', async () => {
    const job = await readJob(`${root}jobs/cold-collector-80.yaml`)
    expect(job.name).toBe('cold-collector-80')
    expect(job.conditions).toEqual([
      { name: '', temperatureK: 77, biasV: 0, inPlaneEv: 0, angleDeg: 0, polarisation: 's' },
    ])
    expect(job.stack).toEqual({
      entry: { kind: 'material', material: 'GaAs', x: null },
      exit: { kind: 'material', material: 'GaAs', x: null },
      layers: [
        layer('outer', [{ kind: 'material', material: 'AlGaAs', x: [0.25, 0.35] }], 6, 20),
        layer('well', [{ kind: 'material', material: 'GaAs', x: null }], 10, 30),
        { kind: 'layer', id: 'L3', like: 'outer', media: null, width: null },
      ],
      mirror: false,
      massModel: 'two-band',
      strainedTo: null,
      biasOver: null,
      rising: [],
      referenceNm: null,
      back: null,
    })
    expect(job.scanEv).toEqual([0.005, 0.2])
    expect(job.resolutionEv).toBe(1e-5)
    const [peak, low, high] = job.demands
    expect(peak).toEqual({
      kind: 'peak',
      alone: null,
      accept: null,
      at: null,
      quantity: 'T',
      id: 'd1',
      weight: 1,
      axis: 'eV',
      centre: 0.08,
      within: 0.005,
      fwhm: [0.001, 0.004],
      height: 0.8,
    })
    expect(low).toMatchObject({ kind: 'block', id: 'd2', weight: 1, below: 0.02 })
    expect(high).toMatchObject({ kind: 'block', id: 'd3', weight: 0.5, below: 0.02 })
    expect(job.growth).toEqual({
      startsAt: 'exit',
      sources: [
        { name: 'Ga', element: 'Ga', rate: 0.7 },
        { name: 'Al-1', element: 'Al', rate: 0.233 },
        { name: 'Al-2', element: 'Al', rate: 0.377 },
      ],
      compositions: 1,
      stepNm: null,
      thinnestNm: null,
      totalNm: null,
      strain: null,
      critical: false,
      tooling: {},
      spread: { rate: 0.01, layer: { value: 0.5, unit: 'ML' }, x: 0.005, index: 0 },
      assumed: false,
      trials: 2048,
    })
    expect(job.search).toEqual({ method: 'auto', effort: 'brief', seed: 11 })
    expect(job.deliver).toEqual({ candidates: 10 })
    expect(job.notes).toEqual([])
  })

  test('what a job leaves out is filled with the defaults, and says so', () => {
    const job = readJobText(plain, 'halm.yaml')
    expect(job.conditions[0].temperatureK).toBe(300)
    expect(job.search).toEqual({ method: 'auto', effort: 'standard', seed: 1 })
    expect(job.deliver.candidates).toBe(10)
    expect(job.growth).toMatchObject({ startsAt: 'exit', sources: [], compositions: null, assumed: true, trials: 2048 })
    expect(job.growth.spread).toEqual({ rate: 0.01, layer: { value: 0.5, unit: 'ML' }, x: 0.005, index: 0 })
    expect(job.demands[0]).toMatchObject({ fwhm: null, height: null })
    expect(job.notes.join(' ')).toMatch(/300 K is assumed.*1 %, layers 0.5 ML, x 0.005.*assumed/)
  })

  test('structure: nested periods, mirrors, forward ties and ties into a period', () => {
    const job = withLayers(`
    - { like: inner }
    - repeat: 3
      mirror: true
      period:
        - { id: inner, material: AlGaAs, x: "0.2..0.3 step 0.05", width: 5..9 ML step 2 ML }
        - { repeat: 2, period: [{ material: { pick: [GaAs, AlAs] }, width: 4 ML }] }
        - { like: tail }
    - { id: tail, like: inner }
    - { potential: 0.2..0.21 eV step 5 meV, mass: 0.09, alpha: 1.2 /eV, width: 1..2 nm step 0.25 nm }`)
    const [first, period, tail, numbers] = job.stack.layers as [LayerSpec, PeriodSpec, LayerSpec, LayerSpec]
    expect(first).toMatchObject({ id: 'L1', like: 'inner' })
    expect(period).toMatchObject({ kind: 'period', id: null, repeat: [3, 3], mirror: true })
    expect(period.period[0]).toMatchObject({ media: [{ x: [0.2, 0.25, 0.3] }], width: { from: 5, to: 9, step: 2 } })
    expect((period.period[1] as PeriodSpec).period[0]).toMatchObject({
      id: 'L3',
      media: [{ material: 'GaAs' }, { material: 'AlAs' }],
    })
    // Through tail, which itself follows inner.
    expect(period.period[2]).toMatchObject({ id: 'L4', like: 'inner' })
    expect(tail).toMatchObject({ id: 'tail', like: 'inner' })
    expect(numbers).toMatchObject({
      id: 'L6',
      media: [{ kind: 'numbers', name: null, potentialEv: [0.2, 0.205, 0.21], massRel: [0.09], alphaPerEv: [1.2] }],
      width: { unit: 'nm', from: 1, to: 2, step: 0.25 },
    })
  })

  test('a hard wall, an alloy as a lead, a mass model, strain and a stack mirror', () => {
    const job = readJobText(
      plain
        .replace('entry: GaAs', 'entry: { material: AlGaAs, x: 0.1 }')
        .replace('exit: GaAs', 'exit: hard wall\n  mirror: true\n  mass: parabolic\n  strained to: none'),
      'halm.yaml',
    )
    expect(job.stack.entry).toEqual({ kind: 'material', material: 'AlGaAs', x: [0.1] })
    expect(job.stack).toMatchObject({ exit: 'hard wall', mirror: true, massModel: 'parabolic', strainedTo: 'none' })
  })

  test('anchors and aliases stand for what they name', () => {
    const job = withLayers(`
    - &barrier { material: AlGaAs, x: 0.3, width: 6..20 ML }
    - { material: GaAs, width: 10..30 ML }
    - *barrier`)
    expect(job.stack.layers[2]).toMatchObject({ id: 'L3', media: [{ material: 'AlGaAs', x: [0.3] }] })
  })

  test('a layer above the crossing of the valleys comes with a note', () => {
    const job = withLayers('\n    - { material: AlGaAs, x: "0.3..0.5 step 0.1", width: 5 ML }')
    expect(job.notes.some((note) => note.includes('X valley'))).toBe(true)
  })

  test('cells that miss a composition by 0.01 or less can grow it', () => {
    const sources = 'growth: { sources: { Ga: 0.7 ML/s, Al: 0.29 ML/s } }\n'
    expect(() => readJobText(plain + sources, 'halm.yaml')).not.toThrow()
    expect(() => readJobText((plain + sources).replace('0.29', '0.28'), 'halm.yaml')).toThrow('They reach x = 0.2857')
  })

  test('a byte order mark and CRLF change nothing but the text', () => {
    const { text: _, ...job } = readJobText(plain, 'halm.yaml')
    const { text, ...other } = readJobText(`\ufeff${plain.replaceAll('\n', '\r\n')}`, 'halm.yaml')
    expect(other).toEqual(job)
    expect(text.startsWith('\ufeff')).toBe(true)
  })

  test('a curve comes with its rows, filled', () => {
    const text = plain.replace(
      '    - { peak: 80 meV, within: 5 meV }',
      '    - { curve: goal.csv, weight: 2, id: goal }',
    )
    const files = { 'goal.csv': 'energy_meV,T,scale,sense\r\n80.1,0.9,,\r\n20,0,decades,most\r\n' }
    const job = readJobText(text, 'halm.yaml', files)
    expect(job.demands).toEqual([
      {
        kind: 'curve',
        accept: null,
        at: null,
        quantity: 'T',
        mostRms: null,
        id: 'goal',
        weight: 2,
        file: 'goal.csv',
        rows: [
          { energyEv: 0.0801, T: 0.9, sense: 'equal', scale: 'linear', tolerance: 1, weight: 1 },
          { energyEv: 0.02, T: 1e-30, sense: 'most', scale: 'decades', tolerance: 1, weight: 1 },
        ],
      },
    ])
    expect({ ...job.files }).toEqual(files)
  })

  for (const name of readdirSync(`${root}jobs`).filter((name) => name.endsWith('.yaml'))) {
    test(`${name} is read without a complaint and says that its scenario is invented`, async () => {
      const job = await readJob(`${root}jobs/${name}`)
      expect(job.name).toBe(name.replace('.yaml', ''))
      expect(job.note).toContain('invented')
      expectWhole(job)
    })
  }

  test('the bench jobs are read', async () => {
    for (const letter of 'abcdef') {
      const job = await readJob(`${bench}${letter}.yaml`)
      expect(job.growth.stepNm).toBe(0.283)
      expectWhole(job)
    }
  })
})

describe('problems', () => {
  test('each holds file, line, column, value, rule and remedy, and they come in the order of the file', () => {
    const wrong = plain.replace('6..20 ML', '6..20').replace('halm-80', 'halm 80').replace('within', 'withn')
    const error = errorOf(wrong)
    expect(error.problems.map(({ line, column }) => [line, column])).toEqual([
      [3, 7],
      [8, 53],
      [15, 23],
    ])
    expect(error.problems[1]).toEqual({
      file: 'jobs/tern.yaml',
      line: 8,
      column: 53,
      value: '6..20',
      rule: 'width "6..20" has no unit.',
      remedy: 'Write "6..20 ML" or "1.7..5.7 nm".',
      message: `jobs/tern.yaml:8:53  width "6..20" has no unit. Write "6..20 ML" or "1.7..5.7 nm".
        - { id: outer, material: AlGaAs, x: 0.3, width: 6..20 }
                                                        ^^^^^`,
    })
    for (const { message } of error.problems) expect(error.message).toContain(message)
  })

  test('a missing file, a folder and a job that is no text are job errors', async () => {
    for (const path of [`${root}no-such.yaml`, `${root}jobs`, `${root}no\0such.yaml`]) {
      await expect(readJob(path)).rejects.toBeInstanceOf(JobError)
    }
  })
})

function withLayers(layers: string): Job {
  const start = plain.indexOf('  layers:') + '  layers:'.length
  return readJobText(plain.slice(0, start) + layers + plain.slice(plain.indexOf('\n  exit')), 'halm.yaml')
}

function layer(id: string, media: LayerSpec['media'], from: number, to: number): LayerSpec {
  return { kind: 'layer', id, like: null, media, width: { unit: 'ML', from, to, step: null } }
}

function errorOf(text: string): JobError {
  try {
    readJobText(text, 'jobs/tern.yaml')
  } catch (error) {
    if (error instanceof JobError) return error
    throw error
  }
  throw new Error('The job was read.')
}

/** Nothing is left open but what the types leave open. */
function expectWhole({ stack, demands }: Job): void {
  const visit = (items: Job['stack']['layers']): void => {
    for (const item of items) {
      if (item.kind === 'period') visit(item.period)
      else expect((item.media !== null && item.width !== null) !== (item.like !== null)).toBe(true)
    }
  }
  visit(stack.layers)
  expect(stack.entry).toBeTruthy()
  expect(demands.length).toBeGreaterThan(0)
}

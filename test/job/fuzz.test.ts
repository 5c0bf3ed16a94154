import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { canonicalJson, JobError, jobContent, readJobText, resumeContent } from '../../src/job/index.js'

const job = `format: 1
name: halm-80
kind: electron
note: Filter of the Halm observatory (invented).
temperature: 77 K
media:
  low: { potential: 115..120 meV step 5 meV, mass: 0.0795, alpha: 1.2 /eV }
stack:
  entry: GaAs
  layers:
    - { id: outer, material: AlGaAs, x: { pick: [0.25, 0.35] }, width: 6..20 ML }
    - { material: { pick: [low, low2, GaAs] }, width: 2..5 nm }
    - repeat: 3
      mirror: true
      period: [{ like: outer }, { material: GaAs, width: 10..30 ML }]
    - { id: last, like: outer }
  exit: { material: AlGaAs, x: 0.1 }
  mirror: true
  mass: two-band
  strained to: none
target:
  scan: 5..200 meV
  resolution: 0.01 meV
  demands:
    - { peak: 80 meV, within: 5 meV, fwhm: 1..4 meV, height: 0.8 }
    - { block: 5..60 meV, below: -20 dB, points: 32 }
    - { pass: 79..81 meV, above: 0.5, weight: 0.5, id: top }
    - { curve: goal.csv }
growth:
  starts at: exit
  sources: { Ga: 0.70 ML/s, Al-1: 0.233 ML/s, Al-2: 0.377 ML/s }
  compositions: 1
  step: 0.1 nm
  spread: { rate: 1 %, layer: 0.5 ML, x: 0.005 }
  trials: 256
search: { effort: brief, seed: 11, method: sampled }
deliver: { candidates: 10 }
`.replace('  low: {', '  low2: { potential: 0.2 eV, mass: 0.09 }\n  low: {')

const files = {
  'goal.csv': 'energy_meV,T,sense,scale,tolerance,weight\n80,0.9,least,linear,1,1\n20,1e-4,most,decades,2,1\n',
}

describe('no text crashes the reader', () => {
  test('the job that is mutated below is itself in order', () => {
    expect(judged(job)).toBe('read')
  })

  test('any text', () => {
    fc.assert(
      fc.property(fc.oneof(fc.string({ unit: 'binary' }), fc.string({ unit: 'grapheme' })), (text) => {
        expect(judged(text)).toBe('refused')
      }),
      { numRuns: 500 },
    )
  })

  test('any value, written as YAML', () => {
    fc.assert(
      fc.property(fc.jsonValue(), (value) => {
        expect(judged(JSON.stringify(value))).toBe('refused')
      }),
      { numRuns: 500 },
    )
  })

  test('a job of which a stretch is replaced', () => {
    const stretch = fc.record({
      at: fc.nat(job.length),
      length: fc.nat(12),
      by: fc.oneof(
        fc.string({ unit: 'binary', maxLength: 8 }),
        fc.constantFrom(...'{}[]:,-&*!|>\'"%@`#?\n\t~'),
        fc.constantFrom(
          '.nan',
          '1e400',
          '-1',
          '0',
          '..',
          ' step 0',
          'null',
          'true',
          '- ',
          '\n  ',
          'like: last',
          '__proto__',
        ),
      ),
    })
    fc.assert(
      fc.property(fc.array(stretch, { minLength: 1, maxLength: 3 }), (stretches) => {
        const text = stretches.reduce((t, { at, length, by }) => t.slice(0, at) + by + t.slice(at + length), job)
        judged(text)
      }),
      { numRuns: 3000 },
    )
  })

  test('a job of which any one value is something else', () => {
    // Every value behind a colon or within a list, in turn, by every kind of wrong thing.
    const places = [...job.matchAll(/(?<=: |\[|, )[^\s{}[\],][^{}[\],\n]*/g)]
    const others = [
      '',
      '{}',
      '[]',
      '[1]',
      '{ a: 1 }',
      'x',
      '-3',
      '0',
      '1e300',
      '"0"',
      'null',
      'false',
      '5 ML',
      '1..2',
      '..',
      '5..4 meV',
      '&a 1',
    ]
    for (const {
      0: { length },
      index,
    } of places) {
      for (const other of others) judged(job.slice(0, index) + other + job.slice(index + length))
    }
    expect(places.length).toBeGreaterThan(60)
  })

  test('a job without any one of its lines', () => {
    const lines = job.split('\n')
    lines.forEach((_, i) => {
      judged(lines.filter((_, j) => j !== i).join('\n'))
    })
  })

  test('any table', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'binary' }), fc.boolean(), (csv, head) => {
        judged(job, head ? `energy_meV,T\n${csv}` : csv)
      }),
      { numRuns: 500 },
    )
  })
})

/** Reads a job; anything thrown but a JobError is a failure, and so is a job with something missing. */
function judged(text: string, csv = files['goal.csv']): 'read' | 'refused' {
  try {
    const job = readJobText(text, 'fuzz.yaml', { 'goal.csv': csv })
    // Throws on anything that is not finite.
    canonicalJson(JSON.parse(jobContent(job)))
    expect(resumeContent(job)).not.toContain('undefined')
    expect(job.name).toMatch(/^[A-Za-z0-9][A-Za-z0-9-]*$/)
    expect(job.scanEv[0]).toBeGreaterThan(0)
    expect(job.demands.length).toBeGreaterThan(0)
    visit(job.stack.layers)
    return 'read'
  } catch (error) {
    if (!(error instanceof JobError)) throw error
    expect(error.problems.length).toBeGreaterThan(0)
    return 'refused'
  }
}

function visit(items: ReturnType<typeof readJobText>['stack']['layers']): void {
  expect(items.length).toBeGreaterThan(0)
  for (const item of items) {
    if (item.kind === 'period') visit(item.period)
    else if (item.like === null) {
      expect(item.media?.length).toBeGreaterThan(0)
      expect(item.width).not.toBeNull()
    } else expect(item.media).toBeNull()
  }
}

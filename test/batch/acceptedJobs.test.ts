import { rmSync } from 'node:fs'
import { join } from 'node:path'
import fc from 'fast-check'
import { expect, test } from 'vitest'
import { problemOf, runJob } from '../../src/batch/index.js'
import { type Job, readJobText } from '../../src/job/index.js'
import { emptyFolder } from '../cli/commandLine.js'

/** Small jobs put together from every part of the format: what is read without an error runs to a list. */

const one = <T>(...of: readonly T[]) => fc.constantFrom(...of)
const maybe = (of: fc.Arbitrary<string>) => fc.oneof(fc.constant(''), of)

const electronLayer = one(
  'material: AlGaAs, x: 0.3, width: 4..6 ML',
  'material: AlGaAs, x: { pick: [0.2, 0.3] }, width: 5 ML',
  'material: AlGaAs, x: 0.1..0.3 step 0.1, width: 1..2 nm',
  'material: { pick: [AlAs, GaAs] }, width: 2..4 ML',
  'material: InGaAs, x: 0.2, width: 6..7 ML',
  'material: GaAs, width: 16..18 ML',
  'material: GaAs, width: 0..3 ML',
  'material: soft, width: 3 ML',
  'potential: 0.2..0.3 eV step 0.05 eV, mass: 0.09, width: 1..2 nm step 0.5 nm',
)
const lightLayer = one(
  'material: SiO2, width: 1 qw',
  'material: Ta2O5, width: 60..64 nm step 2 nm',
  'material: { pick: [SiO2, MgF2] }, width: 0.9..1.1 qw step 0.1 qw',
  'index: 1.8..2 step 0.1, width: 50 nm',
  'material: Ag, width: 10..14 nm step 2 nm',
  'index: 2.1, extinction: 0.002, width: 0..20 nm step 10 nm',
  'material: dense, width: 1 qw',
)

const stackOf = (layer: fc.Arbitrary<string>) =>
  fc.tuple(layer, layer, layer, one('plain', 'like', 'period', 'mirror', 'unlike', 'tied')).map(([a, b, c, form]) => {
    const [x, y, z] = [`{ id: a, ${a} }`, `{ id: b, ${b} }`, `{ id: c, ${c} }`]
    switch (form) {
      case 'plain':
        return `[${x}, ${y}, ${z}]`
      case 'like':
        return `[${x}, ${y}, { like: a }]`
      case 'period':
        return `[{ repeat: 1..2, period: [${x}, ${y}], between: [${z}] }]`
      case 'mirror':
        return `[${x}, ${y}]\n  mirror: true`
      case 'unlike':
        return `[{ repeat: 2, alike: false, period: [${x}] }, ${y}]`
      default:
        return `[${x}, { id: t, ${b.replace(/width: .*$/, 'width: { like: a, times: 2 }')} }, ${z}]`
    }
  })

const electron = fc
  .record({
    stack: stackOf(electronLayer),
    leads: one(
      'entry: GaAs\n  exit: GaAs',
      'entry: GaAs\n  exit: hard wall',
      'entry: GaAs\n  exit: { material: AlGaAs, x: 0.05 }',
    ),
    head: maybe(
      one(
        'temperature: 77 K',
        'bias: 50 mV',
        'in-plane: 5 meV',
        'conditions: { rest: { bias: 0 mV }, on: { bias: 60 mV } }',
      ),
    ),
    demand: one(
      'peak: 110 meV, within: 60 meV, height: 0.1',
      'band: 110 meV, within: 60 meV, fwhm: ..90 meV, top: 0.3',
      'block: 30..60 meV, below: 0.5, points: 8',
      'pass: 100..110 meV, above: 0.2, points: 4',
      'pass: 40..60 meV, above: 0.1, quantity: R, points: 4',
      'peak: 110 meV, within: 60 meV, alone: 0.9, accept: { within: 90 meV }',
    ),
    growth: maybe(
      one(
        'growth: { compositions: 1 }',
        'growth: { sources: { Ga: 0.7 ML/s, Al: 0.3 ML/s, In: 0.2 ML/s } }',
        'growth: { total: ..20 nm }',
        'growth: { strain: 1 %, critical: true }',
        'growth: { starts at: entry, step: 0.25 nm }',
      ),
    ),
  })
  .map(
    ({ stack, leads, head, demand, growth }) =>
      `format: 1\nname: any\nkind: electron\n${head}\nmedia: { soft: { material: AlAs, mass: 0.12 } }\nstack:\n  ${leads}\n  layers: ${stack}\ntarget: { scan: 20..220 meV, demands: [{ ${demand} }] }\n${growth}\nsearch: { effort: brief }\ndeliver: { candidates: 2 }\n`,
  )

const light = fc
  .record({
    stack: stackOf(lightLayer),
    leads: one(
      'entry: air\n  exit: N-BK7',
      'entry: N-BK7\n  exit: N-BK7',
      'entry: air\n  exit: N-BK7\n  back: { thickness: 1 mm, then: air }',
      'entry: air\n  exit: Ag',
    ),
    head: maybe(
      one(
        'angle: 30 deg',
        'angle: 40 deg\npolarisation: p',
        'angle: 40 deg\npolarisation: mean',
        'conditions: { front: { angle: 0 deg }, tilted: { angle: 30 deg, polarisation: mean } }',
      ),
    ),
    demand: one(
      'peak: 600 nm, within: 40 nm, height: 0.1',
      'pass: 560..600 nm, above: 0.5, points: 8',
      'block: 560..600 nm, below: OD 0.1, quantity: R, points: 8',
      'block: 560..600 nm, below: 0.3, quantity: A, points: 4',
      'band: 600 nm, within: 60 nm, fwhm: ..300 nm, top: 0.5',
    ),
    growth: maybe(
      one(
        'growth: { thinnest: 10 nm }',
        'growth: { total: ..300 nm, index: 0.002 }',
        'growth: { starts at: entry, step: 0.5 nm }',
      ),
    ),
  })
  .map(
    ({ stack, leads, head, demand, growth }) =>
      `format: 1\nname: any\nkind: light\n${head}\nmedia: { dense: { material: SiO2, index: 1.5 } }\nstack:\n  ${leads}\n  layers: ${stack}\ntarget: { scan: 550..700 nm, demands: [{ ${demand} }] }\n${growth}\nsearch: { effort: brief }\ndeliver: { candidates: 2 }\n`,
  )

/** Null for what check would complain about. */
function accepted(text: string): Job | null {
  try {
    const job = readJobText(text, 'any.yaml')
    problemOf(job)
    return job
  } catch (error) {
    // Whatever it is, it is one of ours, with a sentence.
    expect((error as Error).name).toMatch(/^(JobError|DesignError|MaterialError|StackError)$/)
    return null
  }
}

test('any job that check accepts runs', { timeout: 600_000 }, async () => {
  let ran = 0
  const folder = emptyFolder()
  await fc.assert(
    fc.asyncProperty(fc.oneof(electron, light), async (text) => {
      const job = accepted(text)
      if (job === null) return
      const { design } = problemOf(job)
      // Larger ones take longer than they teach.
      if (design.places.reduce((product, { choices }) => product * choices, 1) > 120) return
      ran++
      const results = join(folder, String(ran))
      const result = await runJob({ ...job, growth: { ...job.growth, trials: 2 } }, { resultsDir: results, threads: 1 })
      rmSync(results, { recursive: true, force: true })
      expect(result.candidates.length).toBeGreaterThan(0)
      for (const { fluxError, pathError } of result.candidates) {
        expect(fluxError).toBeLessThan(1e-9)
        expect(pathError).toBeLessThan(1e-6)
      }
    }),
    { seed: 11, numRuns: 60 },
  )
  expect(ran).toBeGreaterThan(20)
})

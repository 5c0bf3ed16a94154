import { describe, expect, test } from 'vitest'
import { canonicalJson, jobContent, readJobText, resumeContent } from '../../src/job/index.js'

const text = `format: 1
name: halm-80
kind: electron
stack: { entry: GaAs, layers: [{ id: b, material: AlAs, width: 5..6 ML }], exit: GaAs }
target: { scan: 5..200 meV, demands: [{ curve: goal.csv }] }
growth: { sources: { Ga: 0.7 ML/s, Al: 0.3 ML/s } }
`
const csv = 'energy_meV,T\n80,0.9\n'
const read = (source = text, table = csv) => readJobText(source, 'halm.yaml', { 'goal.csv': table })

describe('canonical JSON', () => {
  test('keys are sorted, numbers are the shortest, there is no white space', () => {
    expect(canonicalJson({ b: [1e-7, -0, 0.1 + 0.2, 1e21], a: { d: null, c: 'x"' }, e: undefined })).toBe(
      '{"a":{"c":"x\\"","d":null},"b":[1e-7,0,0.30000000000000004,1e+21]}',
    )
  })

  test('a number that is not finite has no canonical form', () => {
    expect(() => canonicalJson([Number.NaN])).toThrow(RangeError)
  })
})

describe('what a resume looks at', () => {
  const resume = resumeContent(read())

  test('name, note, deliver, trials, comments and the layout of file and table change nothing', () => {
    for (const same of [
      text.replace('halm-80', 'other'),
      `${text}note: something\ndeliver: { candidates: 3 }\n`,
      text.replace('0.3 ML/s }', '0.3 ML/s }, trials: 100'),
      `# a comment\n${text.replace('scan: 5..200 meV', 'scan: "0.005..0.2 eV"')}`,
      `${text}temperature: 300 K\nsearch: { effort: standard, seed: 1 }\n`,
      text.replace('0.3 ML/s }', '0.3 ML/s }, spread: { rate: 1 %, layer: 0.5 ML, x: 0.005 }'),
    ]) {
      expect(resumeContent(read(same))).toBe(resume)
    }
    expect(resumeContent(read(text, 'T,energy_meV\r\n0.9,8e1\r\n'))).toBe(resume)
  })

  test('everything that the search sees changes it, sources, spread and the contents of tables too', () => {
    for (const other of [
      text.replace('5..6 ML', '5..7 ML'),
      text.replace('5..200', '5..201'),
      text.replace('0.3 ML/s', '0.31 ML/s'),
      text.replace('0.3 ML/s }', '0.3 ML/s }, spread: { rate: 2 % }'),
      `${text}search: { seed: 2 }\n`,
      `${text}search: { effort: overnight }\n`,
      `${text}temperature: 77 K\n`,
    ]) {
      expect(resumeContent(read(other))).not.toBe(resume)
    }
    expect(resumeContent(read(text, 'energy_meV,T\n80,0.8\n'))).not.toBe(resume)
  })

  test('the whole content tells jobs apart that differ in what is delivered', () => {
    expect(jobContent(read(`${text}deliver: { candidates: 3 }\n`))).not.toBe(jobContent(read()))
    expect(jobContent(read(`\n\n${text}`))).toBe(jobContent(read()))
  })
})

import { describe, expect, test } from 'vitest'
import { DesignError, designOf } from '../../src/design/index.js'
import { JobError, readJobText } from '../../src/job/index.js'

const job = (layers: string, rest = '', more = '') =>
  readJobText(
    `format: 1
name: any
kind: electron
stack:
  entry: GaAs
  layers: [${layers}]
  exit: GaAs
${rest}target: { scan: 5..200 meV, demands: [{ peak: 80 meV, within: 5 meV }] }
${more}`,
    'any.yaml',
  )

const texts = (design: ReturnType<typeof designOf>) =>
  Array.from(design.assignments(), (assignment) => design.text(assignment))

const complaint = (read: () => unknown): string => {
  try {
    read()
  } catch (error) {
    expect(error).toBeInstanceOf(JobError)
    return (error as JobError).message
  }
  throw new Error('The job was read.')
}

describe('layers between repetitions', () => {
  test('stand between them only', () => {
    const design = designOf(
      job(
        '{ repeat: 3, period: [{ id: b, material: AlAs, width: 2 ML }], between: [{ id: w, material: GaAs, width: 9..10 ML }] }',
      ),
    )
    expect(texts(design)).toEqual([9, 10].map((ml) => `AlAs 2 / GaAs ${ml} / AlAs 2 / GaAs ${ml} / AlAs 2 ML`))
    expect(design.stackCount()).toBe(2)
  })

  test('may follow others, and stand in nested periods', () => {
    const inner =
      '{ repeat: 2, period: [{ id: b, material: AlAs, width: 2 ML }], between: [{ id: w, material: GaAs, width: 5 ML }] }'
    const design = designOf(job(`{ repeat: 2, period: [${inner}], between: [{ id: s, material: GaAs, width: 8 ML }] }`))
    expect(texts(design)).toEqual(['AlAs 2 / GaAs 5 / AlAs 2 / GaAs 8 / AlAs 2 / GaAs 5 / AlAs 2 ML'])
  })

  test('have no place without a period', () => {
    expect(
      complaint(() => job('{ material: AlAs, width: 2 ML, between: [{ material: GaAs, width: 5 ML }] }')),
    ).toContain('"between" has no place in a layer with "material"')
  })
})

describe('a count of repetitions that the search chooses', () => {
  const period = (repeat: string, between = '') =>
    `{ id: p, repeat: ${repeat}, period: [{ id: b, material: AlAs, width: 2..3 ML }, { id: w, material: GaAs, width: 9 ML }]${between} }, { id: last, material: AlAs, width: 4 ML }`

  test('gives each count its stacks', () => {
    const design = designOf(job(period('1..3')))
    const found = texts(design)
    expect(new Set(found).size).toBe(6)
    expect(found).toContain('AlAs 2 / GaAs 9 / AlAs 4 ML')
    expect(found).toContain('AlAs 3 / GaAs 9 / AlAs 3 / GaAs 9 / AlAs 3 / GaAs 9 / AlAs 4 ML')
    expect(design.stackCount()).toBe(6)
    expect(design.places.map(({ name, choices }) => `${name} ${choices}`)).toEqual(['b.width 2', 'p.repeat 3'])
  })

  test('counts once what is one stack: a layer between repetitions of which there is one', () => {
    const design = designOf(job(period('1..2', ', between: [{ id: s, material: InAs, width: 1..2 ML }]')))
    const ids = new Set(Array.from(design.assignments(), (assignment) => design.id(assignment)))
    // One repetition: two barriers. Two: two barriers by two spacers.
    expect(ids.size).toBe(6)
    expect(design.stackCount()).toBe(6)
  })

  test('lists the image of a mirror image once, and fits each count as it stands', () => {
    const free =
      '{ id: p, repeat: 1..2, period: [{ id: b, material: AlAs, width: 2..4 ML }, { id: w, material: GaAs, width: 9 ML }] }, { id: c, material: AlAs, width: 2..4 ML }'
    const design = designOf(job(free))
    const listed = new Set(Array.from(design.assignments(), (assignment) => design.canonical(assignment).join()))
    // With one repetition b and c may change places: 6 of 9; with two nothing is the image of another but itself.
    expect(design.stackCount()).toBe(6 + 9)
    expect(listed.size).toBe(6 + 9)
    for (const assignment of [Int32Array.of(0, 2, 0), Int32Array.of(1, 0, 1)]) {
      const relaxed = design.relax(assignment)
      expect([...relaxed.snap(relaxed.start)]).toEqual([...assignment])
      expect(relaxed.systems(relaxed.start)[0].stack.medium).toHaveLength(assignment[2] === 0 ? 3 : 5)
    }
  })

  test('is a whole number, or two that ascend', () => {
    expect(complaint(() => job(period('5..2')))).toContain('repeat "5..2" runs downwards. Write "2..5".')
    expect(complaint(() => job(period('0..2')))).toContain('is no count within 1..1000')
    expect(complaint(() => job(period('"2 to 5"')))).toContain('Write a whole number, like 5, or a range, like "2..5".')
  })
})

describe('compositions from the sources', () => {
  const sources = 'growth: { sources: { Ga: 0.70 ML/s, Al-1: 0.233 ML/s, Al-2: 0.377 ML/s }, compositions: 1 }\n'

  test('are those that the pairs of cells reach, to four digits', () => {
    const design = designOf(job('{ material: AlGaAs, x: { from: sources }, width: 3 ML }', '', sources))
    // 0.233/(0.233 + 0.70) and 0.377/(0.377 + 0.70).
    expect(texts(design)).toEqual(['AlGaAs(0.2497) 3 ML', 'AlGaAs(0.35) 3 ML'])
  })

  test('need the cells', () => {
    const without = () => job('{ material: AlGaAs, x: { from: sources }, width: 3 ML }')
    expect(complaint(without)).toContain(
      'growth.sources has no cells for Al and Ga, from which AlGaAs could take its composition',
    )
  })
})

describe('widths that rise', () => {
  const three = ['a', 'b', 'c']
    .map((id) => `{ id: ${id}, material: AlAs, width: 2..5 ML }`)
    .join(', { material: GaAs, width: 9 ML }, ')

  test('leave the stacks in which they do not fall, each counted once', () => {
    const design = designOf(job(three, '  rising: [a, b, c]\n'))
    const widths = Array.from(design.assignments(), (assignment) => [...assignment])
    // Combinations with repetition of 3 out of 4.
    expect(widths).toHaveLength(20)
    expect(design.stackCount()).toBe(20)
    for (const [a, b, c] of widths) expect(a <= b && b <= c).toBe(true)
  })

  test('are repaired to widths that rise, and stay where they do', () => {
    const design = designOf(job(three, '  rising: [a, b, c]\n'))
    for (let code = 0; code < 64; code++) {
      const assignment = Int32Array.of(code >> 4, (code >> 2) & 3, code & 3)
      const repaired = design.repair(assignment)
      expect(design.feasible(repaired)).toBe(true)
      if (design.feasible(assignment)) expect(repaired).toEqual(assignment)
    }
  })

  test('compare in nm where monolayers differ, and refuse ranges that can not rise', () => {
    const mixed =
      '{ id: a, material: GaAs, width: 1.13 nm }, { id: s, material: AlAs, width: 3 ML }, { id: b, material: GaAs, width: 3..5 ML }'
    expect(texts(designOf(job(mixed, '  rising: [a, b]\n')))).toEqual([
      'GaAs 4 / AlAs 3 / GaAs 4 ML',
      'GaAs 4 / AlAs 3 / GaAs 5 ML',
    ])
    const falling =
      '{ id: a, material: AlAs, width: 9 ML }, { id: s, material: GaAs, width: 3 ML }, { id: b, material: AlAs, width: 3..5 ML }'
    expect(() => designOf(job(falling, '  rising: [a, b]\n'))).toThrow(DesignError)
    expect(() => designOf(job(falling, '  rising: [a, b]\n'))).toThrow('No stack has widths that rise along a, b.')
  })

  test('name layers by their ids', () => {
    expect(complaint(() => job(three, '  rising: [a, d]\n'))).toContain('There is no layer with the id "d"')
    expect(complaint(() => job(three, '  rising: [a]\n'))).toContain('"rising" orders two layers or more')
  })
})

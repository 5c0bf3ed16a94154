import { describe, expect, it } from 'vitest'
import { DesignError, designOf } from '../../src/design/index.js'
import type { Job } from '../../src/job/index.js'
import { bandParameters } from '../../src/media/index.js'
import { resolveMedium } from '../../src/model/index.js'
import { coldCollector, distinctIds, jobWith, numbersJob } from './jobs.js'

const first = (job: Job) => {
  const design = designOf(job)
  return { design, assignment: design.repair(new Int32Array(design.places.length)) }
}

/** Ids and counts of the first stack of a job, entry to exit. */
const stackOf = (job: Job) => {
  const { design, assignment } = first(job)
  return design.layers(assignment).map(({ id, count }) => `${id} ${count}`)
}

describe('the lattice of a job', () => {
  it('holds the 630 stacks of the main example: 2 compositions, 15 barriers, 21 wells', () => {
    const design = designOf(coldCollector())
    expect(design.stackCount()).toBe(630)
    expect(design.places).toEqual([
      { name: 'outer.x', choices: 2, ordered: true, family: 0 },
      { name: 'outer.width', choices: 15, ordered: true, family: 1 },
      { name: 'well.width', choices: 21, ordered: true, family: 2 },
    ])
    expect([...design.assignments()].length).toBe(630)
    expect(distinctIds(coldCollector()).size).toBe(630)
  })

  it('gives layers whole numbers of their own strained monolayers at 300 K, whatever the temperature', () => {
    const { design, assignment } = first(coldCollector())
    const [outer, well, again] = design.layers(assignment)
    const warm = { ...design.situations[0], temperatureK: 300 }
    expect(outer.stepNm).toBe(resolveMedium(outer.choice, warm).monolayerNm)
    expect(well.stepNm).toBe(bandParameters('GaAs', null, 300).latticeNm / 2)
    expect(outer.widthNm).toBe(6 * outer.stepNm)
    expect(again).toEqual({ ...outer, id: again.id })
  })

  it('names a stack readably', () => {
    const design = designOf(coldCollector())
    expect(design.text(Int32Array.of(1, 6, 8))).toBe('AlGaAs(0.35) 12 / GaAs 18 / AlGaAs(0.35) 12 ML')
  })
})

describe('families of places', () => {
  it('hold what layers described alike decide alike', () => {
    const barrier = 'material: AlGaAs, x: { pick: [0.2, 0.3] }, width: 4..9 ML'
    const job = jobWith(`  layers:
    - { ${barrier} }
    - { material: GaAs, width: 4..9 ML }
    - { ${barrier} }
    - { material: GaAs, width: 4..9 ML }
    - { ${barrier.replace('4..9', '4..8')} }`)
    expect(designOf(job).places.map(({ family }) => family)).toEqual([0, 1, 2, 0, 1, 2, 3, 4])
  })
})

describe('the structure of a stack', () => {
  it('lets a layer be like one that comes later, and like one inside a period', () => {
    const job = jobWith(`  layers:
    - { like: b }
    - repeat: 2
      period:
        - { id: a, material: GaAs, width: 3 ML }
        - { id: b, material: AlGaAs, x: 0.3, width: 5 ML }
    - { like: a }`)
    expect(stackOf(job).map((layer) => layer.split(' ')[1])).toEqual(['5', '3', '5', '3', '5', '3'])
  })

  it('reflects stacks and periods about their last layer', () => {
    const job = jobWith(`  mirror: true
  layers:
    - repeat: 2
      mirror: true
      period:
        - { id: b, material: AlGaAs, x: 0.3, width: 1 ML }
        - { id: w, material: GaAs, width: 2 ML }
    - { id: c, material: InGaAs, x: 0.1, width: 7 ML }`)
    // The barriers of two repetitions stand side by side: grown as one.
    expect(stackOf(job)).toEqual(['b 1', 'w 2', 'b+b 2', 'w 2', 'b 1', 'c 7', 'b 1', 'w 2', 'b+b 2', 'w 2', 'b 1'])
  })

  it('merges equal neighbours and drops layers without width', () => {
    const job = jobWith(`  layers:
    - { id: a, material: AlGaAs, x: 0.3, width: 4 ML }
    - { id: gap, material: GaAs, width: 0..2 ML }
    - { id: b, material: AlGaAs, x: 0.3, width: 5 ML }`)
    const design = designOf(job)
    expect(design.layers(Int32Array.of(0)).map(({ id, count }) => [id, count])).toEqual([['a+b', 9]])
    expect(design.systems(Int32Array.of(0))[0].stack.width.length).toBe(1)
    expect(design.layers(Int32Array.of(1)).length).toBe(3)
  })
})

describe('widths', () => {
  it('holds the whole multiples of the growth step inside an nm range, ends within 1e-9 included', () => {
    const job = numbersJob(
      '    - { id: a, potential: 0.3 eV, mass: 0.09, width: 0.566..11.32 nm }',
      'growth: { step: 0.283 nm }',
    )
    const design = designOf(job)
    expect(design.places[0].choices).toBe(39)
    expect(design.layers(Int32Array.of(0))[0]).toMatchObject({ count: 2, stepNm: 0.283 })
    expect(design.layers(Int32Array.of(38))[0].count).toBe(40)
  })

  it('takes 0.1 nm as the step of numbers and one monolayer as the step of materials where the job has none', () => {
    const numbers = designOf(numbersJob('    - { id: a, potential: 0.3 eV, mass: 0.09, width: 1..2 nm }'))
    expect(numbers.places[0].choices).toBe(11)
    const material = designOf(jobWith('  layers: [{ id: a, material: GaAs, width: 1..2 nm }]'))
    expect(material.layers(Int32Array.of(0))[0].count).toBe(4)
    expect(material.places[0].choices).toBe(4)
  })

  it('allows each composition the counts of its own monolayer', () => {
    // 3.4 nm is 12 ML of GaAs but less than 12 ML of InAs, which is strained longer.
    const job = jobWith('  layers: [{ id: a, material: InGaAs, x: { pick: [0, 1] }, width: 3..3.4 nm }]')
    const design = designOf(job)
    // The array is reused: each must be looked at in its turn.
    const counts = Array.from(design.assignments(), (assignment) => design.layers(assignment)[0])
    expect(counts.map(({ choice, count }) => [choice.kind === 'material' && choice.x, count])).toEqual([
      [0, 11],
      [0, 12],
      [1, 10],
    ])
    for (const { widthNm } of counts) expect(widthNm >= 3 && widthNm <= 3.4).toBe(true)
    expect(design.stackCount()).toBe(3)
  })

  it('rounds fixed nm of a material to whole monolayers with a note, and leaves those of numbers alone', () => {
    const material = designOf(jobWith('  layers: [{ id: a, material: GaAs, width: 5 nm }]'))
    expect(material.layers(new Int32Array(0))[0]).toMatchObject({ count: 18 })
    expect(material.notes).toEqual(['Layer a: 5 nm of GaAs is taken as 18 ML, 5.0879 nm.'])
    const numbers = designOf(numbersJob('    - { id: a, potential: 0.3 eV, mass: 0.09, width: 5.03 nm }'))
    expect(numbers.layers(new Int32Array(0))[0]).toMatchObject({ count: 1, widthNm: 5.03 })
    expect(numbers.notes).toEqual([])
  })

  it('says which layer has no step inside its range', () => {
    const narrow = () => designOf(jobWith('  layers: [{ id: thin, material: GaAs, width: 0.3..0.4 nm }]'))
    expect(narrow).toThrow(DesignError)
    expect(narrow).toThrow(/thin/)
  })
})

describe('lists of materials', () => {
  const job = numbersJob(
    `    - { id: a, material: { pick: [low, high] }, width: 1..2 nm }
    - { id: b, potential: 0.1..0.3 eV step 0.1 eV, mass: 0.09, width: 2 nm }`,
    'media: { low: { potential: 0.1..0.2 eV step 0.05 eV, mass: 0.08 }, high: { potential: 0.4 eV, mass: 0.09 } }',
  )

  it('has a place for the list, one for each range of numbers, one for the width', () => {
    expect(designOf(job).places).toEqual([
      { name: 'a.material', choices: 2, ordered: false, family: 0 },
      { name: 'a.potential', choices: 3, ordered: true, family: 1 },
      { name: 'a.width', choices: 11, ordered: true, family: 2 },
      { name: 'b.potential', choices: 3, ordered: true, family: 3 },
    ])
  })

  it('counts a choice that a material has not as infeasible, and repairs it', () => {
    const design = designOf(job)
    const beyond = Int32Array.of(1, 2, 5, 1)
    expect(design.feasible(beyond)).toBe(false)
    expect([...design.repair(beyond)]).toEqual([1, 0, 5, 1])
    expect(design.stackCount()).toBe((3 + 1) * 11 * 3)
    expect([...design.assignments()].length).toBe(132)
    expect(distinctIds(job).size).toBe(132)
  })
})

describe('the limit on compositions', () => {
  const barriers = (limit: string, lead = 'GaAs') =>
    jobWith(
      `  exit: ${lead}
  layers:
    - { id: a, material: AlGaAs, x: 0..0.4 step 0.1, width: 5 ML }
    - { id: w, material: GaAs, width: 9 ML }
    - { id: b, material: AlGaAs, x: { pick: [0.2, 0.3, 0.5] }, width: 6 ML }`,
      limit,
    )

  it('counts different alloys; binaries, also as the end of an alloy, are free', () => {
    const one = designOf(barriers('growth: { compositions: 1 }'))
    // x = 0 beside each of three, and the two in common.
    expect(one.stackCount()).toBe(5)
    expect([...one.assignments()].length).toBe(5)
    expect(designOf(barriers('growth: { compositions: 2 }')).stackCount()).toBe(15)
    expect(designOf(barriers('')).stackCount()).toBe(15)
  })

  it('leaves the alloys of the leads free', () => {
    const design = designOf(barriers('growth: { compositions: 1 }', '{ material: AlGaAs, x: 0.2 }'))
    // b at 0.2 needs none: all five; b at 0.3: x = 0, 0.2, 0.3; b at 0.5: x = 0, 0.2.
    expect(design.stackCount()).toBe(10)
    expect([...design.assignments()].length).toBe(10)
  })

  it('repairs to the alloys that move the compositions least', () => {
    const design = designOf(barriers('growth: { compositions: 1 }'))
    expect([...design.repair(Int32Array.of(4, 1))]).toEqual([3, 1])
    expect([...design.repair(Int32Array.of(1, 2))]).toEqual([0, 2])
    for (const assignment of design.assignments()) expect(design.repair(assignment)).toBe(assignment)
  })

  it('says when no stack keeps it', () => {
    const none = () =>
      designOf(
        jobWith(
          `  layers:
    - { id: a, material: AlGaAs, x: 0.2, width: 5 ML }
    - { id: b, material: AlGaAs, x: 0.3, width: 5 ML }`,
          'growth: { compositions: 1 }',
        ),
      )
    expect(none).toThrow(DesignError)
    expect(none).toThrow(/at most 1/)
  })
})

import { describe, expect, it } from 'vitest'
import { designOf } from '../../src/design/index.js'
import { spectrumInto, type WaveSystem } from '../../src/wave/index.js'
import { distinctIds, jobWith } from './jobs.js'

const asymmetric = (a: string, b: string, exit = 'GaAs', rest = '') =>
  jobWith(
    `  exit: ${exit}
  layers:
    - { id: a, material: AlGaAs, ${a} }
    - { id: w, material: GaAs, width: 10..11 ML }
    - { id: b, material: AlGaAs, ${b} }`,
    rest,
  )

describe('a stack and its mirror image', () => {
  const job = asymmetric('x: { pick: [0.2, 0.3] }, width: 4..7 ML', 'x: { pick: [0.2, 0.3] }, width: 4..7 ML')

  it('are one stack between equal leads: the thicker layer first, then the larger x', () => {
    const design = designOf(job)
    const shown = (...assignment: number[]) => design.text(design.canonical(Int32Array.from(assignment)))
    expect(shown(0, 1, 0, 0, 3)).toBe('AlGaAs(0.2) 7 / GaAs 10 / AlGaAs(0.2) 5 ML')
    expect(shown(0, 3, 0, 0, 1)).toBe('AlGaAs(0.2) 7 / GaAs 10 / AlGaAs(0.2) 5 ML')
    expect(shown(0, 1, 0, 1, 1)).toBe('AlGaAs(0.3) 5 / GaAs 10 / AlGaAs(0.2) 5 ML')
    expect(shown(1, 1, 0, 1, 1)).toBe('AlGaAs(0.3) 5 / GaAs 10 / AlGaAs(0.3) 5 ML')
  })

  it('are counted once: 2 wells times 8 barriers with repetition', () => {
    expect(designOf(job).stackCount()).toBe(2 * ((8 * 9) / 2))
    expect(distinctIds(job).size).toBe(72)
  })

  it('keep their spectrum, and canonical is one for both', () => {
    const design = designOf(job)
    const turned = Int32Array.of(1, 3, 1, 0, 0)
    const one = design.canonical(Int32Array.of(0, 0, 1, 1, 3))
    expect([...one]).toEqual([...turned])
    expect([...design.canonical(one)]).toEqual([...turned])
    const [T, mirrored] = [one, Int32Array.of(0, 0, 1, 1, 3)].map((a) => transmission(design.systems(a)[0]))
    for (let i = 0; i < T.length; i++) expect(Math.abs(T[i] / mirrored[i] - 1)).toBeLessThan(1e-12)
  })

  it('count apart where only some images are on the lattice', () => {
    const partly = asymmetric('x: { pick: [0.2, 0.3] }, width: 4..7 ML', 'x: { pick: [0.3, 0.4] }, width: 6..9 ML')
    const design = designOf(partly)
    // Both layers in the common ones (0.3, 6 or 7 ML): 4 pairs are 3 stacks.
    expect(design.stackCount()).toBe(2 * (8 * 8 - 1))
    expect(distinctIds(partly).size).toBe(126)
  })

  it('are two stacks between leads that differ', () => {
    const open = asymmetric('x: 0.2, width: 4..7 ML', 'x: 0.2, width: 4..7 ML', '{ material: AlGaAs, x: 0.05 }')
    expect(designOf(open).stackCount()).toBe(32)
    const wall = asymmetric('x: 0.2, width: 4..7 ML', 'x: 0.2, width: 4..7 ML', 'hard wall')
    expect(designOf(wall).stackCount()).toBe(32)
    expect(distinctIds(wall).size).toBe(32)
  })

  it('are counted under the limit on compositions and through ties', () => {
    const limited = asymmetric(
      'x: { pick: [0.2, 0.3] }, width: 4..7 ML',
      'x: { pick: [0.2, 0.3] }, width: 4..7 ML',
      'GaAs',
      'growth: { compositions: 1 }',
    )
    expect(designOf(limited).stackCount()).toBe(distinctIds(limited).size)
    const tied = jobWith(`  layers:
    - { id: a, material: AlGaAs, x: 0.3, width: 4..7 ML }
    - { id: w, material: GaAs, width: 8..12 ML }
    - { like: a }
    - { id: v, material: GaAs, width: 9..11 ML }
    - { id: b, material: AlGaAs, x: 0.3, width: 5..9 ML }`)
    expect(designOf(tied).stackCount()).toBe(distinctIds(tied).size)
  })

  it('are counted where layers can merge and vanish', () => {
    const vanishing = jobWith(`  layers:
    - { id: a, material: AlGaAs, x: 0.3, width: 1..3 ML }
    - { id: w, material: GaAs, width: 0..2 ML }
    - { id: b, material: AlGaAs, x: { pick: [0.2, 0.3] }, width: 1..3 ML }`)
    const design = designOf(vanishing)
    expect(design.stackCount()).toBe(distinctIds(vanishing).size)
    expect(design.stackCount()).toBeLessThan(54)
  })
})

function transmission({ media, stack }: WaveSystem): Float64Array {
  const energies = Float64Array.of(0.01, 0.05, 0.1, 0.2, 0.3)
  const points = energies.length
  const table = {
    count: media.count,
    points,
    q: new Float64Array(media.count * points),
    mu: new Float64Array(media.count * points),
  }
  media.fill(energies, table)
  const T = new Float64Array(points)
  spectrumInto(table, stack, { T, R: new Float64Array(points) })
  return T
}

import { describe, expect, it } from 'vitest'
import { type Design, designOf } from '../../src/design/index.js'
import type { WaveSystem } from '../../src/wave/index.js'
import { coldCollector, jobWith, numbersJob } from './jobs.js'

/** What a system is made of: width, and q and mu at an energy, of each row; they tell potential and mass. */
function rows({ media, stack }: WaveSystem): number[] {
  const table = { count: media.count, points: 1, q: new Float64Array(media.count), mu: new Float64Array(media.count) }
  media.fill(Float64Array.of(0.08), table)
  return Array.from(stack.medium, (m, i) => [stack.width[i], table.q[m], table.mu[m]]).flat()
}

/** The same from `directions`, through the media's partial derivatives. */
function predicted(system: WaveSystem, direction: Float64Array): number[] {
  const partials = new Float64Array(6)
  return Array.from(system.stack.medium, (m, i) => {
    system.media.partials(0.08, m, partials)
    const [width, ...numbers] = direction.subarray(4 * i, 4 * i + 4)
    const change = (of: 0 | 1) => numbers.reduce((sum, d, p) => sum + d * partials[2 * p + of], 0)
    return [width, change(0), change(1)]
  }).flat()
}

function checkDirections(design: Design, assignment: Int32Array): void {
  const relaxed = design.relax(assignment)
  const at = relaxed.start.map((value, v) => 0.6 * value + 0.2 * relaxed.lower[v] + 0.2 * relaxed.upper[v])
  const [directions] = relaxed.directions(at)
  const [system] = relaxed.systems(at)
  const size = 4 * system.stack.width.length
  for (let v = 0; v < at.length; v++) {
    const h = 1e-4
    const ends = [h, -h].map((shift) => {
      const moved = at.slice()
      moved[v] += shift
      return rows(relaxed.systems(moved)[0])
    })
    const expected = predicted(system, directions.subarray(v * size, (v + 1) * size))
    expected.forEach((slope, i) => {
      const difference = (ends[0][i] - ends[1][i]) / (2 * h)
      expect(Math.abs(slope - difference)).toBeLessThan(1e-7 * Math.max(1, Math.abs(difference)))
    })
  }
}

describe('the continuous neighbourhood', () => {
  it('starts at the stack itself', () => {
    const design = designOf(coldCollector())
    const assignment = Int32Array.of(1, 6, 8)
    const relaxed = design.relax(assignment)
    expect(rows(relaxed.systems(relaxed.start)[0])).toEqual(rows(design.systems(assignment)[0]))
    expect([...relaxed.snap(relaxed.start)]).toEqual([...assignment])
  })

  it('moves a layer wherever it stands, and an alloy\u2019s monolayer along with x', () => {
    checkDirections(designOf(coldCollector()), Int32Array.of(1, 6, 8))
    const mirrored = jobWith(`  mirror: true
  layers:
    - { id: a, material: InGaAs, x: 0..0.4 step 0.1, width: 3..9 ML }
    - repeat: 2
      period:
        - { id: w, material: GaAs, width: 3..9 ML }
        - { like: a }
    - { id: c, material: AlGaAs, x: 0.1..0.5 step 0.1, width: 2..4 nm }`)
    const design = designOf(mirrored)
    checkDirections(design, design.repair(Int32Array.from(design.places, ({ choices }) => choices >> 1)))
  })

  it('frees potentials, masses and alphas', () => {
    const layer =
      '    - { id: a, potential: 0.2..0.4 eV step 5 meV, mass: 0.08..0.1 step 0.005, alpha: 1..2 /eV step 0.5 /eV, width: 1..5 nm }'
    const design = designOf(numbersJob(layer))
    checkDirections(design, Int32Array.of(10, 2, 1, 20))
  })

  it('snaps to the nearest values, which exist for the medium that was snapped to', () => {
    const design = designOf(
      jobWith('  layers: [{ id: a, material: InGaAs, x: { pick: [0, 0.3, 1] }, width: 3..3.4 nm }]'),
    )
    const relaxed = design.relax(Int32Array.of(0, 1))
    for (const at of [relaxed.lower, relaxed.start, relaxed.upper]) {
      expect(design.feasible(relaxed.snap(at))).toBe(true)
    }
    const snapped = design.layers(relaxed.snap(Float64Array.of(6.4, 3.3)))[0]
    expect(snapped.choice).toMatchObject({ x: 0.3 })
  })

  it('snaps to at most so many alloys', () => {
    const job = jobWith(
      `  layers:
    - { id: a, material: AlGaAs, x: 0.1..0.4 step 0.1, width: 5..9 ML }
    - { id: w, material: GaAs, width: 9 ML }
    - { id: b, material: AlGaAs, x: 0.1..0.4 step 0.1, width: 6 ML }`,
      'growth: { compositions: 1 }',
    )
    const design = designOf(job)
    const relaxed = design.relax(Int32Array.of(1, 2, 1))
    const snapped = relaxed.snap(Float64Array.from([1.9, relaxed.start[1], 3.9]))
    expect(design.feasible(snapped)).toBe(true)
  })
})

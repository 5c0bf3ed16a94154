import { describe, expect, it } from 'vitest'
import { readJobText } from '../../src/job/index.js'
import { contradictions } from '../../src/target/contradictions.js'

/** The contradictions of some demands, written as in a job. */
function of(...demands: string[]) {
  const text = `format: 1
name: any
kind: electron
conditions: { rest: { bias: 0 mV }, on: { bias: 9 mV } }
stack: { entry: GaAs, layers: [{ material: AlAs, width: 3 ML }], exit: GaAs }
target:
  scan: 5..200 meV
  demands:
${demands.map((demand) => `    - ${demand}`).join('\n')}
`
  return contradictions(readJobText(text, 'any.yaml'))
}

const line = '{ peak: 80 meV, within: 5 meV, fwhm: 1..4 meV, height: 0.8 }'

describe('demands that contradict one another', () => {
  it('are not found in the design\u2019s filter, which eight stacks meet', () => {
    expect(of(line, '{ block: 5..60 meV, below: 2e-2 }', '{ block: 110..200 meV, below: 2e-2 }')).toEqual([])
  })

  it('are a pass and a block that share an energy, be it one', () => {
    const [only, ...more] = of('{ pass: 70..90 meV, above: 0.5 }', '{ block: 90..200 meV, below: 0.4 }')
    expect(more).toEqual([])
    expect(only).toMatchObject({ demands: ['d1', 'd2'], certain: true })
    expect(only.sentence).toBe(
      "d1 and d2 contradict one another. At 90 meV T can't be at least 0.5 and at most 0.4. Let the ranges end apart.",
    )
    expect(of('{ pass: 70..90 meV, above: 0.5 }', '{ block: 90..200 meV, below: 0.5 }')).toEqual([])
    expect(of('{ pass: 70..90 meV, above: 0.5 }', '{ block: 91..200 meV, below: 0.4 }')).toEqual([])
  })

  it('are none where they hold at different conditions', () => {
    const both = ['{ pass: 70..90 meV, above: 0.5, at: on }', '{ block: 80..200 meV, below: 0.4, at: rest }']
    expect(of(...both)).toEqual([])
    expect(of(both[0], both[1].replace('rest', 'on'))).toHaveLength(1)
    expect(of(both[0], both[1].replace(', at: rest', ''))).toHaveLength(1)
  })

  it('are a peak and a block over all of its window, unless the line may be too narrow to count', () => {
    expect(of(line, '{ block: 60..100 meV, below: 2e-2 }')).toMatchObject([{ demands: ['d1', 'd2'], certain: true }])
    expect(of(line.replace('1..4', '..4'), '{ block: 60..100 meV, below: 2e-2 }')).toMatchObject([{ certain: false }])
    expect(of(line, '{ block: 60..100 meV, below: 0.9 }')).toEqual([])
  })

  it('are a line and blocks that its Lorentzian tails reach, wherever in its window it lies', () => {
    // 0.8/(1 + (2 d/1 meV)²) = 0.02 at d = 0.5 sqrt(39) = 3.1225 meV: the gap must be twice that.
    const gap = (low: number, high: number) =>
      of(line, `{ block: 5..${low} meV, below: 2e-2 }`, `{ block: ${high}..200 meV, below: 2e-2 }`)
    expect(gap(77, 83.24)).toMatchObject([{ demands: ['d1', 'd2', 'd3'], certain: false }])
    expect(gap(77, 83.24)[0].sentence).toContain('3.122 meV')
    expect(gap(77, 83.25)).toEqual([])
  })

  it('are a narrow line and a pass wide around it', () => {
    expect(of(line, '{ pass: 70..90 meV, above: 0.6 }')).toMatchObject([{ certain: true }])
    expect(of(line, '{ pass: 78..82 meV, above: 0.6 }')).toEqual([])
    expect(of(line, '{ pass: 70..90 meV, above: 0.4 }')).toEqual([])
  })

  it('are two wide lines too close to each other', () => {
    const at = (energy: number) => `{ peak: ${energy} meV, within: 0.5 meV, fwhm: 10..20 meV }`
    expect(of(at(80), at(84))).toMatchObject([{ demands: ['d1', 'd2'], certain: false }])
    expect(of(at(80), at(95))).toEqual([])
    expect(of(at(80), at(80.5))).toEqual([])
  })
})

import { describe, expect, it } from 'vitest'
import { designOf } from '../../src/design/index.js'
import { jobWith, numbersJob } from './jobs.js'

const idOf = (layers: string, rest = '') => {
  const design = designOf(jobWith(`  layers: ${layers}`, rest))
  return design.id(new Int32Array(design.places.length))
}

describe('the id of a stack', () => {
  it('is 12 hex digits that depend on the stack alone, not on how the job wrote it', () => {
    const plain = idOf('[{ material: AlGaAs, x: 0.3, width: 8 ML }, { material: GaAs, width: 9 ML }]')
    expect(plain).toMatch(/^[0-9a-f]{12}$/)
    const split =
      '[{ id: p, material: AlGaAs, x: 0.3, width: 3 ML }, { id: q, material: AlGaAs, x: 0.3, width: 5..6 ML }, { material: GaAs, width: 9 ML }]'
    expect(idOf(split)).toBe(plain)
    expect(
      idOf('[{ id: z, material: AlGaAs, x: { pick: [0.3, 0.4] }, width: 8..9 ML }, { material: GaAs, width: 9 ML }]'),
    ).toBe(plain)
  })

  it('changes with the material, x, the count and the order of the layers', () => {
    const ids = [
      '[{ material: AlGaAs, x: 0.3, width: 8 ML }, { material: GaAs, width: 9 ML }]',
      '[{ material: GaAs, width: 9 ML }, { material: AlGaAs, x: 0.3, width: 8 ML }]',
      '[{ material: AlGaAs, x: 0.31, width: 8 ML }, { material: GaAs, width: 9 ML }]',
      '[{ material: AlGaAs, x: 0.3, width: 9 ML }, { material: GaAs, width: 9 ML }]',
      '[{ material: InGaAs, x: 0.3, width: 8 ML }, { material: GaAs, width: 9 ML }]',
    ].map((layers) => idOf(layers))
    expect(new Set(ids).size).toBe(ids.length)
  })

  it('is one for numbers from a range, fixed, and under a name', () => {
    const id = (layer: string, rest = '') => {
      const design = designOf(numbersJob(`    - ${layer}`, rest))
      return design.id(new Int32Array(design.places.length))
    }
    const fixed = id('{ potential: 0.3 eV, mass: 0.09, width: 2 nm }')
    expect(id('{ potential: 0.3 eV, mass: 0.09, width: 2..3 nm }')).toBe(fixed)
    expect(id('{ material: wall, width: 2 nm }', 'media: { wall: { potential: 300 meV, mass: 0.09 } }')).toBe(fixed)
    expect(id('{ potential: 0.3 eV, mass: 0.09, width: 2.1 nm }')).not.toBe(fixed)
  })
})

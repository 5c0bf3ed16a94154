import { describe, expect, test } from 'vitest'
import { bandParameters, MaterialError, materialNames, needsX } from '../../src/media/index.js'

describe('bandParameters', () => {
  test('an alloy runs into its binaries at both ends', () => {
    const ends: [string, number, string][] = [
      ['AlGaAs', 0, 'GaAs'],
      ['InGaAs', 1, 'InAs'],
      ['InAlAs', 0, 'AlAs'],
      ['AlGaSb', 1, 'AlSb'],
    ]
    for (const [alloy, x, binary] of ends) {
      const { edgeXEv: _, ...expected } = bandParameters(binary, null, 77)
      expect(bandParameters(alloy, x, 77)).toMatchObject(expected)
    }
  })

  test('Varshni acts on the binaries before the bowing, so an alloy follows the mean of their shifts', () => {
    const shift = (name: string, x: number | null) =>
      bandParameters(name, x, 300).gapEv - bandParameters(name, x, 0).gapEv
    expect(shift('InGaAs', 0.25)).toBeCloseTo(0.75 * shift('GaAs', null) + 0.25 * shift('InAs', null), 14)
  })

  test('positive bowing lies below the line between the ends', () => {
    const mean = (bandParameters('InAs', null, 300).gapEv + bandParameters('GaAs', null, 300).gapEv) / 2
    expect(bandParameters('InGaAs', 0.5, 300).gapEv).toBeCloseTo(mean - 0.477 / 4, 14)
  })

  test('mass, lattice and elastic constants are those of 300 K at any temperature', () => {
    for (const name of materialNames) {
      const x = needsX(name) ? 0.3 : null
      const { massRel, latticeNm, c11, c12 } = bandParameters(name, x, 300)
      expect(bandParameters(name, x, 4)).toMatchObject({ massRel, latticeNm, c11, c12 })
    }
  })

  test('an unknown name is refused with the nearest known ones', () => {
    expect(() => bandParameters('GaAlAs', 0.3, 300)).toThrow('Unknown material "GaAlAs". Did you mean AlGaAs')
    try {
      bandParameters('algaas', 0.3, 300)
      expect.unreachable()
    } catch (error) {
      expect(error).toBeInstanceOf(MaterialError)
      expect((error as MaterialError).nearest[0]).toBe('AlGaAs')
    }
  })

  test('a name like nothing known is refused with all of them', () => {
    expect(() => bandParameters('unobtainium', null, 300)).toThrow('Known: GaAs, AlAs, InAs')
  })

  test.each([
    ['AlGaAs', null, 300, 'AlGaAs needs a composition'],
    ['GaAs', 0.3, 300, 'GaAs has a fixed composition, but x = 0.3'],
    ['AlGaAs', 1.2, 300, 'x = 1.2 of AlGaAs is outside 0..1'],
    ['AlGaAs', Number.NaN, 300, 'x = NaN of AlGaAs'],
    ['GaAs', null, -4, 'Temperature of GaAs is -4 K'],
    ['GaAs', null, Number.POSITIVE_INFINITY, 'Temperature of GaAs is Infinity K'],
  ])('%s, x %s, %d K: %s', (name, x, temperatureK, message) => {
    expect(() => bandParameters(name, x, temperatureK)).toThrow(message)
  })
})

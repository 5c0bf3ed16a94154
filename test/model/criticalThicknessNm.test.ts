import { describe, expect, test } from 'vitest'
import { bandParameters } from '../../src/media/index.js'
import { criticalThicknessNm } from '../../src/model/index.js'

const gaAs = bandParameters('GaAs', null, 300).latticeNm

describe('criticalThicknessNm', () => {
  // Matthews and Blakeslee with these elastic numbers; buried InGaAs wells on GaAs follow it for 0.1 < x <= 1 (APL 1987).
  test.each([
    [0.1, 33.9, 14.2],
    [0.2, 14.3, 5.7],
    [0.3, 8.4, 3.2],
  ])('InGaAs x = %f on GaAs: %f nm buried, %f nm uncapped', (x, buried, uncapped) => {
    const layer = bandParameters('InGaAs', x, 300)
    expect(criticalThicknessNm(layer, gaAs, 'buried')).toBeCloseTo(buried, 1)
    expect(criticalThicknessNm(layer, gaAs, 'uncapped')).toBeCloseTo(uncapped, 1)
    expect(criticalThicknessNm(layer, gaAs, 'superlattice')).toBeGreaterThan(2 * buried)
  })

  test('solves its own equation', () => {
    const layer = bandParameters('InGaAs', 0.2, 300)
    const h = criticalThicknessNm(layer, gaAs, 'buried')
    const b = layer.latticeNm / Math.SQRT2
    const nu = layer.c12 / (layer.c11 + layer.c12)
    const f = (layer.latticeNm - gaAs) / gaAs
    expect(((b * (1 - nu / 4)) / (4 * Math.PI * f * (1 + nu) * 0.5)) * (Math.log(h / b) + 1)).toBeCloseTo(h, 10)
  })

  test('without misfit no thickness is critical, with too much every one is', () => {
    const layer = bandParameters('GaAs', null, 300)
    expect(criticalThicknessNm(layer, gaAs, 'buried')).toBe(Number.POSITIVE_INFINITY)
    expect(criticalThicknessNm(bandParameters('InSb', null, 300), gaAs, 'uncapped')).toBe(0)
  })

  test('refuses numbers that are no crystal’s', () => {
    expect(() => criticalThicknessNm({ latticeNm: 0, c11: 1, c12: 1 }, gaAs, 'buried')).toThrow('lattice 0 nm')
  })
})

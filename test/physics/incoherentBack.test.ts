import { describe, expect, test } from 'vitest'
import { type LightStack, spectrum } from '../../src/index.js'

const air = { index: 1 }
const glass = { index: 1.52 }
const plate: LightStack = { kind: 'light', entry: air, layers: [], exit: glass, back: { exit: air } }

describe('a thick plate', () => {
  test('that is bare has T = 2 n/(n² + 1), at any wavelength and from either side', () => {
    for (const from of ['entry', 'exit'] as const) {
      const { T, R, fluxError } = spectrum(plate, [400, 633, 1550], { from })
      for (const t of T) expect(t).toBeCloseTo(0.918318028032866, 14)
      for (const r of R) expect(r).toBeCloseTo(1 - 0.918318028032866, 14)
      expect(fluxError).toBeLessThan(1e-14)
    }
  })

  test('with a quarter wave of 1.38 on one side has what Smith’s formulas give', () => {
    const coated = { ...plate, layers: [{ index: 1.38, widthNm: 550 / 4 / 1.38 }] }
    const { T, R } = spectrum(coated, [550])
    expect(T[0]).toBeCloseTo(0.945863251375257, 13)
    expect(R[0]).toBeCloseTo(0.054136748624743, 13)
  })

  test('with an absorbing film balances, passes as much from either side, and reflects differently', () => {
    const metal: LightStack = {
      ...{ ...plate, angleDeg: 40, polarisation: 'p' },
      layers: [
        { index: 0.06, extinction: 4.2, widthNm: 12 },
        { index: 1.46, widthNm: 80 },
      ],
    }
    const front = spectrum(metal, [500, 700])
    const rear = spectrum(metal, [500, 700], { from: 'exit' })
    for (const { fluxError, A } of [front, rear]) {
      expect(fluxError).toBeLessThan(1e-13)
      for (const a of A) expect(a).toBeGreaterThan(0.005)
    }
    front.T.forEach((t, i) => void expect(t).toBeCloseTo(rear.T[i], 13))
    expect(Math.abs(front.R[0] - rear.R[0])).toBeGreaterThan(1e-3)
  })

  test('beyond the critical angle into the plate passes nothing', () => {
    const prism: LightStack = {
      kind: 'light',
      entry: { index: 2 },
      layers: [],
      exit: { index: 1.3 },
      angleDeg: 60,
      back: { exit: air },
    }
    const { T, R, log10T } = spectrum(prism, [633])
    expect([T[0], log10T[0]]).toEqual([0, Number.NEGATIVE_INFINITY])
    expect(R[0]).toBeCloseTo(1, 14)
  })
})

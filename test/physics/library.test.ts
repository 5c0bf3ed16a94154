import { describe, expect, test } from 'vitest'
import { type ElectronStack, type LightStack, spectrum } from '../../src/index.js'
import { electronCases, opticalCases, type ReferencePoint, tolerance } from './reference.js'

/** T, R and log10 T of one point within what doubles can keep. */
function holds(
  stack: ElectronStack | LightStack,
  at: number,
  point: ReferencePoint,
  incidence: 'left' | 'right',
): void {
  const { T, R, log10T, fluxError } = spectrum(stack, [at], { from: incidence === 'left' ? 'entry' : 'exit' })
  const [expectedT, expectedR] = [Number(point.T), Number(point.R)]
  const where = JSON.stringify({ at, k_par: point.k_par, angle: point.angle, pol: point.pol })
  expect(fluxError, where).toBeLessThan(1e-12)
  if (expectedT > 1e-300) expect(Math.abs(T[0] / expectedT - 1), where).toBeLessThan(tolerance(point.rel_sens_T))
  // A reflection of nothing (a Brewster angle) is held against what is left of 1.
  const looseR = tolerance(point.rel_sens_R) * expectedR + 1e-15
  expect(Math.abs(R[0] - expectedR), where).toBeLessThan(looseR)
  if (point.log10_T === null) expect(log10T[0], where).toBe(Number.NEGATIVE_INFINITY)
  else {
    const loose = tolerance(point.rel_sens_T) * Math.LOG10E + 1e-15 * Math.abs(log10T[0])
    expect(Math.abs(log10T[0] - Number(point.log10_T)), where).toBeLessThan(loose)
  }
}

describe('spectrum against the reference in 60 digits', () => {
  test.each(electronCases)('$id $title', ({ left, layers, right, points, incidence }) => {
    const region = ({ V, m, alpha }: typeof left) => ({ potentialEv: V, massRel: m, alphaPerEv: alpha })
    for (const point of points) {
      const stack: ElectronStack = {
        kind: 'electron',
        entry: region(left),
        layers: layers.map((layer) => ({ ...region(layer), widthNm: layer.d })),
        exit: right.hard_wall ? 'hard wall' : region(right),
        inPlaneKPerNm: point.k_par,
      }
      holds(stack, point.E, point, incidence)
    }
  })

  test.each(opticalCases)('$id $title', ({ left, layers, right, points, incidence }) => {
    const medium = ({ n, k }: typeof left) => ({ index: n, extinction: k })
    for (const point of points) {
      const stack: LightStack = {
        kind: 'light',
        entry: medium(left),
        layers: layers.map((layer) => ({ ...medium(layer), widthNm: layer.d })),
        exit: medium(right),
        angleDeg: point.angle,
        polarisation: point.pol,
      }
      holds(stack, point.wavelength, point, incidence)
    }
  })
})

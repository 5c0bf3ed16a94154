import { describe, expect, test } from 'vitest'
import type { Quantity } from '../../src/job/index.js'
import { buildSystem, type LightSituation, type MediumChoice } from '../../src/model/index.js'
import { ShareGradient } from '../../src/target/shareGradient.js'

/** Slopes of T, R and A by widths and indices, and in energy, against differences of the values themselves. */

const index = (n: number, k = 0): MediumChoice => ({ kind: 'index', name: null, index: n, extinction: k })
const energies = Float64Array.from({ length: 7 }, (_, i) => 1.6 + 0.21 * i)

function situation(changes: Partial<LightSituation>): LightSituation {
  const leads = { entry: index(1), exit: index(1.52), back: null } as const
  return { kind: 'light', ...leads, angleDeg: 0, polarisation: 's', referenceNm: 550, rangeNm: null, ...changes }
}

const cases: Record<string, LightSituation> = {
  'a coating': situation({}),
  's at 50 degrees': situation({ angleDeg: 50 }),
  'p at 50 degrees': situation({ angleDeg: 50, polarisation: 'p' }),
  'the mean at 50 degrees': situation({ angleDeg: 50, polarisation: 'mean' }),
  'a coated plate': situation({ back: index(1) }),
  'the mean on a plate': situation({ back: index(1), angleDeg: 35, polarisation: 'mean' }),
  'a gap beyond the critical angle': situation({ entry: index(1.52), angleDeg: 60, polarisation: 'p' }),
  'an absorbing exit': situation({ exit: index(0.2, 3.4) }),
}

const widths = [80.5, 120.25, 18.5, 95, 0]
const lossless = [index(2.2), index(1.3), index(1.8), index(2.2), index(1.4)]
const metallic = [index(2.2), index(1.3, 0.01), index(0.07, 3.6), index(2.2), index(1.4)]

describe('the slopes of a share', () => {
  for (const [name, at] of Object.entries(cases)) {
    for (const [what, media] of [
      ['lossless', lossless],
      ['with a metal', metallic],
    ] as const) {
      for (const quantity of ['T', 'R', 'A'] as const) {
        if (quantity === 'A' && what === 'lossless') continue
        test(`${quantity} of ${name}, ${what}`, () => check(at, media, quantity))
      }
    }
  }
})

function check(at: LightSituation, media: readonly MediumChoice[], quantity: Quantity): void {
  const system = (change: { width?: [number, number]; index?: [number, number] } = {}) =>
    buildSystem(
      at,
      media.map((choice, j) => ({
        choice,
        widthNm: widths[j] + (change.width?.[0] === j ? change.width[1] : 0),
        slices: 1,
        biased: false,
        ...(change.index?.[0] === j ? { indexShift: change.index[1] } : {}),
      })),
    )
  const valuesOf = (of: ReturnType<typeof system>, where = energies) =>
    new ShareGradient(of, quantity).values(where).slice()
  const share = new ShareGradient(system(), quantity)
  const { T, gradient } = share.gradient(energies)
  const values = valuesOf(system())
  T.forEach((value, e) => {
    expect(Math.abs(value - values[e])).toBeLessThan(1e-12)
  })
  expect(share.layerParameters).toBe(2 * media.length)
  media.forEach((_, j) => {
    // A width of 0 has nothing below.
    const step = 1e-2
    const wide =
      widths[j] === 0
        ? forward(step, (by) => valuesOf(system({ width: [j, by] })))
        : central(step, (by) => valuesOf(system({ width: [j, by] })))
    const other = central(1e-4, (by) => valuesOf(system({ index: [j, by] })))
    for (let e = 0; e < energies.length; e++) {
      expect(Math.abs(gradient[e * 10 + 2 * j] - wide[e]), `width ${j}`).toBeLessThan(widths[j] === 0 ? 1e-8 : 1e-10)
      expect(Math.abs(gradient[e * 10 + 2 * j + 1] - other[e]), `index ${j}`).toBeLessThan(1e-9)
    }
  })
  const slope = share.slope(energies)
  const inEnergy = central(1e-4, (by) =>
    valuesOf(
      system(),
      energies.map((energy) => energy + by),
    ),
  )
  slope.forEach((value, e) => {
    expect(Math.abs(value - inEnergy[e])).toBeLessThan(1e-6)
  })
}

/** Of fourth order. */
function central(h: number, f: (by: number) => Float64Array): Float64Array {
  const [a, b, c, d] = [-2, -1, 1, 2].map((n) => f(n * h))
  return a.map((_, i) => (a[i] - 8 * b[i] + 8 * c[i] - d[i]) / (12 * h))
}

function forward(h: number, f: (by: number) => Float64Array): Float64Array {
  const values = [0, 1, 2, 3, 4].map((n) => f(n * h))
  return values[0].map(
    (_, i) =>
      (-25 * values[0][i] + 48 * values[1][i] - 36 * values[2][i] + 16 * values[3][i] - 3 * values[4][i]) / (12 * h),
  )
}

import { describe, expect, test } from 'vitest'
import { type ElectronStack, spectrum } from '../../src/index.js'
import { type Job, parseLayers } from '../../src/job/index.js'
import { stackOf } from '../../src/model/index.js'

// The stacks of a worked example, evaluated there from the published material numbers in 30-digit arithmetic.
const job = {
  kind: 'electron',
  conditions: [{ name: '', temperatureK: 77, biasV: 0, inPlaneEv: 0, angleDeg: 0, polarisation: 's' }],
  stack: {
    entry: { kind: 'material', material: 'GaAs', x: null },
    exit: { kind: 'material', material: 'GaAs', x: null },
    massModel: 'two-band',
    strainedTo: null,
    biasOver: null,
  },
  growth: { startsAt: 'exit' },
} as unknown as Job

function stack(x: number, outer: number, well: number): ElectronStack {
  const text = `material,x,ml\nAlGaAs,${x},${outer}\nGaAs,,${well}\nAlGaAs,${x},${outer}\n`
  return stackOf(job, parseLayers(text, 'layers.csv')) as ElectronStack
}

function transmission(of: ElectronStack, energyEv: number): number {
  return spectrum(of, [energyEv]).T[0]
}

/** Where T passes half on the way from a peak of height one to `far`. */
function half(of: ElectronStack, peakEv: number, far: number): number {
  let [above, below] = [peakEv, far]
  for (let i = 0; i < 60; i++) {
    const middle = (above + below) / 2
    if (transmission(of, middle) > 0.5) above = middle
    else below = middle
  }
  return (above + below) / 2
}

function near(actual: number, expected: number, relative: number): void {
  expect(Math.abs(actual / expected - 1)).toBeLessThanOrEqual(relative)
}

describe('double barriers of AlGaAs in GaAs at 77 K, two-band, strained to GaAs', () => {
  test.each([
    [0.35, 12, 18, 79.86983015, 1.448380097, 0.0006202906946, 0.005054526586],
    [0.25, 15, 16, 83.13125776, 1.693509374, 0.0004981957069, 0.01420363109],
    [0.35, 10, 17, 85.02758516, 3.675545204, 0.002321621087, 0.01298493241],
    [0.25, 10, 20, 64.0763401, 4.919051298, 0.234001637, 0.2225250545],
  ])('x = %f, %d / %d ML: peak at %f meV, %f meV wide; greatest T %f in 5..60, %f in 110..200', (...numbers) => {
    const [x, outer, well, peakMev, fwhmMev, low, high] = numbers
    const of = stack(x, outer, well)
    const peakEv = peakMev * 1e-3
    expect(transmission(of, peakEv)).toBeGreaterThan(1 - 1e-7)
    near((half(of, peakEv, peakEv + 0.02) - half(of, peakEv, peakEv - 0.02)) * 1e3, fwhmMev, 1e-7)
    const greatest = (a: number, b: number) =>
      Math.max(
        ...spectrum(
          of,
          Float64Array.from({ length: 2001 }, (_, i) => (a + ((b - a) * i) / 2000) * 1e-3),
        ).T,
      )
    near(greatest(5, 60), low, 1e-7)
    near(greatest(110, 200), high, 1e-7)
  })

  test('x = 0.35, 20 / 24 / 20 ML: peak at 55.85363191 meV, 0.02418600649 meV wide', () => {
    const of = stack(0.35, 20, 24)
    expect(transmission(of, 0.05585363191)).toBeGreaterThan(1 - 1e-6)
    near((half(of, 0.05585363191, 0.06) - half(of, 0.05585363191, 0.05)) * 1e3, 0.02418600649, 1e-7)
  })
})

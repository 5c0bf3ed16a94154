import { Decimal } from 'decimal.js'
import { describe, expect, it } from 'vitest'
import { kernelChecksum, spectrumInto } from '../../src/wave/index.js'
import { decimalT } from './decimalWave.js'
import { exact } from './exact.js'
import { poisoned } from './regionSystem.js'
import { seeded } from './seeded.js'

/** A stack of so many layers with its table at one point, and T in enough digits for the growth on the way. */
function randomStack(random: () => number, layers: number, widest: number) {
  const count = layers + 2
  const table = { count, points: 1, q: new Float64Array(count), mu: new Float64Array(count) }
  const width = new Float64Array(layers)
  let growth = 0
  for (let m = 0; m < count; m++) {
    const isLead = m === 0 || m === count - 1
    table.q[m] = isLead ? 0.02 + random() : 1.5 * random() - 0.75
    table.mu[m] = 0.03 + 0.15 * random()
    if (isLead) continue
    width[m - 1] = widest * random()
    if (table.q[m] < 0) growth += Math.sqrt(-table.q[m]) * width[m - 1]
  }
  const medium = Int32Array.from(width, (_, j) => j + 1)
  return { table, stack: { entry: 0, exit: count - 1, medium, width }, growth }
}

describe('T of random stacks against decimal arithmetic', () => {
  it.each([
    [1, 20, 25],
    [7, 6, 25],
    [40, 4, 6],
    [200, 3, 2],
  ])('%d layers up to %d nm', (layers, widest, trials) => {
    const random = seeded(layers)
    for (let trial = 0; trial < trials; trial++) {
      const { table, stack, growth } = randomStack(random, layers, widest)
      const D = Decimal.clone({ precision: Math.ceil(50 + growth) })
      const lead = (m: number) => ({ q: exact(table.q[m], D), mu: exact(table.mu[m], D) })
      const exactT = (h: number) =>
        decimalT(
          lead(0),
          [...stack.width].map((w, j) => ({ ...lead(j + 1), w: exact(w, D).times(1 + h) })),
          lead(layers + 1),
          D,
        )
      const T = exactT(0)
      const moved = exactT(1e-15).div(T).minus(1).abs().toNumber()
      const out = { T: poisoned(1), R: poisoned(1), log10T: poisoned(1) }
      spectrumInto(table, stack, out)
      // As for the reference: 1e-12, or a hundred times what the last bit of the input does.
      const close = Math.max(1e-12, 100 * moved)
      expect(new D(out.T[0]).div(T).minus(1).abs().toNumber()).toBeLessThan(close)
      expect(Math.abs(out.log10T[0] - T.log(10).toNumber())).toBeLessThan(close + 1e-14)
    }
  })

  it('a thousand layers, a million points of them, stay within 1e-11 of T + R = 1', () => {
    const random = seeded(77)
    const { stack } = randomStack(random, 1000, 3)
    const points = 1000
    const count = 1002
    const q = Float64Array.from({ length: count * points }, () => 0.05 + random())
    const table = { count, points, q, mu: q.map(() => 0.05 + 0.1 * random()) }
    expect(spectrumInto(table, stack, { T: poisoned(points), R: poisoned(points) })).toBeLessThan(1e-11)
  })
})

describe('the bits of the kernel', () => {
  it('are those of every other machine and Node version', () => {
    // Frozen: changes only with the arithmetic itself, and then journals of both kinds must not be mixed.
    expect(kernelChecksum()).toBe('c8fd25b4')
  })
})

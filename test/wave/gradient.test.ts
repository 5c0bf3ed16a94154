import { Decimal } from 'decimal.js'
import { describe, expect, it } from 'vitest'
import { gradientInto, parameterGradient, slopeInto, spectrumInto, type WaveSystem } from '../../src/wave/index.js'
import { decimalT } from './decimalWave.js'
import { exact } from './exact.js'
import { poisoned, type Region, regionSystem, slopeOf, tableOf } from './regionSystem.js'
import { seeded } from './seeded.js'

const D = Decimal.clone({ precision: 110 })
const tiny = new D('1e-30')

type Layers = (Region & { d: number })[]

function randomLayers(random: () => number, count: number): Layers {
  return Array.from({ length: count }, (_, j) => ({
    d: 0.5 + 5 * random(),
    V: j % 2 === 0 ? 0.15 + 0.3 * random() : 0.05 * random(),
    m: 0.04 + 0.08 * random(),
    alpha: random() < 0.5 ? 0 : 0.8 * random(),
  }))
}

/** d T/d(entry `which` of layer j: q, mu or w), by a central difference in 110 digits. */
function decimalDerivative(system: WaveSystem, energy: number, j: number, which: 'q' | 'mu' | 'w'): Decimal {
  const { media, stack } = system
  const table = tableOf(media, [energy])
  const at = (m: number) => ({ q: exact(table.q[m], D), mu: exact(table.mu[m], D) })
  const T = (h: Decimal) => {
    const layers = [...stack.medium].map((m, i) => ({ ...at(m), w: exact(stack.width[i], D) }))
    layers[j][which] = layers[j][which].plus(h)
    return decimalT(at(stack.entry), layers, at(stack.exit), D)
  }
  return T(tiny).minus(T(tiny.neg())).div(tiny.times(2))
}

function gradientAt(system: WaveSystem, energy: number) {
  const layers = system.stack.medium.length
  const out = { T: poisoned(1), dTdWidth: poisoned(layers), dTdQ: poisoned(layers), dTdMu: poisoned(layers) }
  gradientInto(tableOf(system.media, [energy]), system.stack, out)
  return out
}

function expectDerivatives(system: WaveSystem, energy: number, relative: number): void {
  const out = gradientAt(system, energy)
  for (const [which, found] of [
    ['w', out.dTdWidth],
    ['q', out.dTdQ],
    ['mu', out.dTdMu],
  ] as const) {
    const truth = found.map((_, j) => decimalDerivative(system, energy, j, which).toNumber())
    const scale = Math.max(...truth.map(Math.abs))
    for (let j = 0; j < truth.length; j++) {
      expect(Math.abs(found[j] - truth[j]), `d/d${which} of layer ${j} at ${energy}`).toBeLessThan(relative * scale)
    }
  }
}

describe('the gradient of T by the widths, q and mu of all layers', () => {
  it('agrees with differences in 110 digits to 1e-11 of the largest, for random stacks', () => {
    const random = seeded(3)
    for (let trial = 0; trial < 12; trial++) {
      const layers = randomLayers(random, 1 + Math.floor(7 * random()))
      const system = regionSystem({ V: 0, m: 0.067 }, layers, { V: -0.03, m: 0.05 })
      expectDerivatives(system, 0.01 + 0.5 * random(), 1e-11)
    }
  })

  it('is right relative to T in a barrier that lets 1e-250 through, and in one of 1e-305', () => {
    for (const d of [475, 585]) {
      const layers = [
        { d, V: 0.3, m: 0.067 },
        { d: 4, V: 0, m: 0.067 },
        { d: 5, V: 0.25, m: 0.09 },
      ]
      const system = regionSystem({ V: 0, m: 0.067 }, layers, { V: 0, m: 0.067 })
      const out = gradientAt(system, 0.1)
      expect(out.T[0]).toBeLessThan(1e-240)
      expect(out.T[0]).toBeGreaterThan(1e-307)
      // More digits, since the wave grows by 1e153 on its way.
      const wide = Decimal.clone({ precision: 420 })
      const table = tableOf(system.media, [0.1])
      const at = (m: number) => ({ q: exact(table.q[m], wide), mu: exact(table.mu[m], wide) })
      const T = (h: number) => {
        const stack = layers.map((l, i) => ({ ...at(i + 1), w: exact(l.d, wide).plus(i === 0 ? h : 0) }))
        return decimalT(at(0), stack, at(4), wide)
      }
      const truth = T(1e-20).minus(T(-1e-20)).div(2e-20).toNumber()
      expect(Math.abs(out.dTdWidth[0] / truth - 1)).toBeLessThan(1e-11)
    }
  })

  it('crosses a barrier that must be divided by a power of two', () => {
    const thick = { d: 460, V: 0.3, m: 0.067 }
    const system = regionSystem({ V: 0, m: 0.067 }, [{ ...thick, d: 3 }, thick, { ...thick, d: 2 }], { V: 0, m: 0.067 })
    // kappa w = 0.70 · 460 > 300 at 0.02 eV, yet at 0.2999 eV in the same block it is 6: T must not see its neighbour.
    const energies = [0.02, 0.2999, 0.29999999, 0.3]
    const layers = 3
    const out = { T: poisoned(4), dTdWidth: poisoned(12), dTdQ: poisoned(12), dTdMu: poisoned(12) }
    gradientInto(tableOf(system.media, energies), system.stack, out)
    for (let e = 1; e < energies.length; e++) {
      const alone = gradientAt(system, energies[e])
      expect(out.T[e]).toBe(alone.T[0])
      expect([...out.dTdWidth.slice(e * layers, (e + 1) * layers)]).toEqual([...alone.dTdWidth])
      expect([...out.dTdQ.slice(e * layers, (e + 1) * layers)]).toEqual([...alone.dTdQ])
      expect([...out.dTdMu.slice(e * layers, (e + 1) * layers)]).toEqual([...alone.dTdMu])
      if (energies[e] !== 0.3) expectDerivatives(system, energies[e], 1e-11)
    }
  })

  it('is continuous through the band edge of a layer, on it and one unit in the last place beside it', () => {
    const edge = 0.25
    const ulp = 2.220446049250313e-16 / 8
    const layers = [
      { d: 3, V: 0.4, m: 0.08 },
      { d: 5, V: edge, m: 0.067 },
      { d: 3, V: 0.4, m: 0.08 },
    ]
    const system = regionSystem({ V: 0, m: 0.067 }, layers, { V: 0, m: 0.067 })
    for (const energy of [edge - 1e-6, edge - ulp, edge, edge + ulp, edge + 1e-6]) {
      if (energy !== edge) expectDerivatives(system, energy, 1e-11)
    }
    const on = gradientAt(system, edge)
    const beside = gradientAt(system, edge + ulp)
    for (let j = 0; j < 3; j++) {
      expect(Math.abs(on.dTdQ[j] / beside.dTdQ[j] - 1)).toBeLessThan(1e-12)
      expect(Math.abs(on.dTdWidth[j] / beside.dTdWidth[j] - 1)).toBeLessThan(1e-12)
    }
  })

  it('has T equal to that of spectrumInto', () => {
    const system = regionSystem({ V: 0, m: 0.067 }, randomLayers(seeded(8), 9), { V: 0, m: 0.067 })
    const energies = Array.from({ length: 300 }, (_, e) => 0.01 + e * 1e-3)
    const spectrum = { T: poisoned(300), R: poisoned(300) }
    spectrumInto(tableOf(system.media, energies), system.stack, spectrum)
    const out = { T: poisoned(300), dTdWidth: poisoned(2700), dTdQ: poisoned(2700), dTdMu: poisoned(2700) }
    gradientInto(tableOf(system.media, energies), system.stack, out)
    for (let e = 0; e < 300; e++) expect(Math.abs(out.T[e] / spectrum.T[e] - 1)).toBeLessThan(1e-14)
    expect([...out.dTdWidth, ...out.dTdQ, ...out.dTdMu].every(Number.isFinite)).toBe(true)
  })

  it('is zero behind a closed exit', () => {
    const system = regionSystem({ V: 0, m: 0.067 }, [{ d: 3, V: 0.3, m: 0.07 }], { V: 0.5, m: 0.067 })
    const out = gradientAt(system, 0.1)
    for (const row of [out.T, out.dTdWidth, out.dTdQ, out.dTdMu]) expect(Math.abs(row[0])).toBe(0)
  })

  it('gives dT/d(width, potential, mass, alpha) through the media', () => {
    const random = seeded(21)
    const layers = randomLayers(random, 5)
    const system = regionSystem({ V: 0, m: 0.067 }, layers, { V: 0, m: 0.067 })
    const energies = Float64Array.of(0.05, 0.12, 0.33)
    const out = { T: poisoned(3), gradient: poisoned(3 * 5 * 4) }
    parameterGradient(system, energies, out)
    const T = (e: number, j: number, key: 'd' | 'V' | 'm' | 'alpha', h: number) => {
      const changed = layers.map((l, i) => (i === j ? { ...l, [key]: (l[key] ?? 0) + h } : l))
      const other = regionSystem({ V: 0, m: 0.067 }, changed, { V: 0, m: 0.067 })
      const spectrum = { T: poisoned(1), R: poisoned(1) }
      spectrumInto(tableOf(other.media, [energies[e]]), other.stack, spectrum)
      return spectrum.T[0]
    }
    for (let e = 0; e < 3; e++) {
      for (let j = 0; j < 5; j++) {
        ;(['d', 'V', 'm', 'alpha'] as const).forEach((key, i) => {
          const h = 1e-4 * (key === 'd' ? 1 : 0.05)
          const wide = (T(e, j, key, h) - T(e, j, key, -h)) / (2 * h)
          const narrow = (T(e, j, key, h / 2) - T(e, j, key, -h / 2)) / h
          const truth = (4 * narrow - wide) / 3
          const found = out.gradient[(e * 5 + j) * 4 + i]
          // The differences of doubles themselves: rounding 1e-16 T/h, and h to the fourth.
          expect(Math.abs(found - truth)).toBeLessThan(1e-6 * Math.abs(truth) + 1e-10 * out.T[e])
        })
      }
    }
  })
})

describe('dT/dE', () => {
  it('agrees with differences in 110 digits for random stacks, two-band masses and leads that differ', () => {
    const random = seeded(5)
    const entry = { V: 0, m: 0.067, alpha: 0.6 }
    const exit = { V: -0.05, m: 0.08, alpha: 0.4 }
    for (let trial = 0; trial < 10; trial++) {
      const layers = randomLayers(random, 1 + Math.floor(7 * random()))
      const { media, stack } = regionSystem(entry, layers, exit, 0.1 * random())
      const energy = 0.05 + 0.4 * random()
      const out = { T: poisoned(1), dTdE: poisoned(1) }
      const table = tableOf(media, [energy])
      const slope = slopeOf(media, [energy])
      slopeInto(table, slope, stack, out)
      const at = (m: number, h: Decimal) => ({
        q: exact(table.q[m], D).plus(exact(slope.q[m], D).times(h)),
        mu: exact(table.mu[m], D).plus(exact(slope.mu[m], D).times(h)),
      })
      const T = (h: Decimal) =>
        decimalT(
          at(0, h),
          layers.map((l, i) => ({ ...at(i + 1, h), w: exact(l.d, D) })),
          at(stack.exit, h),
          D,
        )
      const truth = T(tiny).minus(T(tiny.neg())).div(tiny.times(2)).toNumber()
      expect(Math.abs(out.dTdE[0] - truth)).toBeLessThan(1e-10 * Math.abs(truth) + 1e-11 * out.T[0])
      expect(Math.abs(out.T[0] / T(new D(0)).toNumber() - 1)).toBeLessThan(1e-12)
    }
  })

  it('survives barriers of any thickness, in steps of a whole spectrum', () => {
    const system = regionSystem({ V: 0, m: 0.067 }, [{ d: 1000, V: 0.3, m: 0.067 }], { V: 0, m: 0.067 })
    const energies = [0.01, 0.29, 0.2999999, 0.3, 0.31]
    const out = { T: poisoned(5), dTdE: poisoned(5) }
    slopeInto(tableOf(system.media, energies), slopeOf(system.media, energies), system.stack, out)
    expect(out.T[0]).toBe(0)
    expect(out.dTdE[0]).toBe(0)
    expect([...out.dTdE].every(Number.isFinite)).toBe(true)
    expect(out.dTdE[2]).toBeGreaterThan(0)
  })
})

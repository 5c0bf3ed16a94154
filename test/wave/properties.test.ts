import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { gradientInto, hardWall, spectrumInto, type WaveStack } from '../../src/wave/index.js'
import { lightTable } from './lightSystem.js'
import { poisoned, type Region, regionSystem, tableOf } from './regionSystem.js'

const number = (min: number, max: number) => fc.double({ min, max, noNaN: true, noDefaultInfinity: true })
const region = fc.record({ V: number(0, 0.6), m: number(0.03, 0.2), alpha: number(0, 0.8) })
const layer = fc.record({ V: number(0, 0.6), m: number(0.03, 0.2), alpha: number(0, 0.8), d: number(0, 8) })
const stack = fc.record({
  entry: fc.record({ V: number(-0.1, 0), m: number(0.03, 0.2), alpha: number(0, 0.8) }),
  layers: fc.array(layer, { maxLength: 15 }),
  exit: fc.record({ V: number(-0.1, 0), m: number(0.03, 0.2), alpha: number(0, 0.8) }),
  energy: number(0.01, 0.8),
})
type Layers = (Region & { d: number })[]

function spectrum(entry: Region, layers: Layers, exit: Region, energy: number, from: 'entry' | 'exit' = 'entry') {
  const system = regionSystem(entry, layers, exit)
  const out = { T: poisoned(1), R: poisoned(1), log10T: poisoned(1) }
  const fluxError = spectrumInto(tableOf(system.media, [energy]), system.stack, out, from)
  return { T: out.T[0], R: out.R[0], log10T: out.log10T[0], fluxError }
}

// Rounding of a layer is about 1e-16 times what it turns the wave by; a resonance enlarges it by its sharpness. Both are
// bounded by comparing log10 T absolutely and leaving stacks out whose T the last bit of the energy moves.
function expectSame(
  s: { entry: Region; layers: Layers; exit: Region; energy: number },
  other: { log10T: number },
): void {
  const here = spectrum(s.entry, s.layers, s.exit, s.energy).log10T
  const beside = spectrum(s.entry, s.layers, s.exit, s.energy * (1 + 1e-12)).log10T
  expect(Math.abs(other.log10T - here)).toBeLessThan(1e-11 + 10 * Math.abs(beside - here))
}

describe('what no spectrum may break', () => {
  it('T + R = 1 for every lossless stack, T and R within 0..1', () => {
    fc.assert(
      fc.property(stack, (s) => {
        const { T, R, fluxError } = spectrum(s.entry, s.layers, s.exit, s.energy)
        expect(fluxError).toBeLessThan(1e-12)
        expect(T).toBeGreaterThan(-1e-15)
        expect(T).toBeLessThan(1 + 1e-12)
        expect(R).toBeLessThan(1 + 1e-12)
      }),
    )
  })

  it('T is the same from both sides, and through the mirror image', () => {
    fc.assert(
      fc.property(stack, (s) => {
        expectSame(s, spectrum(s.entry, s.layers, s.exit, s.energy, 'exit'))
        expectSame(s, spectrum(s.exit, [...s.layers].reverse(), s.entry, s.energy))
      }),
    )
  })

  it('a layer cut in two, and layers of no width between, change nothing', () => {
    fc.assert(
      fc.property(stack, number(0, 1), region, (s, cut, other) => {
        const layers = s.layers.flatMap((l) => [
          { ...l, d: l.d * cut },
          { ...other, d: 0 },
          { ...l, d: l.d * (1 - cut) },
        ])
        expectSame(s, spectrum(s.entry, layers, s.exit, s.energy))
      }),
    )
  })

  it('all energies shifted alike change nothing', () => {
    fc.assert(
      fc.property(stack, number(-0.5, 0.5), (s, shift) => {
        const up = <R extends Region>(r: R) => ({ ...r, V: r.V + shift })
        expectSame(s, spectrum(up(s.entry), s.layers.map(up), up(s.exit), s.energy + shift))
      }),
    )
  })

  it('lengths times s, energies over s², alpha times s² change nothing', () => {
    fc.assert(
      fc.property(stack, fc.constantFrom(0.125, 0.3, 3, 16, 1e3, 1e-3), (s, by) => {
        const square = by * by
        const scaled = <R extends Region>(r: R) => ({ ...r, V: r.V / square, alpha: (r.alpha ?? 0) * square })
        const layers = s.layers.map((l) => ({ ...scaled(l), d: l.d * by }))
        expectSame(s, spectrum(scaled(s.entry), layers, scaled(s.exit), s.energy / square))
      }),
    )
  })

  it('every stack and every energy is computed alone: blocks, tails and neighbours change no bit', () => {
    fc.assert(
      fc.property(stack, fc.integer({ min: 1, max: 300 }), (s, points) => {
        const system = regionSystem(s.entry, s.layers, s.exit)
        const energies = Array.from({ length: points }, (_, e) => 0.01 + (0.6 * e) / points)
        const out = { T: poisoned(points), R: poisoned(points), log10T: poisoned(points) }
        spectrumInto(tableOf(system.media, energies), system.stack, out)
        for (const e of [0, points >> 1, points - 1]) {
          const alone = spectrum(s.entry, s.layers, s.exit, energies[e])
          expect([out.T[e], out.R[e], out.log10T[e]]).toEqual([alone.T, alone.R, alone.log10T])
        }
      }),
    )
  })

  it('a medium numbered once or many times gives the same bits', () => {
    fc.assert(
      fc.property(stack, fc.array(fc.nat({ max: 3 }), { maxLength: 30 }), (s, order) => {
        const few = s.layers.slice(0, 4)
        fc.pre(few.length === 4)
        const shared = regionSystem(s.entry, few, s.exit)
        const chosen = order.map((i) => few[i])
        const stackOfFew: WaveStack = {
          entry: 0,
          exit: 5,
          medium: Int32Array.from(order, (i) => i + 1),
          width: Float64Array.from(chosen, (l) => l.d),
        }
        const out = { T: poisoned(1), R: poisoned(1) }
        spectrumInto(tableOf(shared.media, [s.energy]), stackOfFew, out)
        expect(out.T[0]).toBe(spectrum(s.entry, chosen, s.exit, s.energy).T)
      }),
    )
  })

  it('w dT/dw = 2 q dT/dq + mu dT/dmu for each layer: its matrix knows only q w² and mu w', () => {
    fc.assert(
      fc.property(stack, (s) => {
        fc.pre(s.layers.length > 0)
        const system = regionSystem(s.entry, s.layers, s.exit)
        const layers = s.layers.length
        const out = { T: poisoned(1), dTdWidth: poisoned(layers), dTdQ: poisoned(layers), dTdMu: poisoned(layers) }
        gradientInto(tableOf(system.media, [s.energy]), system.stack, out)
        for (let j = 0; j < layers; j++) {
          const table = tableOf(system.media, [s.energy])
          const q = table.q[j + 1]
          const byWidth = out.dTdWidth[j] * s.layers[j].d
          const byNumbers = 2 * out.dTdQ[j] * q + out.dTdMu[j] * table.mu[j + 1]
          const scale = Math.abs(byWidth) + Math.abs(2 * out.dTdQ[j] * q) + Math.abs(out.dTdMu[j] * table.mu[j + 1])
          expect(Math.abs(byWidth - byNumbers)).toBeLessThanOrEqual(1e-10 * scale + 1e-13 * out.T[0])
        }
      }),
    )
  })
})

const film = fc.record({ n: number(0.05, 4), k: fc.oneof(fc.constant(0), number(0, 4)), d: number(0, 300) })

describe('what no spectrum of absorbing light stacks may break', () => {
  const light = fc.record({
    entry: number(1, 2),
    exit: number(1, 2),
    films: fc.array(film, { maxLength: 8 }),
    wavelength: number(300, 2000),
    pol: fc.constantFrom('s' as const, 'p' as const),
  })

  it('T + R + A = 1 with A from the layers, each layer absorbing and none of them giving', () => {
    fc.assert(
      fc.property(light, number(0, 80), (s, angle) => {
        const from = 'entry'
        const given = { wavelength: s.wavelength, angle, pol: s.pol }
        const { table, stack } = lightTable({ n: s.entry, k: 0 }, s.films, { n: s.exit, k: 0 }, from, given)
        const out = { T: poisoned(1), R: poisoned(1), A: poisoned(1), absorbed: poisoned(s.films.length) }
        expect(spectrumInto(table, stack, out)).toBeLessThan(1e-11)
        for (const share of out.absorbed) expect(share).toBeGreaterThan(-1e-12)
      }),
    )
  })

  it('T is the same from both sides at normal incidence, with absorption too', () => {
    fc.assert(
      fc.property(light, (s) => {
        const given = { wavelength: s.wavelength, angle: 0, pol: s.pol }
        const { table, stack } = lightTable({ n: s.entry, k: 0 }, s.films, { n: s.exit, k: 0 }, 'entry', given)
        const one = { T: poisoned(1), R: poisoned(1), log10T: poisoned(1) }
        const other = { T: poisoned(1), R: poisoned(1), log10T: poisoned(1) }
        spectrumInto(table, stack, one)
        spectrumInto(table, stack, other, 'exit')
        expect(Math.abs(one.log10T[0] - other.log10T[0])).toBeLessThan(1e-10)
      }),
    )
  })
})

describe('what is refused, with its number', () => {
  const lead = { V: 0, m: 0.067 }
  const system = regionSystem(lead, [{ V: 0.3, m: 0.09, d: 3 }], { V: 0.2, m: 0.067 })
  const run = (energies: number[], stack = system.stack, from: 'entry' | 'exit' = 'entry') => {
    const out = { T: poisoned(energies.length), R: poisoned(energies.length) }
    return spectrumInto(tableOf(system.media, energies), stack, out, from)
  }

  it('a point at or below the edge of the side the wave comes from', () => {
    expect(() => run([0.1, 0])).toThrow('Point 1: q is 0 /nm² in medium 0')
    expect(() => run([0.3, 0.1], system.stack, 'exit')).toThrow(/Point 1: q is -0\.17\d* \/nm² in medium 2/)
  })

  it('a wave from a hard wall', () => {
    expect(() => run([0.1], { ...system.stack, exit: hardWall }, 'exit')).toThrow(/hard wall/)
  })

  it('a negative or endless width', () => {
    for (const width of [-1, Number.NaN, Number.POSITIVE_INFINITY]) {
      expect(() => run([0.1], { ...system.stack, width: Float64Array.of(width) })).toThrow(
        `Layer 0 is ${width} nm wide`,
      )
    }
  })

  it('a medium that is not a number, never passed on as T', () => {
    const table = tableOf(system.media, [0.1, 0.2])
    table.mu[1 * 2 + 1] = Number.NaN
    expect(() => spectrumInto(table, system.stack, { T: poisoned(2), R: poisoned(2) })).toThrow(
      'Point 1, medium 1: q is',
    )
  })

  it('an absorbing lead on the side the wave comes from', () => {
    const given = { wavelength: 550, angle: 0, pol: 's' as const }
    const { table, stack } = lightTable({ n: 1, k: 0 }, [], { n: 1.5, k: 0.1 }, 'entry', given)
    expect(() => spectrumInto(table, stack, { T: poisoned(1), R: poisoned(1) }, 'exit')).toThrow(/must not absorb/)
  })
})

import { describe, expect, it } from 'vitest'
import { amplitudesInto, layerShares, waveShape } from '../../src/wave/index.js'
import { C, poisoned, regionSystem, slopeOf, tableOf } from './regionSystem.js'

const entry = { V: 0, m: 0.067 }
const barrier = { V: 0.3, m: 0.092 }
const double = regionSystem(
  entry,
  [
    { ...barrier, d: 4 },
    { ...entry, d: 7 },
    { ...barrier, d: 5 },
  ],
  entry,
)

function simpson(system: typeof double, energy: number, from: number, to: number): number {
  const n = 2000
  const z = Float64Array.from({ length: n + 1 }, (_, i) => from + ((to - from) * i) / n)
  const density = waveShape(system, energy, z)
  let sum = 0
  for (let i = 0; i <= n; i++) sum += density[i] * (i === 0 || i === n ? 1 : i % 2 === 1 ? 4 : 2)
  return (sum * (to - from)) / (3 * n)
}

describe('waveShape', () => {
  it('has unit integral over the layers, layer by layer what layerShares says', () => {
    for (const energy of [0.02, 0.0527, 0.19, 0.35]) {
      const { probability } = layerShares(double, energy)
      expect(probability.reduce((a, b) => a + b, 0)).toBeCloseTo(1, 14)
      expect(simpson(double, energy, 0, 4)).toBeCloseTo(probability[0], 9)
      expect(simpson(double, energy, 4, 11)).toBeCloseTo(probability[1], 9)
      expect(simpson(double, energy, 11, 16)).toBeCloseTo(probability[2], 9)
    }
  })

  it('is continuous at every face, seen from either side', () => {
    for (const face of [0, 4, 11, 16]) {
      const [left, right] = waveShape(double, 0.05, Float64Array.of(face - 1e-9, face + 1e-9))
      expect(Math.abs(left / right - 1)).toBeLessThan(1e-7)
    }
  })

  it('stands still behind the exit, waves before the entry, and is alike through a layer cut in pieces', () => {
    const [a, b] = waveShape(double, 0.05, Float64Array.of(17, 40))
    expect(a).toBeCloseTo(b, 14)
    const cut = regionSystem(
      entry,
      [
        { ...barrier, d: 1 },
        { ...barrier, d: 3 },
        { ...entry, d: 7 },
        { ...barrier, d: 4.5 },
        { ...barrier, d: 0.5 },
      ],
      entry,
    )
    const z = Float64Array.from({ length: 41 }, (_, i) => i * 0.5 - 2)
    const whole = waveShape(double, 0.05, z)
    const pieces = waveShape(cut, 0.05, z)
    for (let i = 0; i < z.length; i++) expect(Math.abs(pieces[i] / whole[i] - 1)).toBeLessThan(1e-12)
  })

  it('keeps its digits where the wave falls from the well towards the entry through a thick barrier', () => {
    // Close to its resonance the wave fills the well and falls on both sides as exp(-kappa z), until what comes in
    // takes over; a sweep from the exit alone would drown the falling part in the rounding of the rising one.
    const system = regionSystem(
      entry,
      [
        { ...barrier, d: 12 },
        { ...entry, d: 7 },
        { ...barrier, d: 12 },
      ],
      entry,
    )
    const energy = 0.053334655 // 1e-9 beside the pole of the same well: the resonant wave dominates
    const kappa = Math.sqrt((barrier.m * (barrier.V - energy)) / C)
    const density = waveShape(system, energy, Float64Array.of(8, 9, 10))
    expect(Math.abs(density[0] / density[1] / Math.exp(-2 * kappa) - 1)).toBeLessThan(1e-3)
    expect(Math.abs(density[1] / density[2] / Math.exp(-2 * kappa) - 1)).toBeLessThan(1e-3)
    const { probability } = layerShares(system, energy)
    expect(Math.abs(probability[0] / probability[2] - 1)).toBeLessThan(1e-3)
    expect(probability.every((p) => p > 0)).toBe(true)
  })

  it('refuses a stack without width and a closed entry', () => {
    expect(() => waveShape(regionSystem(entry, [], entry), 0.1, Float64Array.of(0))).toThrow(/without any width/)
    expect(() => waveShape(double, -0.1, Float64Array.of(0))).toThrow(/Point 0: q is -0\.17/)
  })
})

describe('dwell time', () => {
  it('is the width over the velocity for a layer like its leads', () => {
    const free = regionSystem(entry, [{ ...entry, d: 9 }], entry)
    const energy = 0.1
    const velocity = 2 * Math.sqrt((C * energy) / entry.m)
    expect(layerShares(free, energy).dwell[0]).toBeCloseTo(9 / velocity, 11)
  })

  it('adds up to 2/Gamma at the peak of an isolated symmetric resonance', () => {
    // Stored over incoming: at a peak with T = 1 the dwell time is hbar/(Gamma/2). Gamma = 1.8836233097e-8 eV is the
    // value of checks.md E8 for 10 nm barriers, V = 0.3, m_b = 0.092 and a 7 nm well.
    const system = regionSystem(
      entry,
      [
        { ...barrier, d: 10 },
        { ...entry, d: 7 },
        { ...barrier, d: 10 },
      ],
      entry,
    )
    const dwell = layerShares(system, 0.0533346552319179).dwell.reduce((a, b) => a + b, 0)
    expect(Math.abs(dwell * 1.8836233097e-8 - 2)).toBeLessThan(2e-6)
  })

  it('equals the phase time but for the interference before the stack', () => {
    // In front of a wall |r| = 1; the standing wave before the stack takes part in the delay by the energy dependence
    // of k: dwell = d arg r/dE + sin(arg r)/(2E), in units of hbar (equal masses, phase at the entry's face).
    const well = regionSystem(
      entry,
      [
        { V: 0.2, m: 0.067, d: 2 },
        { ...entry, d: 6 },
      ],
      'hard wall',
    )
    const energy = 0.08
    const out = { phaseT: poisoned(1), phaseR: poisoned(1), slopeT: poisoned(1), slopeR: poisoned(1) }
    amplitudesInto(tableOf(well.media, [energy]), slopeOf(well.media, [energy]), well.stack, out)
    const dwell = layerShares(well, energy).dwell.reduce((a, b) => a + b, 0)
    const byK = Math.sin(out.phaseR[0]) / (2 * energy)
    expect(dwell).toBeCloseTo(out.slopeR[0] + byK, 9)
  })
})

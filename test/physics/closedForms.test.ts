import { describe, expect, it } from 'vitest'
import { amplitudesInto, spectrumInto, type WaveSystem } from '../../src/wave/index.js'
import { C, poisoned, regionSystem, slopeOf, tableOf } from '../wave/regionSystem.js'

const hbarEvFs = 0.6582119569509066
const lead = { V: 0, m: 0.067 }

function at(system: WaveSystem, energy: number) {
  const out = { T: poisoned(1), R: poisoned(1), log10T: poisoned(1) }
  const fluxError = spectrumInto(tableOf(system.media, [energy]), system.stack, out)
  return { T: out.T[0], R: out.R[0], log10T: out.log10T[0], fluxError }
}

function phases(system: WaveSystem, energy: number) {
  const out = { phaseT: poisoned(1), phaseR: poisoned(1), slopeT: poisoned(1), slopeR: poisoned(1) }
  amplitudesInto(tableOf(system.media, [energy]), slopeOf(system.media, [energy]), system.stack, out)
  return { timeT: out.slopeT[0] * hbarEvFs, phaseR: out.phaseR[0], timeR: out.slopeR[0] * hbarEvFs }
}

function close(found: number, wanted: number, relative = 1e-12): void {
  expect(Math.abs(found - wanted)).toBeLessThanOrEqual(relative * Math.abs(wanted))
}

/** A barrier of width d between leads of 0.067. */
const single = (d: number, V: number, m = 0.067) => regionSystem(lead, [{ d, V, m }], lead)

// Numbers: the project's list of check values, section 1 (50 digits from the formula quoted there).
describe('electron filters in closed form', () => {
  it('E1: a step of potential and mass lets 4 q1 q2/(q1 + q2)² through, the ratio of velocities counted', () => {
    const step = regionSystem(lead, [], { V: 0.2, m: 0.092 })
    close(at(step, 0.3).T, 0.88449949493917)
    close(at(step, 0.3).R, 0.11550050506083)
    close(at(regionSystem(lead, [], { V: 0.2, m: 0.067 }), 0.3).T, 0.928203230275509)
  })

  it('E2: a closed exit reflects everything, with a phase', () => {
    const step = regionSystem(lead, [], { V: 0.25, m: 0.092 })
    expect(at(step, 0.1)).toMatchObject({ T: 0, R: 1, log10T: Number.NEGATIVE_INFINITY })
    close(phases(step, 0.1).phaseR, -1.61496653228012)
  })

  it('E3: before a hard wall r = -exp(2ikd), delayed by 2d/v', () => {
    const well = regionSystem(lead, [{ ...lead, d: 8 }], 'hard wall')
    expect(at(well, 0.1).R).toBeCloseTo(1, 15)
    close(phases(well, 0.1).phaseR, -2.71518899582956)
    close(phases(well, 0.1).timeR, 22.0816584147462)
  })

  it.each([
    [0.1, 0.00940874805983665],
    [0.2, 0.0524229039731227],
    [0.3, 0.23270644518928],
    [0.31, 0.266677118630826],
    [0.5, 0.9931228818484],
  ])('E4: a rectangular barrier at %d eV', (energy, T) => {
    close(at(single(5, 0.3), energy).T, T)
  })

  it('E4: the barrier has T = 1 first at V + (C/m)(pi/d)²', () => {
    expect(at(single(5, 0.3), 0.524495619167088).R).toBeLessThan(1e-28)
  })

  it('E4: on the top of the barrier, 1e-9 eV and one unit in the last place beside it', () => {
    const onTop = 1 / (1 + (0.067 * 0.3 * 25) / (4 * C))
    const ulp = 2 ** -54
    for (const energy of [0.3, 0.3 - ulp, 0.3 + ulp]) close(at(single(5, 0.3), energy).T, onTop, 1e-14)
    for (const step of [-1e-9, 1e-9]) {
      const E = 0.3 + step
      const k = Math.sqrt((0.067 * Math.abs(step)) / C)
      const sine = step < 0 ? Math.sinh(k * 5) : Math.sin(k * 5)
      close(at(single(5, 0.3), E).T, 1 / (1 + (0.09 * sine * sine) / (4 * E * Math.abs(E - 0.3))), 1e-7)
    }
  })

  it.each([
    [0.1, 0.003710937321813],
    [0.2, 0.0228720995418107],
    [0.3, 0.13882202038853],
  ])('E5: the same barrier with a mass of its own at %d eV', (energy, T) => {
    close(at(single(5, 0.3, 0.0919), energy).T, T)
  })

  it('E6: a thin high barrier tends to the delta barrier, with an error proportional to its width', () => {
    const delta = 0.716501161914505
    const T = [0.1, 0.01, 0.001].map((d) => at(single(d, 0.3 / d), 0.1).T)
    close(T[0], 0.713041382530751)
    close(T[1], 0.716145072904597)
    close(T[2], 0.716465452382947)
    expect((delta - T[1]) / (delta - T[2])).toBeCloseTo(10, 1)
  })

  it('E7: the symmetric double barrier', () => {
    const barrier = { V: 1, m: 0.067, d: 1.695675 }
    const double = regionSystem(lead, [barrier, { ...lead, d: 4.5218 }, barrier], lead)
    close(at(double, 0.08).T, 1.12344995849864e-4)
    close(at(double, 0.135).T, 0.00722227903420733)
    close(at(double, 0.15).T, 0.8075571913105)
    close(at(double, 0.5).T, 0.0324444758400403)
    // 15 digits of the peak's energy leave R of about (1e-15/Gamma)².
    for (const peak of [0.150757452549632, 0.580227814729805]) expect(at(double, peak).R).toBeLessThan(1e-24)
  })

  it('E13: a well is transparent at (C/m)(n pi/L)² - D', () => {
    const L = 7
    const D = 0.2
    const well = regionSystem(lead, [{ V: -D, m: 0.067, d: L }], lead)
    for (const n of [2, 3, 4]) {
      const energy = (C / 0.067) * ((n * Math.PI) / L) ** 2 - D
      expect(at(well, energy).R).toBeLessThan(1e-27)
    }
  })

  it.each([
    [5, 0.00940874805983665],
    [10, 2.510385099e-5],
    [20, 1.772485812e-10],
    [50, 6.238723176e-26],
  ])('E14: a barrier of %d nm, down to its asymptote 16 E(V - E)/V² exp(-2 kappa d)', (d, T) => {
    close(at(single(d, 0.3), 0.1).T, T, 5e-10)
  })

  it('E14: log10 T follows the asymptote where T itself has underflown', () => {
    const kappa = Math.sqrt((0.067 * 0.2) / C)
    for (const d of [700, 1000, 5000]) {
      const { T, R, log10T } = at(single(d, 0.3), 0.1)
      expect(T).toBe(0)
      expect(R).toBeCloseTo(1, 14)
      close(log10T, Math.log10((16 * 0.1 * 0.2) / 0.09) - (2 * kappa * d) / Math.LN10, 1e-14)
    }
  })

  const cell = [{ V: 0.3, m: 0.0919, d: 2 }]
  const periodic = (n: number) => {
    const layers = Array.from({ length: 2 * n - 1 }, (_, j) => (j % 2 === 0 ? cell[0] : { ...lead, d: 4.5 }))
    return regionSystem(lead, layers, lead)
  }

  it.each([
    [1, 0.196114050565046],
    [2, 0.980449974200242],
    [5, 0.200783104366876],
    [10, 0.675957664457087],
    [30, 0.245386138960194],
  ])('E15: %d equal barriers, by the N-cell identity', (n, T) => {
    close(at(periodic(n), 0.09).T, T)
  })

  it('E15: the identity itself, from the Bloch phase of one cell', () => {
    const phi = Math.acos(0.034872901887154)
    const one = 1 / at(periodic(1), 0.09).T - 1
    for (const n of [3, 7, 20]) {
      const ratio = Math.sin(n * phi) / Math.sin(phi)
      close(at(periodic(n), 0.09).T, 1 / (1 + ratio * ratio * one), 1e-11)
    }
  })

  it('E16: five barriers have four peaks of height 1 in their miniband', () => {
    for (const peak of [0.0724042451618624, 0.0832539853101905, 0.0995646129708164, 0.116840113699133]) {
      expect(at(periodic(5), peak).R).toBeLessThan(1e-23)
    }
  })

  it.each([
    [0.5, 0.2, 5, 0.1, 0.00232861082928224],
    [0.5, 0.2, 5, 0.45, 0.298543086365271],
    [0.7, 0.33, 6, 0.3, 0.001507928124004],
  ])(
    'E21: a staircase for a barrier that falls from %d eV by %d over %d nm tends to the Airy result as 1/N²',
    (V, F, w, E, T) => {
      const error = (n: number) => {
        const steps = Array.from({ length: n }, (_, j) => ({ V: V - (F * (j + 0.5)) / n, m: 0.067, d: w / n }))
        return Math.abs(at(regionSystem(lead, steps, { V: -F, m: 0.067 }), E).T / T - 1)
      }
      expect(error(100)).toBeLessThan(3e-5)
      expect(error(100) / error(400)).toBeCloseTo(16, 0)
    },
  )

  it('E23: a free layer delays by its width over the velocity', () => {
    close(phases(regionSystem(lead, [{ ...lead, d: 10 }], lead), 0.1).timeT, 13.8010365092, 1e-11)
  })

  it('E24: the delay of a barrier saturates with its width at hbar m/(C k kappa)', () => {
    close(phases(single(5, 0.3), 0.1).timeT, 4.65126877638, 1e-11)
    close(phases(single(10, 0.3), 0.1).timeT, 4.65429687906, 1e-11)
    close(phases(single(30, 0.3), 0.1).timeT, 4.65426138218, 1e-11)
    close(phases(single(2000, 0.3), 0.1).timeT, 4.65426138218, 1e-11)
  })

  it('E27: with equal masses motion in the plane only shifts the energy by C k²/m', () => {
    const k = 0.2
    const double = [
      { V: 0.3, m: 0.067, d: 2 },
      { ...lead, d: 5 },
      { V: 0.3, m: 0.067, d: 2 },
    ]
    const shift = (C * k * k) / 0.067
    close(at(regionSystem(lead, double, lead, k), 0.11 + shift).T, at(regionSystem(lead, double, lead), 0.11).T, 1e-11)
  })
})

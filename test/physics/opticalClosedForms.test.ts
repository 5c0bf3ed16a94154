import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { type ElectronStack, type LightStack, type Medium, spectrum } from '../../src/index.js'

// Values and formulas of the list of checks (O1 to O18), evaluated there in 50 digits; sources beside each in that list.

const air = { index: 1 }
const glass = { index: 1.52 }
const degree = Math.PI / 180

function light(
  entry: Medium,
  layers: readonly (Medium & { widthNm: number })[],
  exit: Medium,
  angleDeg = 0,
  polarisation: 's' | 'p' = 's',
): LightStack {
  return { kind: 'light', entry, layers, exit, angleDeg, polarisation }
}

function at(stack: LightStack, nm: number, from: 'entry' | 'exit' = 'entry'): { T: number; R: number; A: number } {
  const { T, R, A, fluxError } = spectrum(stack, [nm], { from })
  expect(fluxError).toBeLessThan(1e-12)
  return { T: T[0], R: R[0], A: A[0] }
}

function close(found: number, wanted: number, relative = 1e-12): void {
  expect(Math.abs(found - wanted)).toBeLessThanOrEqual(relative * Math.abs(wanted) + 1e-30)
}

function quarter(index: number, nm: number, times = 1): { index: number; widthNm: number } {
  return { index, widthNm: (times * nm) / (4 * index) }
}

describe('a face', () => {
  it.each([
    [1.5, 0.04],
    [1.52, 0.0425799949609473],
    [4, 0.36],
  ])('O1: reflects ((n - 1)/(n + 1))² at normal incidence, n = %f', (index, R) => {
    for (const polarisation of ['s', 'p'] as const) close(at(light(air, [], { index }, 0, polarisation), 633).R, R)
  })

  it.each([
    [30, 0.0577961054032131, 0.02524914654843],
    [45, 0.0920133630455244, 0.00846645897894748],
    [60, 0.176571488082841, 0.00180193752158504],
    [80, 0.538594905749581, 0.236813803633365],
  ])('O2: at %d degrees', (angle, Rs, Rp) => {
    close(at(light(air, [], { index: 1.5 }, angle, 's'), 500).R, Rs)
    close(at(light(air, [], { index: 1.5 }, angle, 'p'), 500).R, Rp, 1e-11)
  })

  it('O3: reflects no p light at Brewster’s angle, and all light beyond the critical angle', () => {
    const brewster = Math.atan(1.5) / degree
    close(brewster, 56.3099324740202, 1e-14)
    expect(at(light(air, [], { index: 1.5 }, brewster, 'p'), 633).R).toBeLessThan(1e-30)
    close(at(light(air, [], { index: 1.5 }, brewster), 633).R, 0.14792899408284)
    const critical = Math.asin(1 / 1.5) / degree
    for (const polarisation of ['s', 'p'] as const) {
      const beyond = at(light({ index: 1.5 }, [], air, critical + 1e-9, polarisation), 633)
      expect(beyond.T).toBe(0)
      close(beyond.R, 1)
      expect(at(light({ index: 1.5 }, [], air, critical - 1e-6, polarisation), 633).T).toBeGreaterThan(1e-4)
    }
  })
})

describe('quarter and half waves', () => {
  it('O5: a quarter wave of 1.38 leaves ((n - n1²)/(n + n1²))², one of sqrt(n) nothing', () => {
    close(at(light(air, [quarter(1.38, 550)], glass), 550).R, 0.0126007902146303)
    expect(at(light(air, [quarter(1.2328828005938, 550)], glass), 550).R).toBeLessThan(1e-28)
  })

  it('O6: a half wave of anything is absent', () => {
    for (const index of [1.2, 1.38, 2.35, 4]) {
      close(at(light(air, [quarter(index, 550, 2)], glass), 550).R, 0.0425799949609473)
    }
  })

  it.each([
    [2.35, 1.35, 4, 0.987026292745815],
    [2.35, 1.35, 10, 0.999983131272751],
    [2.1, 1.46, 6, 0.982571572237062],
  ])('O7: air/(HL)^N H/glass of %f and %f, N = %d', (high, low, pairs, R) => {
    const H = quarter(high, 550)
    const layers = [...Array.from({ length: pairs }, () => [H, quarter(low, 550)]).flat(), H]
    const Y = ((high / low) ** (2 * pairs) * high * high) / 1.52
    close(((1 - Y) / (1 + Y)) ** 2, R)
    close(at(light(air, layers, glass), 550).R, R)
    // Its smallness in its own digits, where 1 - R has lost them.
    close(at(light(air, layers, glass), 550).T, (4 * Y) / (1 + Y) ** 2, 1e-11)
  })

  it('O7: many pairs have the T of the N-cell identity, up to the edges of the stop band and beyond', () => {
    const edge = (2 / Math.PI) * Math.asin((2.35 - 1.35) / (2.35 + 1.35))
    close(edge, 0.174226112609325)
    const mirror = (pairs: number) =>
      light(glass, Array.from({ length: pairs }, () => [quarter(2.35, 550), quarter(1.35, 550)]).flat(), glass)
    for (const part of [0.5, 0.99, 1.01, 1.5]) {
      const g = 1 + part * edge
      const delta = (Math.PI / 2) * g
      // Half the trace of a pair: its size is above 1 inside the stop band only, cosh of what a pair takes from a wave.
      const half = Math.cos(delta) ** 2 - 0.5 * (2.35 / 1.35 + 1.35 / 2.35) * Math.sin(delta) ** 2
      expect(Math.abs(half) > 1).toBe(part < 1)
      const phase = part < 1 ? Math.acosh(Math.abs(half)) : Math.acos(half)
      const sine = part < 1 ? Math.sinh : Math.sin
      const cell = 1 / at(mirror(1), 550 / g).T - 1
      for (const pairs of [2, 10, 60]) {
        close(at(mirror(pairs), 550 / g).T, 1 / (1 + (sine(pairs * phase) / sine(phase)) ** 2 * cell), 1e-9)
      }
    }
  })

  it('O10: a plate is Airy’s', () => {
    const plate = (angle: number, polarisation: 's' | 'p') =>
      light(air, [{ index: 1.5, widthNm: 1000 }], air, angle, polarisation)
    close(at(plate(0, 's'), 600).T, 1)
    close(at(plate(0, 's'), 610).T, 0.988865413303792)
    close(at(plate(0, 's'), 620).T, 0.960717656916491)
    close(at(plate(45, 's'), 600).T, 0.70853232009743)
    close(at(plate(45, 'p'), 600).T, 0.969235143777833)
  })
})

describe('a single-cavity filter', () => {
  const pairs = (m: number) => Array.from({ length: m }, () => [quarter(2.35, 633), quarter(1.35, 633)]).flat()
  const layers = (m: number) => {
    const mirror = [...pairs(m), quarter(2.35, 633)]
    return [...mirror, quarter(1.35, 633, 2), ...mirror.toReversed()]
  }

  it.each([
    [3, 4.67846262904],
    [4, 1.52193970048],
    [6, 0.16474006591],
  ])('O11: with m = %d is %f nm wide between its half heights', (m, fwhm) => {
    const T = (nm: number) => at(light(glass, layers(m), glass), nm).T
    close(T(633), 1, 1e-11)
    const half = (outer: number) => {
      let [a, b] = [633, outer]
      for (let i = 0; i < 80; i++) {
        const middle = (a + b) / 2
        if (T(middle) > 0.5) a = middle
        else b = middle
      }
      return a
    }
    close(half(633 + 2 * fwhm) - half(633 - 2 * fwhm), fwhm, 1e-10)
  })

  it.each([
    [5, 's', 632.0016],
    [5, 'p', 632.0022],
    [10, 's', 629.0224],
    [10, 'p', 629.0313],
    [20, 's', 617.3463],
    [20, 'p', 617.4877],
    [30, 's', 598.7588],
    [30, 'p', 599.4567],
  ] as const)('O12: at %d degrees, %s, has its peak at %f nm', (angle, polarisation, peak) => {
    const T = (nm: number) => at(light(air, layers(4), glass, angle, polarisation), nm).T
    let [a, b] = [peak - 0.3, peak + 0.3]
    const golden = (Math.sqrt(5) - 1) / 2
    while (b - a > 1e-6) {
      const [left, right] = [b - golden * (b - a), a + golden * (b - a)]
      if (T(left) > T(right)) b = right
      else a = left
    }
    expect(Math.abs((a + b) / 2 - peak)).toBeLessThan(6e-5)
    // Pidgeon and Smith's effective index (from memory): good to 0.1 % while the angle is small.
    if (angle === 5) {
      const effective = Math.sin(angle * degree) / Math.sqrt(1 - ((a + b) / 2 / 633) ** 2)
      expect(Math.abs(effective / (1.35 / Math.sqrt(1 - 1.35 / 2.35 + (1.35 / 2.35) ** 2)) - 1)).toBeLessThan(1e-3)
    }
  })
})

describe('tunnelling of light', () => {
  it.each([
    [1.517, 45, 500, 0.0350156796235167, 0.0789476307836805],
    [1.517, 45, 200, 0.362237394424037, 0.57295490514353],
    [1.5, 43, 158.25, 0.545854999642737, 0.821153548659207],
  ])('O8: through a gap between prisms of %f at %d degrees, %f nm wide', (n, angle, gap, Ts, Tp) => {
    const prisms = (polarisation: 's' | 'p') =>
      light({ index: n }, [{ ...air, widthNm: gap }], { index: n }, angle, polarisation)
    // The rounded sine of the angle moves T by up to some 1e-14 times the exponent.
    close(at(prisms('s'), 633).T, Ts, 1e-12)
    close(at(prisms('p'), 633).T, Tp, 1e-12)
  })

  it('O8: through a gap as wide as one likes, in closed form, T of 1e-1800 by its logarithm', () => {
    const [n, angle, nm] = [1.517, 45, 633]
    const [sin, cos] = [Math.sin(angle * degree), Math.cos(angle * degree)]
    const b = Math.sqrt(n * n * sin * sin - 1)
    for (const gap of [1e4, 1e5, 5e5]) {
      for (const polarisation of ['s', 'p'] as const) {
        // For p the admittances are q/n² and b/1.
        const q = polarisation === 's' ? n * cos : cos / n
        const stack = light({ index: n }, [{ ...air, widthNm: gap }], { index: n }, angle, polarisation)
        const { log10T, R } = spectrum(stack, [nm])
        const exponent = (2 * Math.PI * b * gap) / nm
        const wanted = (Math.log(16) - 2 * Math.log((q * q + b * b) / (q * b)) - 2 * exponent) / Math.LN10
        expect(Math.abs(log10T[0] / wanted - 1)).toBeLessThan(1e-12)
        close(R[0], 1)
      }
    }
  })

  it('O18: attenuated total reflection has its dip for p light, and none for s', () => {
    const silver = { index: 0.0656, extinction: 4.26, widthNm: 50 }
    for (const [angle, Rp] of [
      [42, 0.980982],
      [43, 0.630739],
      [44, 0.938333],
    ] as const) {
      const through = (polarisation: 's' | 'p') => at(light({ index: 1.515 }, [silver], air, angle, polarisation), 633)
      expect(Math.abs(through('p').R - Rp)).toBeLessThan(6e-7)
      expect(through('s').R).toBeGreaterThan(0.984)
      expect(through('s').R).toBeLessThan(0.985)
      // Air carries nothing away: what is not reflected is absorbed.
      if (angle > 41.4) close(through('p').A, 1 - through('p').R, 1e-11)
    }
  })
})

describe('absorbing films', () => {
  it('O13: 40 nm of 0.135 + 3.99i on glass', () => {
    const stack = light(air, [{ index: 0.135, extinction: 3.99, widthNm: 40 }], glass)
    const front = at(stack, 633)
    close(front.R, 0.910520460394981)
    close(front.T, 0.0517217223002472)
    close(front.A, 0.0377578173047718, 1e-11)
    const rear = at(stack, 633, 'exit')
    close(rear.R, 0.893565155728004)
    close(rear.T, front.T)
  })

  it('O15: no matching makes 50 nm of silver pass more of what it does not reflect than its potential transmittance', () => {
    const [limit, exitRe, exitIm] = [0.897386531782, 0.88518861, 4.0122176]
    const silver = { index: 0.06, extinction: 3.586, widthNm: 50 }
    const psi = (behind: readonly (Medium & { widthNm: number })[], exit: Medium) => {
      const { T, R } = at(light(air, [silver, ...behind], exit), 548.6)
      return T / (1 - R)
    }
    fc.assert(
      fc.property(
        fc.double({ min: 1.3, max: 4, noNaN: true }),
        fc.double({ min: 0, max: 1, noNaN: true }),
        fc.double({ min: 1, max: 4, noNaN: true }),
        (index, waves, exit) => {
          expect(psi([{ index, widthNm: (waves * 548.6) / (2 * index) }], { index: exit })).toBeLessThan(limit + 1e-12)
        },
      ),
      { numRuns: 300, seed: 3 },
    )
    // The best exit admittance a - ib stands for a layer of i b' behind it: an index and a width that give it by hand, in
    // front of an exit that is real. Y = n (Ye cos + i n sin)/(n cos + i Ye sin) with the sign of exp(-i omega t).
    const n = 4.9
    const best = bestLayer(n, exitRe, -exitIm)
    close(psi([{ index: n, widthNm: (best.phase * 548.6) / (2 * Math.PI * n) }], { index: best.exit }), limit, 1e-9)
  })

  it('O14: T is the same from both sides with absorption, oblique too, and R + T + A = 1', () => {
    const medium = fc.record({
      index: fc.double({ min: 0.05, max: 4, noNaN: true }),
      extinction: fc.double({ min: 0, max: 3, noNaN: true }),
      widthNm: fc.double({ min: 0, max: 120, noNaN: true }),
    })
    fc.assert(
      fc.property(
        fc.array(medium, { minLength: 1, maxLength: 6 }),
        fc.double({ min: 0, max: 80, noNaN: true }),
        fc.constantFrom('s' as const, 'p' as const),
        (layers, angleDeg, polarisation) => {
          const stack: LightStack = { kind: 'light', entry: air, layers, exit: glass, angleDeg, polarisation }
          const inside = Math.asin(Math.sin(angleDeg * degree) / 1.52) / degree
          for (const nm of [420, 633, 1064]) {
            const front = spectrum(stack, [nm])
            const rear = spectrum({ ...stack, angleDeg: inside }, [nm], { from: 'exit' })
            expect(front.fluxError).toBeLessThan(1e-11)
            // The angle is given twice, rounded each time: near grazing the cosine feels it.
            expect(Math.abs(front.log10T[0] - rear.log10T[0])).toBeLessThan(1e-10)
            expect(front.A[0]).toBeGreaterThanOrEqual(0)
            expect(front.A[0]).toBeLessThanOrEqual(1)
          }
        },
      ),
      { numRuns: 150, seed: 5 },
    )
  })
})

describe('the one wave equation', () => {
  it('gives s light and electrons whose q agree the same T and R, tunnelling or not', () => {
    const [hbar2Over2m0, mass, energy, nm] = [0.038099821109685836, 0.067, 0.3, 633]
    const index = fc.double({ min: 1, max: 2.6, noNaN: true })
    fc.assert(
      fc.property(
        fc.array(fc.tuple(index, fc.double({ min: 1, max: 300, noNaN: true })), { minLength: 1, maxLength: 8 }),
        fc.double({ min: 0, max: 75, noNaN: true }),
        (layers, angleDeg) => {
          const prism = 1.9
          const k0 = (2 * Math.PI) / nm
          const sin2 = (prism * Math.sin(angleDeg * degree)) ** 2
          // q = k0² (n² - n_entry² sin²) = (m/C)(E - V) with one mass everywhere.
          const region = (n: number) => ({
            potentialEv: energy - (hbar2Over2m0 / mass) * k0 * k0 * (n * n - sin2),
            massRel: mass,
          })
          const electrons: ElectronStack = {
            kind: 'electron',
            entry: region(prism),
            layers: layers.map(([n, widthNm]) => ({ ...region(n), widthNm })),
            exit: region(prism),
          }
          const stack = light(
            { index: prism },
            layers.map(([n, widthNm]) => ({ index: n, widthNm })),
            { index: prism },
            angleDeg,
          )
          const [one, other] = [spectrum(stack, [nm]), spectrum(electrons, [energy])]
          expect(Math.abs(one.log10T[0] - other.log10T[0])).toBeLessThan(1e-10)
          expect(Math.abs(one.R[0] - other.R[0])).toBeLessThan(1e-10)
        },
      ),
      { numRuns: 200, seed: 7 },
    )
  })
})

describe('functions of the wavelength', () => {
  it('give at every point what constants of that point give', () => {
    const index = (nm: number) => 1.5 + 5000 / (nm * nm)
    const extinction = (nm: number) => 0.01 * (700 / nm)
    const points = [420, 633, 700]
    const whole = spectrum(light(air, [{ index, extinction, widthNm: 300 }], { index }, 40, 'p'), points)
    points.forEach((nm, i) => {
      const film = { index: index(nm), extinction: extinction(nm), widthNm: 300 }
      const one = at(light(air, [film], { index: index(nm) }, 40, 'p'), nm)
      close(whole.T[i], one.T, 1e-13)
      close(whole.R[i], one.R, 1e-12)
      close(whole.A[i], one.A, 1e-12)
    })
  })
})

/** Phase of a layer of index n, and the real exit behind it, that show the admittance re + i im to what stands before it. */
function bestLayer(n: number, re: number, im: number): { phase: number; exit: number } {
  // Admittances turn on circles: r = (n - Y)/(n + Y) keeps its size through the layer and changes its phase.
  const size = Math.sqrt(((n - re) ** 2 + im ** 2) / ((n + re) ** 2 + im ** 2))
  const phaseOfR = Math.atan2(-im, n - re) - Math.atan2(im, n + re)
  const phase = (((phaseOfR / 2) % Math.PI) + Math.PI) % Math.PI
  return { phase, exit: (n * (1 - size)) / (1 + size) }
}

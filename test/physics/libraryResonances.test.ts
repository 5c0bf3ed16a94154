import { readFileSync } from 'node:fs'
import { describe, expect, test } from 'vitest'
import { type ElectronStack, type LightStack, resonances, spectrum } from '../../src/index.js'

function doubleBarrier(
  [left, well, right]: readonly [number, number, number],
  potentialEv: number,
  [inside, outside]: readonly [number, number],
  alphaPerEv = 0,
): ElectronStack {
  const lead = { potentialEv: 0, massRel: inside, alphaPerEv }
  const barrier = { potentialEv, massRel: outside }
  const layers = [
    { ...barrier, widthNm: left },
    { ...lead, widthNm: well },
    { ...barrier, widthNm: right },
  ]
  return { kind: 'electron', entry: lead, layers, exit: lead }
}

function relative(actual: number, expected: number): number {
  return Math.abs(actual / expected - 1)
}

describe('resonances of electrons', () => {
  // Structures of the literature (layer data from memory); positions and widths computed independently for these parameters.
  test.each<[string, ElectronStack, [number, number], [number, number]]>([
    ['Tsu-Esaki, APL 22, 562 (1973)', doubleBarrier([2, 5, 2], 0.5, [0.067, 0.067]), [105.37, 400.7], [6.432, 66.8]],
    [
      'Chang-Esaki-Tsu, APL 24, 593 (1974)',
      doubleBarrier([8, 5, 8], 0.4, [0.067, 0.067]),
      [99.85, 346.1],
      [1.648e-3, 1.079],
    ],
    ['GaAs/AlAs 1.7/4.5/1.7 nm', doubleBarrier([1.7, 4.5, 1.7], 1, [0.067, 0.15]), [125.06, 517.8], [0.4328, 5.199]],
    [
      'InGaAs/AlAs, Brown and Broekaert class',
      doubleBarrier([1.4, 4.5, 1.4], 1.2, [0.041, 0.15]),
      [158.4, 722.2],
      [1.358, 11.64],
    ],
    [
      'the same, alpha 1.3/eV in InGaAs',
      doubleBarrier([1.4, 4.5, 1.4], 1.2, [0.041, 0.15], 1.3),
      [149.5, 534.9],
      [1.067, 5.66],
    ],
    [
      'InAs/AlSb, Brown, APL 58, 2291 (1991)',
      doubleBarrier([1.8, 6.4, 1.8], 1.35, [0.026, 0.14]),
      [124.7, 588.4],
      [0.1504, 1.312],
    ],
  ])('%s: the first two', (_, stack, energiesMev, widthsMev) => {
    const [first, second] = resonances(stack, [0.002, 0.8], { depthEv: 0.05 })
    ;[first, second].forEach(({ energyEv, widthEv }, i) => {
      expect(relative(energyEv * 1e3, energiesMev[i])).toBeLessThan(5e-4)
      expect(relative(widthEv * 1e3, widthsMev[i])).toBeLessThan(1e-3)
    })
  })

  test('peak and pole of a wide line differ: GaAs 2/5/2 nm, 0.5 eV', () => {
    const stack = doubleBarrier([2, 5, 2], 0.5, [0.067, 0.067])
    const [{ energyEv, widthEv }] = resonances(stack, [0.002, 0.3])
    expect(Math.abs(energyEv - 0.105372188330368)).toBeLessThan(1e-12)
    expect(relative(widthEv, 0.006432131284)).toBeLessThan(1e-9)
    const { T } = spectrum(stack, [energyEv, 0.105508907741088])
    expect(T[1]).toBeGreaterThan(1 - 1e-12)
    expect(T[0]).toBeLessThan(0.9999)
  })

  test('partial widths of 6 and 10 nm barriers are those of each barrier alone, and give the height', () => {
    const [{ entryWidthEv, exitWidthEv, widthEv, peakT }] = resonances(
      doubleBarrier([6, 6, 10], 0.4, [0.067, 0.1]),
      [0.01, 0.2],
    )
    // Each computed with the other barrier 60 nm thick: right to leading order in Gamma.
    expect(relative(entryWidthEv, 9.3497245350732e-7)).toBeLessThan(1e-4)
    expect(relative(exitWidthEv, 5.4932100967e-10)).toBeLessThan(1e-4)
    expect(relative(widthEv, 9.3552175806538e-7)).toBeLessThan(1e-9)
    expect(relative(peakT, 0.00234734657613)).toBeLessThan(1e-4)
  })

  test('an energy written once is looked for in its own range only', () => {
    const stack = doubleBarrier([5, 5, 5], 0.23, [0.067, 0.0919])
    const [pole] = resonances(stack, [0.002, 0.22])
    expect(Math.abs(pole.energyEv - 0.0730643164351603)).toBeLessThan(1e-12)
    expect(relative(pole.widthEv, 3.676991939e-4)).toBeLessThan(1e-9)
    expect(resonances(stack, [0.1, 0.2])).toHaveLength(0)
  })
})

const quarter = (index: number, times = 1) => ({ index, widthNm: (times * 633) / (4 * index) })

/** glass / (HL)^m H / LL / H (LH)^m / glass at 633 nm. */
function cavity(m: number, extinction = 0): LightStack {
  const mirror = Array.from({ length: m }, () => [quarter(2.35), quarter(1.35)]).flat()
  const spacer = { ...quarter(1.35, 2), extinction }
  const layers = [...mirror, quarter(2.35), spacer, quarter(2.35), ...mirror.toReversed()]
  return { kind: 'light', entry: { index: 1.52 }, layers, exit: { index: 1.52 } }
}

const centreEv = 1239.8419843320025 / 633

describe('resonances of light', () => {
  // Exact full widths at half maximum of T over the wavelength; Gamma differs from them by the slope of a wide line.
  test.each([
    [3, 4.67846262904, 2e-3],
    [4, 1.52193970048, 3e-4],
    [6, 0.16474006591, 1e-5],
  ])('a cavity with %d pairs a mirror is %f nm wide at 633 nm', (m, fwhmNm, tolerance) => {
    const poles = resonances(cavity(m), [centreEv - 0.1, centreEv + 0.1])
    expect(poles).toHaveLength(1)
    expect(relative(poles[0].energyEv, centreEv)).toBeLessThan(1e-13)
    expect(relative((poles[0].widthEv / poles[0].energyEv) * 633, fwhmNm)).toBeLessThan(tolerance)
    expect(relative(poles[0].peakT, 1)).toBeLessThan(1e-12)
  })

  test('absorption in the spacer adds to the width what the two sides do not take', () => {
    const [clear] = resonances(cavity(4), [centreEv - 0.1, centreEv + 0.1])
    const [grey] = resonances(cavity(4, 1e-5), [centreEv - 0.1, centreEv + 0.1])
    const absorbed = grey.widthEv - grey.entryWidthEv - grey.exitWidthEv
    expect(relative(grey.entryWidthEv, clear.entryWidthEv)).toBeLessThan(1e-3)
    // The sides' own widths move by 2e-5 with the wave, which is half a percent of what is absorbed.
    expect(relative(grey.widthEv - clear.widthEv, absorbed)).toBeLessThan(1e-2)
    // A wave wholly inside the spacer would lose 2 E kappa/n.
    expect(absorbed).toBeGreaterThan(0.3 * ((2 * centreEv * 1e-5) / 1.35))
    expect(absorbed).toBeLessThan((2 * centreEv * 1e-5) / 1.35)
  })

  const file = new URL('./reference-open.json', import.meta.url)
  interface PoleCase {
    readonly id: string
    readonly kind: string
    readonly left: { n: number }
    readonly layers: { n: number; d: number }[]
    readonly right: { n: number }
    readonly pole_angle: number
    readonly pole_pol: 's' | 'p'
    readonly poles?: [{ E_r_eV: string; Gamma_eV: string }]
  }
  const cases: PoleCase[] = JSON.parse(readFileSync(file, 'utf8')).cases

  test.each(cases.filter(({ kind, poles }) => kind === 'optical' && poles))(
    'has the pole of $id',
    ({ left, layers, right, pole_angle, pole_pol, poles }) => {
      const stack: LightStack = {
        kind: 'light',
        entry: { index: left.n },
        layers: layers.map(({ n, d }) => ({ index: n, widthNm: d })),
        exit: { index: right.n },
        angleDeg: pole_angle,
        polarisation: pole_pol,
      }
      const [energy, width] = [Number(poles![0].E_r_eV), Number(poles![0].Gamma_eV)]
      const found = resonances(stack, [energy - 0.05, energy + 0.05]).find(
        ({ energyEv }) => Math.abs(energyEv - energy) < 1e-12,
      )
      expect(found).toBeDefined()
      expect(relative(found!.widthEv, width)).toBeLessThan(1e-6)
    },
  )
})

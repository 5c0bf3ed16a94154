import { describe, expect, test } from 'vitest'
import {
  bandParameters,
  boltzmannEvPerK,
  boltzmannJPerK,
  conductanceQuantumS,
  electronMassKg,
  elementaryChargeC,
  hbar2Over2m0,
  hbarEvFs,
  hcEvNm,
  lightSpeedMPerS,
  planckJs,
} from '../../src/media/index.js'

/** Relative agreement. */
function near(actual: number, expected: number, relative: number): void {
  expect(Math.abs(actual / expected - 1)).toBeLessThanOrEqual(relative)
}

describe('constants', () => {
  test('the exact ones are those of the SI, the mass is that of CODATA 2022 (arXiv:2409.03787)', () => {
    expect(planckJs).toBe(6.62607015e-34)
    expect(elementaryChargeC).toBe(1.602176634e-19)
    expect(lightSpeedMPerS).toBe(299792458)
    expect(boltzmannJPerK).toBe(1.380649e-23)
    expect(electronMassKg).toBe(9.1093837139e-31)
  })

  test('the derived ones follow from them, to all digits', () => {
    const hbar = planckJs / (2 * Math.PI)
    near(hbar2Over2m0, ((hbar * hbar) / (2 * electronMassKg) / elementaryChargeC) * 1e18, 1e-15)
    near(hcEvNm, ((planckJs * lightSpeedMPerS) / elementaryChargeC) * 1e9, 1e-15)
    near(hbarEvFs, (hbar / elementaryChargeC) * 1e15, 1e-15)
    near(boltzmannEvPerK, boltzmannJPerK / elementaryChargeC, 1e-15)
    near(conductanceQuantumS, (2 * elementaryChargeC * elementaryChargeC) / planckJs, 1e-15)
  })

  test('printed values: hc 1239.841984 eV nm, hbar 6.582119569e-16 eV s, 2e²/h 7.748091729e-5 S (PDG table)', () => {
    near(hcEvNm, 1239.841984, 5e-10)
    near(hbarEvFs, 0.6582119569, 1e-10)
    near(conductanceQuantumS, 7.748091729e-5, 2e-10)
    near(300 * boltzmannEvPerK, 0.0258519997864355, 1e-14)
    near(hbar2Over2m0, 0.038099821109685836, 1e-15)
  })

  test('the mass of 2018 would move hbar²/2m0 by 1.4e-9', () => {
    near(0.0380998211615486 / hbar2Over2m0 - 1, 1.4e-9, 0.05)
  })
})

// Vurgaftman, Meyer, Ram-Mohan, J. Appl. Phys. 89, 5815 (2001), as public copies quote its tables.
describe('gaps of the binaries by Varshni', () => {
  test.each([
    ['GaAs', 1.42248],
    ['AlAs', 3.00304],
    ['InAs', 0.35379],
    ['InP', 1.35289],
    ['GaSb', 0.7267],
    ['AlSb', 2.30009],
    ['InSb', 0.17372],
  ])('%s has %f eV at 300 K', (name, gap) => {
    expect(Math.abs(bandParameters(name, null, 300).gapEv - gap)).toBeLessThanOrEqual(1e-5)
  })

  test.each([
    ['GaAs', 1.5076],
    ['AlAs', 3.09036],
    ['InAs', 0.40737],
    ['InP', 1.41459],
  ])('%s has %f eV at 77 K', (name, gap) => {
    expect(Math.abs(bandParameters(name, null, 77).gapEv - gap)).toBeLessThanOrEqual(1e-5)
  })

  test('GaAs at 300 K is within 3 meV of the 1.422 and 1.424 eV of other public tables', () => {
    const { gapEv } = bandParameters('GaAs', null, 300)
    expect(Math.abs(gapEv - 1.422)).toBeLessThan(3e-3)
    expect(Math.abs(gapEv - 1.424)).toBeLessThan(3e-3)
  })
})

describe('AlGaAs on GaAs at 300 K', () => {
  const gaAs = bandParameters('GaAs', null, 300)

  test.each([
    [0.2, 1.71699, 0.18851, 0.106, 0.64, 0.0836],
    [0.3, 1.84079, 0.25931, 0.159, 0.62, 0.0919],
    [0.4, 1.95942, 0.32494, 0.212, 0.605, 0.1002],
  ])('x = %f: gap %f, conduction step %f, valence step %f, ratio %f, mass %f', (x, gap, step, valence, ratio, mass) => {
    const band = bandParameters('AlGaAs', x, 300)
    const conduction = band.edgeEv - gaAs.edgeEv
    expect(Math.abs(band.gapEv - gap)).toBeLessThanOrEqual(1e-5)
    expect(Math.abs(conduction - step)).toBeLessThanOrEqual(1e-5)
    expect(Math.abs(band.gapEv - gaAs.gapEv - conduction - valence)).toBeLessThan(1e-9)
    expect(Math.abs(conduction / (band.gapEv - gaAs.gapEv) - ratio)).toBeLessThan(5e-4)
    near(band.massRel, mass, 1e-12)
  })

  test('pure AlAs stands 1.05055 eV above GaAs, as an alloy of x = 1 and as the binary', () => {
    const binary = bandParameters('AlAs', null, 300)
    const alloy = bandParameters('AlGaAs', 1, 300)
    expect(Math.abs(binary.edgeEv - gaAs.edgeEv - 1.05055)).toBeLessThan(1e-5)
    for (const key of ['edgeEv', 'gapEv', 'massRel', 'latticeNm', 'c11', 'c12', 'acEv', 'avEv', 'edgeXEv'] as const) {
      near(alloy[key]!, binary[key]!, 1e-14)
    }
  })

  test('the common linear formula 1.424 + 1.247 x lies 0.04 eV lower at x = 0.3', () => {
    expect(bandParameters('AlGaAs', 0.3, 300).gapEv - (1.424 + 1.247 * 0.3)).toBeCloseTo(0.0427, 3)
  })

  test('the lattice follows 5.6533 + 0.0078 x angstrom', () => {
    expect(Math.abs(bandParameters('AlGaAs', 0.3, 300).latticeNm - 0.565564)).toBeLessThan(5e-6)
  })

  test('the X edge falls below the Gamma edge near x = 0.43', () => {
    const difference = (x: number) => {
      const { edgeEv, edgeXEv } = bandParameters('AlGaAs', x, 300)
      return edgeXEv! - edgeEv
    }
    expect(difference(0.42)).toBeGreaterThan(0)
    expect(difference(0.445)).toBeLessThan(0)
  })

  test('X of AlAs lies about 0.2 eV above Gamma of GaAs ("Resonant tunneling through X-valley states")', () => {
    expect(bandParameters('AlAs', null, 300).edgeXEv! - gaAs.edgeEv).toBeCloseTo(0.2, 1)
  })
})

describe('alloys on InP', () => {
  test('InGaAs of x = 0.5344 and InAlAs of x = 0.5252 have the lattice of InP', () => {
    const { latticeNm } = bandParameters('InP', null, 300)
    near(bandParameters('InGaAs', 0.5344, 300).latticeNm, latticeNm, 5e-6)
    near(bandParameters('InAlAs', 0.5252, 300).latticeNm, latticeNm, 5e-6)
  })

  test('In0.53Ga0.47As and In0.52Al0.48As: gaps, masses and the step between them', () => {
    const well = bandParameters('InGaAs', 0.53, 300)
    const barrier = bandParameters('InAlAs', 0.52, 300)
    expect(Math.abs(well.gapEv - 0.73726)).toBeLessThanOrEqual(1e-5)
    expect(Math.abs(well.massRel - 0.043)).toBeLessThan(5e-5)
    expect(Math.abs(well.latticeNm - 0.58679)).toBeLessThan(5e-6)
    expect(Math.abs(barrier.gapEv - 1.45071)).toBeLessThanOrEqual(1e-5)
    expect(Math.abs(barrier.massRel - 0.0733)).toBeLessThan(5e-5)
    expect(Math.abs(barrier.edgeEv - well.edgeEv - 0.522)).toBeLessThan(5e-4)
  })

  test('AlSb stands 2.126 eV above InAs at 300 K', () => {
    expect(bandParameters('AlSb', null, 300).edgeEv - bandParameters('InAs', null, 300).edgeEv).toBeCloseTo(2.126, 3)
  })
})

describe('monolayers', () => {
  test.each([
    ['GaAs', 0.2826625],
    ['AlAs', 0.283055],
    ['InP', 0.293485],
    ['InAs', 0.302915],
    ['AlSb', 0.306775],
    ['GaSb', 0.304795],
  ])('half the lattice constant of %s is %f nm', (name, monolayer) => {
    near(bandParameters(name, null, 300).latticeNm / 2, monolayer, 1e-12)
  })
})

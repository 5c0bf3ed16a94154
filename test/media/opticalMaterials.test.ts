import { describe, expect, test } from 'vitest'
import {
  isMaterial,
  monotoneCubic,
  opticalConstants,
  opticalMaterial,
  opticalMaterials,
  opticalNumbers,
  tableConstants,
} from '../../src/media/index.js'

function at(name: string, nm: number): [number, number] {
  const { index, extinction } = opticalConstants(opticalMaterial(name))
  const value = (of: typeof index) => (typeof of === 'number' ? of : of(nm))
  return [value(index), value(extinction)]
}

describe('published indices', () => {
  // Wavelengths in nm; values as the pages of the data and of the makers give them, not evaluated by us (checks.md section 3).
  test.each([
    ['fused-silica', 587.5618, 1.4584637, 6e-8],
    ['fused-silica', 486.1327, 1.4631265, 6e-8],
    ['fused-silica', 656.2725, 1.4563666, 6e-8],
    ['fused-silica', 1064, 1.449631, 6e-7],
    ['fused-silica', 1550, 1.4440236, 6e-8],
    ['N-BK7', 587.5618, 1.5168, 6e-7],
    ['N-BK7', 546.074, 1.518722, 6e-7],
    ['N-BK7', 632.8, 1.515089, 6e-7],
    ['N-BK7', 486.1327, 1.522376, 6e-7],
    ['N-BK7', 656.2725, 1.514322, 6e-7],
    ['sapphire', 587.5618, 1.768234, 6e-7],
    ['sapphire', 1064, 1.754537, 6e-7],
    ['MgF2', 587.5618, 1.377744, 6e-7],
    ['MgF2-e', 587.5618, 1.389557, 6e-7],
    ['CaF2', 587.5618, 1.43388, 6e-7],
    ['CaF2', 5000, 1.399004, 6e-7],
    ['ZnS', 632.8, 2.350488, 6e-7],
    ['ZnS', 10000, 2.200658, 6e-7],
    ['ZnSe', 632.8, 2.59109, 6e-7],
    ['ZnSe', 10600, 2.402781, 6e-7],
    ['Si-infrared', 4000, 3.429379, 6e-7],
    ['Si-infrared', 10000, 3.421525, 6e-7],
    ['Si', 1550, 3.477724, 6e-7],
    ['Si', 10000, 3.417762, 6e-7],
    ['Ge', 4000, 4.024721, 6e-7],
    ['Ge', 10000, 4.004003, 6e-7],
    ['TiO2', 587.5618, 2.614265, 6e-7],
    ['TiO2-e', 587.5618, 2.910351, 6e-7],
    // The fits of ours through rows of films, and the row that none of them went through.
    ['Ta2O5', 400, 2.246896, 1e-6],
    ['Ta2O5', 550, 2.157262, 1e-6],
    ['Ta2O5', 632, 2.135927, 3e-5],
    ['Ta2O5', 1000, 2.098955, 1e-6],
    ['Nb2O5', 400, 2.544428, 1e-6],
    ['Nb2O5', 550, 2.360317, 1e-6],
    ['Nb2O5', 1000, 2.258265, 1e-6],
    ['SiO2', 550, 1.479093, 1e-6],
    ['SiO2', 632, 1.476172, 1e-6],
    ['SiO2', 1064, 1.470253, 1e-6],
  ])('%s at %d nm: %f', (name, nm, n, tolerance) => {
    expect(Math.abs(at(name, nm)[0] - n)).toBeLessThan(tolerance)
  })

  test('N-BK7 and fused silica have their Abbe numbers', () => {
    const abbe = (name: string) => (at(name, 587.5618)[0] - 1) / (at(name, 486.1327)[0] - at(name, 656.2725)[0])
    expect(abbe('N-BK7')).toBeCloseTo(64.167, 2)
    expect(abbe('fused-silica')).toBeCloseTo(67.82, 2)
  })

  // The wavelengths are those of the energies of the table, rounded to 0.1 nm: 3.12, 2.50, 2.26, 2.01, 1.88, 1.51, 1.14 eV.
  test.each([
    [3.12, [0.05, 2.07], [1.47, 1.952], [1.32, 2.116]],
    [2.5, [0.05, 3.093], [1.04, 1.833], [1.22, 2.564]],
    [2.26, [0.06, 3.586], [0.43, 2.455], [1.02, 2.577]],
    [2.01, [0.06, 4.152], [0.21, 3.272], [0.3, 3.205]],
    [1.88, [0.05, 4.483], [0.14, 3.697], [0.22, 3.747]],
    [1.51, [0.04, 5.727], [0.16, 5.083], [0.26, 5.18]],
    [1.14, [0.04, 7.795], [0.27, 7.15], [0.36, 7.217]],
  ])('silver, gold and copper at %f eV', (eV, ...wanted) => {
    ;['Ag', 'Au', 'Cu'].forEach((name, i) => {
      const [n, k] = at(name, 1239.8419843320025 / eV)
      expect(n).toBeCloseTo(wanted[i][0], 10)
      expect(k).toBeCloseTo(wanted[i][1], 10)
    })
  })

  // Rows of another evaluation (Rakic 1995) than the model (1998): they differ, by no more than the remark says.
  test.each([
    [413.28, 0.52135, 5.0008],
    [563.57, 1.0728, 6.7839],
    [652.25, 1.5724, 7.7354],
    [999.88, 1.4359, 9.4939],
    [2066.4, 2.4738, 20.982],
  ])('aluminium at %f nm', (nm, n, k) => {
    const [foundN, foundK] = at('Al', nm)
    expect(Math.abs(foundN / n - 1)).toBeLessThan(0.1)
    expect(Math.abs(foundK / k - 1)).toBeLessThan(0.04)
  })

  test('what absorbs in the blue is listed as clear where it is', () => {
    expect(at('Ta2O5', 400)[1]).toBeCloseTo(3.27e-4, 12)
    expect(at('Nb2O5', 400)[1]).toBeCloseTo(1.046e-3, 12)
    expect(at('Ta2O5', 632)[1]).toBe(0)
    expect(opticalConstants(opticalMaterial('Ta2O5'), [550, 700]).extinction).toBe(0)
    expect(opticalConstants(opticalMaterial('Ta2O5'), [549, 700]).extinction).toBeTypeOf('function')
  })
})

describe('the list', () => {
  test('has no name twice, nor one of a material of electrons', () => {
    const names = opticalMaterials.map(({ name }) => name)
    expect(new Set(names).size).toBe(names.length)
    for (const name of names) expect(isMaterial(name)).toBe(false)
  })

  test('has a source beside every number, and every row in order', () => {
    for (const material of opticalMaterials) {
      const numbers = opticalNumbers(material)
      expect(numbers.length, material.name).toBeGreaterThan(0)
      for (const { name, value, source } of numbers) {
        expect(Number.isFinite(value), `${material.name} ${name}`).toBe(true)
        expect(source.length, `${material.name} ${name}`).toBeGreaterThan(5)
      }
      const { dispersion } = material
      if (dispersion.kind !== 'table') continue
      dispersion.rows.forEach(([where], i) => void (i > 0 && expect(where).toBeGreaterThan(dispersion.rows[i - 1][0])))
      // Rows reach as far as the range says.
      const ends = [dispersion.rows[0][0], dispersion.rows[dispersion.rows.length - 1][0]].map((eV) => 1239.842 / eV)
      expect(material.rangeNm[0]).toBeGreaterThan(ends[1])
      expect(material.rangeNm[1]).toBeLessThan(ends[0])
    }
  })

  test('has a positive index that is finite over every range, and never amplifies', () => {
    for (const { name, rangeNm } of opticalMaterials) {
      for (let i = 0; i <= 400; i++) {
        const [n, k] = at(name, rangeNm[0] + ((rangeNm[1] - rangeNm[0]) * i) / 400)
        expect(n > 0 && n < 6, `${name} ${i}`).toBe(true)
        expect(k >= 0 && k < 40, `${name} ${i}`).toBe(true)
      }
    }
  })

  test('refuses a wavelength outside a range, with both', () => {
    expect(() => at('SiO2', 1300)).toThrow('SiO2 is listed from 400 to 1100 nm, not at 1300 nm.')
    expect(() => at('Ag', 250)).toThrow('Ag is listed from 321 to 1937 nm')
    expect(() => at('N-BK7', 299.9)).toThrow('N-BK7')
    expect(at('N-BK7', 299.99)[0]).toBeGreaterThan(1.5)
  })

  test('names what a misspelt medium may mean', () => {
    expect(() => opticalMaterial('fused silica')).toThrow('Did you mean fused-silica?')
    expect(() => opticalMaterial('SiO')).toThrow('SiO2')
    expect(() => opticalMaterial('GaAs')).toThrow('Unknown medium of light "GaAs".')
  })
})

describe('tables', () => {
  test('are met at their rows, and stay between neighbouring rows', () => {
    const x = [1, 2, 2.5, 4, 7, 8]
    const y = [0, 1, 5, 5, 2, 2.5]
    const of = monotoneCubic(x, y)
    x.forEach((at, i) => void expect(of(at)).toBeCloseTo(y[i], 14))
    for (let i = 0; i + 1 < x.length; i++) {
      for (let t = 0; t <= 1; t += 0.05) {
        const value = of(x[i] + t * (x[i + 1] - x[i]))
        expect(value).toBeGreaterThanOrEqual(Math.min(y[i], y[i + 1]) - 1e-14)
        expect(value).toBeLessThanOrEqual(Math.max(y[i], y[i + 1]) + 1e-14)
      }
    }
  })

  test('have slopes that agree on both sides of a row', () => {
    const of = monotoneCubic([400, 500, 700, 800], [1.9, 1.7, 1.65, 1.64])
    for (const at of [500, 700]) {
      const h = 1e-4
      expect(Math.abs((of2(at + h) - of2(at)) / h - (of2(at) - of2(at - h)) / h)).toBeLessThan(1e-6)
    }
    function of2(at: number): number {
      return of(at)
    }
  })

  test('are straight between two rows, and hit a straight line anywhere', () => {
    const line = monotoneCubic([0, 1, 3, 4], [1, 3, 7, 9])
    for (const at of [0.3, 1.7, 2.9, 3.5]) expect(line(at)).toBeCloseTo(1 + 2 * at, 13)
    const two = monotoneCubic([0, 2], [1, 5])
    expect(two(0.5)).toBeCloseTo(2, 14)
  })

  test('of a user absorb where they say so', () => {
    const clear = tableConstants('film', [
      [400, 2.1, 0],
      [800, 2, 0],
    ])
    expect(clear.extinction).toBe(0)
    const grey = tableConstants('film', [
      [400, 2.1, 0.01],
      [800, 2, 0],
    ])
    expect((grey.extinction as (nm: number) => number)(600)).toBeCloseTo(0.005, 12)
    expect(() => (grey.index as (nm: number) => number)(900)).toThrow('film is listed from 400 to 800 nm')
  })
})

import { describe, expect, test } from 'vitest'
import {
  isMaterial,
  listedNumbers,
  materialNames,
  materialNotes,
  materials,
  nearest,
  needsX,
} from '../../src/media/index.js'

describe('materials', () => {
  test('every number has a unit and a source that says how it was read', () => {
    for (const material of materials) {
      const numbers = listedNumbers(material)
      expect(numbers.length).toBeGreaterThan(0)
      for (const { name, value, unit, source } of numbers) {
        expect(Number.isFinite(value), `${material.name} ${name}`).toBe(true)
        expect(unit).toMatch(/^(nm|eV|eV\/K|K|m0|GPa)$/)
        expect(source).toMatch(/Vurgaftman.*5815 \(2001\); (two public copies agree|one public copy|from memory)/)
      }
    }
  })

  test('a binary lists its lattice, gap, mass, offset, deformation potentials and elastic constants', () => {
    const names = listedNumbers(materials.find(({ name }) => name === 'InSb')!).map(({ name }) => name)
    expect(names).toHaveLength(10)
  })

  test('names are unique, known, and tell whether they need x', () => {
    expect(new Set(materialNames).size).toBe(materialNames.length)
    expect(materialNames.every(isMaterial)).toBe(true)
    expect(isMaterial('GaAlAs')).toBe(false)
    expect(isMaterial('constructor')).toBe(false)
    expect(materialNames.filter(needsX)).toEqual(['AlGaAs', 'InGaAs', 'InAlAs', 'AlGaSb'])
  })
})

describe('materialNotes', () => {
  test('AlGaAs above x = 0.4 and AlAs warn of the X valley', () => {
    expect(materialNotes('AlGaAs', 0.41, 300)).toHaveLength(1)
    expect(materialNotes('AlGaAs', 0.41, 300)[0]).toContain('X valley')
    expect(materialNotes('AlAs', null, 300)[0]).toContain('X valley')
    expect(materialNotes('AlGaAs', 0.4, 300)).toEqual([])
    expect(materialNotes('InGaAs', 0.9, 300)).toEqual([])
  })

  test('a temperature outside the range of the fits is told', () => {
    expect(materialNotes('GaAs', null, 900)[0]).toContain('900 K is outside 0..400 K')
  })
})

describe('nearest', () => {
  test('finds another case, another order and one wrong letter, the nearest first', () => {
    expect(nearest('gaas', materialNames)[0]).toBe('GaAs')
    expect(nearest('GaAlAs', materialNames)[0]).toBe('AlGaAs')
    expect(nearest('InAlAz', materialNames)[0]).toBe('InAlAs')
    expect(nearest('potental', ['potential', 'mass'])).toEqual(['potential'])
  })

  test('has no suggestion for what is like nothing known', () => {
    expect(nearest('glass', materialNames)).toEqual([])
  })
})

test('a barrier whose X valley lies below its Gamma edge is noted: AlSb, not GaAs', () => {
  expect(materialNotes('AlSb', null, 77).join()).toContain('X valley lies below the Gamma edge')
  expect(materialNotes('GaAs', null, 77)).toEqual([])
})

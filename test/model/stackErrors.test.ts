import { describe, expect, test } from 'vitest'
import {
  type ElectronStack,
  type LightStack,
  resonances,
  StackError,
  spectrum,
  systemOf,
} from '../../src/model/index.js'
import { hardWall } from '../../src/wave/index.js'

const well = { potentialEv: 0, massRel: 0.067 }
const barrier = { potentialEv: 0.3, massRel: 0.092, widthNm: 5 }
const electrons: ElectronStack = {
  kind: 'electron',
  entry: well,
  layers: [barrier, { ...well, widthNm: 6 }, barrier],
  exit: well,
}
const light: LightStack = {
  kind: 'light',
  entry: { index: 1.5 },
  layers: [{ index: 1, widthNm: 300 }],
  exit: { index: 1.5 },
}
const { NaN: nan, POSITIVE_INFINITY: infinity } = Number

describe('a stack without a spectrum is refused with the number', () => {
  test.each<[string, ElectronStack, number[], 'entry' | 'exit', string]>([
    [
      'negative width',
      { ...electrons, layers: [barrier, { ...well, widthNm: -6 }] },
      [0.1],
      'entry',
      'Width of layer 2 is -6 nm',
    ],
    [
      'endless width',
      { ...electrons, layers: [{ ...barrier, widthNm: infinity }] },
      [0.1],
      'entry',
      'Width of layer 1 is Infinity nm',
    ],
    [
      'no width',
      { ...electrons, layers: [{ ...barrier, widthNm: nan }] },
      [0.1],
      'entry',
      'Width of layer 1 is NaN nm',
    ],
    [
      'no potential',
      { ...electrons, exit: { ...well, potentialEv: nan } },
      [0.1],
      'entry',
      'Potential of the exit is NaN eV',
    ],
    ['massless', { ...electrons, entry: { ...well, massRel: 0 } }, [0.1], 'entry', 'Mass of the entry is 0'],
    [
      'negative mass',
      { ...electrons, layers: [{ ...barrier, massRel: -0.1 }] },
      [0.1],
      'entry',
      'Mass of layer 1 is -0.1',
    ],
    [
      'no alpha',
      { ...electrons, layers: [{ ...barrier, alphaPerEv: nan }] },
      [0.1],
      'entry',
      'Alpha of layer 1 is NaN /eV',
    ],
    ['no in-plane', { ...electrons, inPlaneKPerNm: infinity }, [0.1], 'entry', 'In-plane wave number is Infinity /nm'],
    ['no energy', electrons, [0.1, nan], 'entry', 'Point 2 is NaN'],
    ['on the edge', electrons, [0.1, 0], 'entry', 'Point 2 is 0 eV, at or below the edge of the entry (0 eV)'],
    ['below', electrons, [-0.1], 'exit', 'Point 1 is -0.1 eV, at or below the edge of the exit'],
    [
      'closed exit',
      { ...electrons, exit: { ...well, potentialEv: 0.2 } },
      [0.1],
      'exit',
      'Point 1 is 0.1 eV, at or below the edge of the exit (0.2 eV)',
    ],
    [
      'moves along only',
      { ...electrons, inPlaneKPerNm: 0.5 },
      [0.1],
      'entry',
      'with an in-plane wave number of 0.5 /nm',
    ],
    ['wall', { ...electrons, exit: 'hard wall' }, [0.1], 'exit', 'No wave comes from the side of a hard wall'],
    ['broken gap', { ...electrons, layers: [{ ...barrier, alphaPerEv: 6 }] }, [0.1], 'entry', 'Broken gap: at 0.1 eV'],
  ])('electrons, %s', (_, stack, points, from, message) => {
    expect(() => spectrum(stack, points, { from })).toThrow(StackError)
    expect(() => spectrum(stack, points, { from })).toThrow(message)
  })

  test.each<[string, LightStack, number[], 'entry' | 'exit', string]>([
    ['negative width', { ...light, layers: [{ index: 1, widthNm: -1 }] }, [633], 'entry', 'Width of layer 1 is -1 nm'],
    ['no index', { ...light, exit: { index: 0 } }, [633], 'entry', 'Index of the exit is 0'],
    [
      'gain',
      { ...light, layers: [{ index: 1, extinction: -0.1, widthNm: 1 }] },
      [633],
      'entry',
      'Extinction of layer 1 is -0.1',
    ],
    [
      'absorbing entry',
      { ...light, entry: { index: 1.5, extinction: 0.01 } },
      [633],
      'entry',
      'Extinction of the entry is 0.01',
    ],
    [
      'absorbing exit, from there',
      { ...light, exit: { index: 1.5, extinction: 0.01 } },
      [633],
      'exit',
      'Extinction of the exit is 0.01',
    ],
    [
      'absorbing somewhere',
      { ...light, entry: { index: 1.5, extinction: (nm) => (nm < 400 ? 0.1 : 0) } },
      [633, 399],
      'entry',
      'Extinction of the entry is 0.1 at 399 nm',
    ],
    ['grazing', { ...light, angleDeg: 90 }, [633], 'entry', 'Angle is 90 degrees'],
    ['backward', { ...light, angleDeg: -1 }, [633], 'entry', 'Angle is -1 degrees'],
    ['no angle', { ...light, angleDeg: nan }, [633], 'entry', 'Angle is NaN degrees'],
    ['no wavelength', light, [633, 0], 'entry', 'Point 2 is 0 nm'],
    ['endless wavelength', light, [infinity], 'entry', 'Point 1 is Infinity'],
    [
      'plate that absorbs',
      { ...light, exit: { index: 1.5, extinction: 0.01 }, back: { exit: { index: 1 } } },
      [633],
      'entry',
      'Extinction of the exit, a thick plate, is 0.01',
    ],
  ])('light, %s', (_, stack, points, from, message) => {
    expect(() => spectrum(stack, points, { from })).toThrow(StackError)
    expect(() => spectrum(stack, points, { from })).toThrow(message)
  })

  test.each<[[number, number], number, string]>([
    [[0.2, 0.1], 0.02, 'The range is 0.2..0.1 eV'],
    [[0, infinity], 0.02, 'The range is 0..Infinity eV'],
    [[0.1, 0.2], 0, 'The depth is 0 eV'],
  ])('resonances in %j to depth %d', (range, depthEv, message) => {
    expect(() => resonances(electrons, range, { depthEv })).toThrow(message)
  })

  test('resonances of light from 0 eV', () => {
    expect(() => resonances(light, [0, 2])).toThrow('Photon energies are above 0')
  })
})

describe('systemOf', () => {
  test('equal regions share a medium, leads too, and rows stay layers', () => {
    const { media, stack } = systemOf(electrons)
    expect(media.count).toBe(2)
    expect(stack.entry).toBe(stack.exit)
    expect([...stack.medium]).toEqual([1, 0, 1])
    expect([...stack.width]).toEqual([5, 6, 5])
  })

  test('alpha 0 and no alpha are equal; one digit of a potential is not', () => {
    const layers = [
      { ...well, alphaPerEv: 0, widthNm: 1 },
      { ...well, potentialEv: 1e-15, widthNm: 1 },
    ]
    expect(systemOf({ ...electrons, layers }).media.count).toBe(2)
  })

  test('a hard wall is no medium', () => {
    expect(systemOf({ ...electrons, exit: 'hard wall' }).stack.exit).toBe(hardWall)
  })

  test('equal glasses share a medium, the same function too', () => {
    const index = (nm: number) => 1.45 + 3000 / (nm * nm)
    const layers = [
      { index, widthNm: 10 },
      { index: 1, widthNm: 10 },
      { index, extinction: 0, widthNm: 10 },
    ]
    const { media, stack } = systemOf({ ...light, layers })
    expect(media.count).toBe(3)
    expect(stack.medium[0]).toBe(stack.medium[2])
  })
})

import { describe, expect, test } from 'vitest'
import { type Job, type MediumOption, parseLayers } from '../../src/job/index.js'
import { bandParameters, hbar2Over2m0 } from '../../src/media/index.js'
import {
  buildSystem,
  type ElectronStack,
  resolveMedium,
  StackError,
  situationOf,
  stackOf,
} from '../../src/model/index.js'

const gaAs: MediumOption = { kind: 'material', material: 'GaAs', x: null }
const low: MediumOption = { kind: 'numbers', name: 'low', potentialEv: [0], massRel: [0.07], alphaPerEv: [0.5] }
const cold = { name: '', temperatureK: 77, biasV: 0, inPlaneEv: 0, angleDeg: 0, polarisation: 's' }

function job(stack: Partial<Job['stack']> = {}, startsAt: 'entry' | 'exit' = 'exit', conditions = [cold]): Job {
  const whole = {
    entry: gaAs,
    exit: gaAs,
    layers: [],
    mirror: false,
    massModel: 'two-band',
    strainedTo: null,
    biasOver: null,
    ...stack,
  }
  return { kind: 'electron', conditions, stack: whole, growth: { startsAt } } as unknown as Job
}

const rows = parseLayers('material,x,ml\nAlGaAs,0.35,12\nGaAs,,18\nAlGaAs,0.35,12\n', 'layers.csv')

describe('situationOf', () => {
  test('layers are strained to the lead at the side of the substrate', () => {
    const stack = { entry: gaAs, exit: { kind: 'material', material: 'InP', x: null } as const }
    expect(situationOf(job(stack, 'exit'), cold).substrateNm).toBe(0.58697)
    expect(situationOf(job(stack, 'entry'), cold).substrateNm).toBe(0.565325)
  })

  test('`strained to` names another crystal or none', () => {
    expect(situationOf(job({ strainedTo: 'InP' }), cold).substrateNm).toBe(0.58697)
    expect(situationOf(job({ strainedTo: 'none' }), cold).substrateNm).toBeNull()
  })

  test('a lead by numbers and a hard wall strain nothing', () => {
    expect(situationOf(job({ exit: low }), cold).substrateNm).toBeNull()
    expect(situationOf(job({ exit: 'hard wall' }), cold).substrateNm).toBeNull()
    expect(situationOf(job({ exit: 'hard wall' }, 'entry'), cold).substrateNm).toBe(0.565325)
  })

  test('lattice constants are those of 300 K at every temperature', () => {
    const alloy: MediumOption = { kind: 'material', material: 'InGaAs', x: [0.53] }
    const stack = job({ entry: alloy, exit: alloy })
    expect(situationOf(stack, cold).substrateNm).toBe(bandParameters('InGaAs', 0.53, 300).latticeNm)
  })

  test('in-plane energy is kinetic energy of the entry: at that energy above its edge nothing moves forward', () => {
    const { entry, inPlaneKPerNm } = situationOf(job(), { ...cold, inPlaneEv: 0.04 })
    const { massRel, alphaPerEv } = resolveMedium(entry, situationOf(job(), cold)).region
    expect((massRel * (1 + alphaPerEv * 0.04) * 0.04) / hbar2Over2m0 - inPlaneKPerNm * inPlaneKPerNm).toBeCloseTo(0, 15)
  })

  test('a lead that leaves a choice is refused', () => {
    const pick: MediumOption = { kind: 'material', material: 'AlGaAs', x: [0.1, 0.2] }
    expect(() => situationOf(job({ entry: pick }), cold)).toThrow(
      'The x of AlGaAs of the entry has 2 values (0.1, 0.2). Give one.',
    )
  })
})

describe('stackOf', () => {
  test('is the system that a search builds of the same layers', () => {
    const stack = stackOf(job(), rows) as ElectronStack
    const situation = situationOf(job(), cold)
    const layers = rows.map(({ medium, ml }, i) => ({
      choice: medium,
      widthNm: ml! * resolveMedium(rows[i].medium, situation).monolayerNm!,
    }))
    const system = buildSystem(situation, layers)
    expect([...system.stack.width]).toEqual(stack.layers.map(({ widthNm }) => widthNm))
    expect([...system.stack.medium]).toEqual([1, 0, 1])
    expect(stack.layers[1]).toMatchObject(stack.entry)
    expect(stack.exit).toEqual(stack.entry)
  })

  test('monolayers are those of 300 K whatever the temperature', () => {
    const [at77, at300] = [77, 300].map((temperatureK) => stackOf(job({}, 'exit', [{ ...cold, temperatureK }]), rows))
    expect(at77.layers.map(({ widthNm }) => widthNm)).toEqual(at300.layers.map(({ widthNm }) => widthNm))
    expect(at77.layers[0]).not.toEqual(at300.layers[0])
  })

  test('a width in nm stands as written, numbers keep theirs', () => {
    const mixed = parseLayers(
      'material,x,potential_eV,mass_rel,width_nm\nAlGaAs,0.35,,,3.3\nlow,,0.1,0.07,2.5\n',
      'own.csv',
    )
    const stack = stackOf(job(), mixed) as ElectronStack
    expect(stack.layers.map(({ widthNm }) => widthNm)).toEqual([3.3, 2.5])
    expect(stack.layers[1]).toEqual({ potentialEv: 0.1, massRel: 0.07, alphaPerEv: 0, widthNm: 2.5 })
  })

  test('ml and width_nm that agree are one width, those that do not are refused', () => {
    const text = (nm: string) => parseLayers(`material,ml,width_nm\nGaAs,18,${nm}\n`, 'own.csv')
    expect(stackOf(job(), text('5.08793')).layers[0].widthNm).toBe(18 * 0.2826625)
    expect(() => stackOf(job(), text('5.1'))).toThrow(StackError)
    expect(() => stackOf(job(), text('5.1'))).toThrow('own.csv:2  ml is 18, which is 5.08792')
  })

  test('takes a condition by its name, the first without one', () => {
    const hot = { ...cold, name: 'hot', temperatureK: 300 }
    const both = job({}, 'exit', [{ ...cold, name: 'cold' }, hot])
    expect(stackOf(both, rows, 'hot')).toEqual(stackOf(job({}, 'exit', [hot]), rows))
    expect(stackOf(both, rows)).toEqual(stackOf(job(), rows))
    expect(() => stackOf(both, rows, 'warm')).toThrow('The job has no condition "warm". It has "cold", "hot".')
  })

  test('layers of material under leads by numbers have no zero', () => {
    expect(() => stackOf(job({ entry: low, exit: low }), rows)).toThrow('AlGaAs has no potential here')
  })
})

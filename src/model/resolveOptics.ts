import { type OpticalConstants, opticalConstants, opticalMaterial, tableConstants } from '../media/index.js'
import { StackError } from './StackError.js'
import type { LightSituation, MediumChoice, OfWavelength, ResolvedOptics } from './types.js'

/**
 * n + i kappa of a medium. Beyond the wavelengths that it is listed for the last value stays: a job's scan lies inside, but a pole is
 * looked for a little outside. Throws MaterialError for a medium that does not exist.
 */
export function resolveOptics(choice: MediumChoice, { referenceNm, rangeNm }: LightSituation): ResolvedOptics {
  const { index, extinction } = constantsOf(choice, rangeNm)
  const n = valueAt(index, referenceNm)
  return {
    kind: 'light',
    medium: { index, extinction },
    index: n,
    extinction: valueAt(extinction, referenceNm),
    quarterNm: referenceNm / (4 * n),
    monolayerNm: null,
    strain: null,
  }
}

/** Built-in media by name, tables by themselves: equal media are the same functions, and cost their set-up once. */
const named = new Map<string, OpticalConstants>()
const tables = new WeakMap<object, OpticalConstants>()

function constantsOf(choice: MediumChoice, rangeNm: LightSituation['rangeNm']): OpticalConstants {
  switch (choice.kind) {
    case 'index':
      return choice
    case 'material': {
      const { own } = choice
      if (own) {
        const { own: _own, ...listed } = choice
        const { index, extinction } = constantsOf(listed, rangeNm)
        return { index: own.index ?? index, extinction: own.extinction ?? extinction }
      }
      const key = `${choice.material} ${rangeNm?.join(' ')}`
      const known = named.get(key)
      if (known) return known
      const material = opticalMaterial(choice.material)
      const constants = held(opticalConstants(material, rangeNm ?? undefined), material.rangeNm)
      named.set(key, constants)
      return constants
    }
    case 'table': {
      const known = tables.get(choice.rows)
      if (known) return known
      const { name, rows } = choice
      const constants = held(tableConstants(name, rows), [rows[0][0], rows[rows.length - 1][0]])
      tables.set(rows, constants)
      return constants
    }
    case 'numbers':
      throw new StackError('A medium of electrons has no refractive index.')
  }
}

function held({ index, extinction }: OpticalConstants, [from, to]: readonly [number, number]): OpticalConstants {
  const inside = (of: OfWavelength): OfWavelength =>
    typeof of === 'number' ? of : (nm) => of(nm < from ? from : nm > to ? to : nm)
  return { index: inside(index), extinction: inside(extinction) }
}

function valueAt(of: OfWavelength, nm: number): number {
  return typeof of === 'number' ? of : of(nm)
}

import {
  isOptical,
  type ListedNumber,
  listedNumbers,
  material,
  materialNames,
  materialNotes,
  nearest,
  opticalMaterial,
  opticalNames,
  opticalNumbers,
} from '../media/index.js'
import { print } from './console.js'
import { exitCode } from './exitCodes.js'
import { table } from './table.js'
import { UsageError } from './UsageError.js'

/** Prints the built-in materials, or the numbers of one and where each comes from. */
export function materials(name: string | undefined): number {
  if (name === undefined) {
    print('For electrons:')
    print(table([['material', 'what'], ...materialNames.map((one) => [one, kindOf(one)])]))
    print('For light:')
    print(table([['material', 'what'], ...opticalNames.map((one) => [one, opticalKind(one)])]))
    return exitCode.done
  }
  if (isOptical(name)) return optical(name)
  if (!materialNames.includes(name)) {
    const known = [...materialNames, ...opticalNames]
    const near = nearest(name, known)
    const remedy = near.length > 0 ? `Did you mean ${near.join(' or ')}?` : `There are ${known.join(', ')}.`
    throw new UsageError(`"${name}" is no built-in material. ${remedy}`)
  }
  const found = material(name)
  print(`${name}  ${kindOf(name)}`)
  printNumbers(listedNumbers(found))
  print(`Meant for ${found.temperatureK[0]}..${found.temperatureK[1]} K.`)
  const parts = found.kind === 'alloy' ? found.xRange[1] : null
  for (const note of materialNotes(name, parts, 300)) print(note)
  return exitCode.done
}

function optical(name: string): number {
  const found = opticalMaterial(name)
  const { rangeNm, remarks } = found
  print(`${name}  ${opticalKind(name)}`)
  printNumbers(opticalNumbers(found))
  print(`Meant for ${rangeNm[0]}..${rangeNm[1]} nm; outside is an error.`)
  for (const remark of remarks) print(remark)
  return exitCode.done
}

function printNumbers(numbers: readonly ListedNumber[]): void {
  const rows = numbers.map(({ name, value, unit, source }) => [name, String(value), unit, source])
  print(table([['number', 'value', 'unit', 'source'], ...rows]))
}

function opticalKind(name: string): string {
  const { title, form } = opticalMaterial(name)
  return form === 'gas' ? title : `${title} (${form})`
}

function kindOf(name: string): string {
  const found = material(name)
  return found.kind === 'binary' ? 'binary' : `alloy, x = ${found.x}, ${found.xRange[0]}..${found.xRange[1]}`
}

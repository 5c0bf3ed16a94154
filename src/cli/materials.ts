import { listedNumbers, material, materialNames, materialNotes, nearest } from '../media/index.js'
import { print } from './console.js'
import { exitCode } from './exitCodes.js'
import { table } from './table.js'
import { UsageError } from './UsageError.js'

/** Prints the built-in materials, or the numbers of one and where each comes from. */
export function materials(name: string | undefined): number {
  if (name === undefined) {
    print(table([['material', 'what'], ...materialNames.map((one) => [one, kindOf(one)])]))
    return exitCode.done
  }
  if (!materialNames.includes(name)) {
    const near = nearest(name, materialNames)
    const remedy = near.length > 0 ? `Did you mean ${near.join(' or ')}?` : `There are ${materialNames.join(', ')}.`
    throw new UsageError(`"${name}" is no built-in material. ${remedy}`)
  }
  const found = material(name)
  print(`${name}  ${kindOf(name)}`)
  const rows = listedNumbers(found).map(({ name: what, value, unit, source }) => [what, String(value), unit, source])
  print(table([['number', 'value', 'unit', 'source'], ...rows]))
  print(`Meant for ${found.temperatureK[0]}..${found.temperatureK[1]} K.`)
  const parts = found.kind === 'alloy' ? found.xRange[1] : null
  for (const note of materialNotes(name, parts, 300)) print(note)
  return exitCode.done
}

function kindOf(name: string): string {
  const found = material(name)
  return found.kind === 'binary' ? 'binary' : `alloy, x = ${found.x}, ${found.xRange[0]}..${found.xRange[1]}`
}

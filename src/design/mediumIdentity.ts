import { createHash } from 'node:crypto'
import { canonicalJson, type Override } from '../job/index.js'
import type { MediumChoice } from '../model/index.js'

/** What makes a medium what it is, for the canonical JSON of a stack: material and x, or numbers. Names given to numbers play no part. */
export function mediumIdentity(choice: MediumChoice): Record<string, unknown> {
  switch (choice.kind) {
    case 'material':
      return {
        material: choice.material,
        ...(choice.x === null ? {} : { x: choice.x }),
        ...(choice.own ? { own: numbersOf(choice.own) } : {}),
      }
    case 'numbers': {
      const { potentialEv, massRel, alphaPerEv } = choice
      return { potentialEv, massRel, alphaPerEv }
    }
    case 'index':
      return { index: choice.index, extinction: choice.extinction }
    case 'table':
      return { table: digestOf(choice.rows) }
  }
}

/** Equal for equal media, whatever their names. */
export function mediumKey(choice: MediumChoice): string {
  switch (choice.kind) {
    case 'material': {
      const listed = choice.x === null ? choice.material : `${choice.material}(${choice.x})`
      return choice.own ? `${listed}${canonicalJson(numbersOf(choice.own))}` : listed
    }
    case 'numbers':
      return `[${choice.potentialEv} ${choice.massRel} ${choice.alphaPerEv}]`
    case 'index':
      return `[${choice.index} ${choice.extinction}]`
    case 'table':
      return `[${digestOf(choice.rows)}]`
  }
}

function numbersOf({ name: _name, ...numbers }: Override): Omit<Override, 'name'> {
  return numbers
}

const digests = new WeakMap<object, string>()

function digestOf(rows: object): string {
  let digest = digests.get(rows)
  if (digest === undefined) {
    digest = createHash('sha256').update(canonicalJson(rows)).digest('hex').slice(0, 12)
    digests.set(rows, digest)
  }
  return digest
}

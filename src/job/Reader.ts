import type { Problems } from './Problems.js'
import { type Complaint, type DimensionName, parseQuantity, type Quantity } from './quantities.js'
import type { Path } from './YamlSource.js'

/** Reads single values out of a job whose shape is right; complains once and gives null where one is not in order. */
export class Reader {
  constructor(readonly problems: Problems) {}

  quantity(value: string | number | undefined, path: Path, name: DimensionName): Quantity | null {
    if (value === undefined) return null
    // As written where it is a plain number: 0.10 stays 0.10 in a message. An alias is not.
    const text = this.problems.source.written(path)
    const written = typeof value === 'number' && Number(text) === value ? text : value
    const label = String(path[path.length - 1])
    const read = parseQuantity(
      typeof path[path.length - 1] === 'number' ? String(path[path.length - 2]) : label,
      written,
      name,
    )
    if (!isComplaint(read)) return read
    this.problems.add(path, read.rule, read.remedy)
    return null
  }

  /** A single number with its unit, no range. */
  single(value: string | number | undefined, path: Path, name: DimensionName): number | null {
    const quantity = this.quantity(value, path, name)
    if (quantity === null || !quantity.range) return quantity?.to ?? null
    const unit = quantity.unit ? ` ${quantity.unit}` : ''
    this.complain(path, 'is a range, where one number is expected', `Write one, like "${quantity.written[1]}${unit}".`)
    return null
  }

  /** A range of two different ends. */
  range(value: string | number | undefined, path: Path, name: DimensionName): Quantity | null {
    const quantity = this.quantity(value, path, name)
    if (quantity === null) return null
    const { from, to, step, unit } = quantity
    const wide = `Write "from..to ${unit}", the first below the second.`
    if (step !== null) this.complain(path, 'takes no step', wide)
    else if (!(from < to)) this.complain(path, 'needs two different ends', wide)
    else return quantity
    return null
  }

  whole(value: number | undefined, path: Path, from: number, to: number): number | null {
    if (value === undefined) return null
    if (Number.isInteger(value) && value >= from && value <= to) return value
    this.complain(path, `is no whole number within ${from}..${to}`, 'Write one of these.')
    return null
  }

  /** A share, above 0 and at most 1. */
  share(value: number | undefined, path: Path): number | null {
    if (value === undefined) return null
    if (value > 0 && value <= 1) return value
    this.complain(path, 'is outside 0..1', 'Write a number above 0 and at most 1, like 0.8.')
    return null
  }

  /** `key "value" what.` at the value. */
  complain(path: Path, what: string, remedy: string): void {
    const label = [...path].reverse().find((part) => typeof part === 'string')
    this.problems.add(path, `${label} ${this.problems.quoted(path)} ${what}.`, remedy)
  }
}

export function isComplaint(value: object | number): value is Complaint {
  return typeof value === 'object' && 'rule' in value
}

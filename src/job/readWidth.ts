import { stepsBetween } from './decimal.js'
import type { MediumOption, WidthSpec } from './job.js'
import type { Reader } from './Reader.js'
import type { Path } from './YamlSource.js'

/** Thicker than any layer that an electron tunnels through or rings in; a slip of the unit. */
const widest = { ML: 40_000, nm: 100_000, qw: 1000 }

/**
 * A width in whole monolayers, in nm or, of light, in quarter waves. `media` are what the layer may be made of (null when that was wrong); media by
 * numbers have no monolayer. `stepNm` is growth.step, null where the job has none.
 */
export function readWidth(
  value: string | number | undefined,
  path: Path,
  media: readonly MediumOption[] | null,
  stepNm: number | null,
  electrons: boolean,
  reader: Reader,
): WidthSpec | null {
  const quantity = reader.quantity(value, path, electrons ? 'width' : 'filmWidth')
  if (quantity === null) return null
  const unit = quantity.unit === 'ML' || quantity.unit === 'qw' ? quantity.unit : 'nm'
  const { from, to, step, range } = quantity
  const written = quantity.written
  if (from < 0) {
    reader.complain(
      path,
      'is negative',
      `Write "${Math.abs(written[0])}${range ? `..${written[1]}` : ''} ${quantity.unit}".`,
    )
    return null
  }
  if (to === 0) {
    reader.complain(
      path,
      'is no width',
      `Leave the layer out, or let the search choose: "0..${unit === 'ML' ? 5 : 50} ${quantity.unit}".`,
    )
    return null
  }
  if (to > widest[unit]) {
    reader.complain(
      path,
      `is more than ${widest[unit]} ${unit}`,
      'No layer of a tunnelling filter is so thick. Check the unit.',
    )
    return null
  }
  const byNumbers = !electrons || (media?.some((option) => option.kind === 'numbers') ?? false)
  if (unit === 'ML') {
    if (![from, to, step ?? 1].every(Number.isInteger)) {
      const whole = `${Math.round(from)}${range ? `..${Math.round(to)}` : ''} ML`
      reader.complain(path, 'counts monolayers, which come whole', `Write "${whole}", or give nm.`)
      return null
    }
    if (byNumbers) {
      const nm = [from, to].map((count) => Math.round(count * 2.827) / 10)
      const remedy = `Write nm: "${range ? `${nm[0]}..${nm[1]}` : nm[0]} nm".`
      reader.complain(path, 'is in monolayers, which a medium given by numbers does not have', remedy)
      return null
    }
  }
  if (from < to && unit === 'nm') {
    // Without a step of its own, a range of a material is in whole monolayers of the material, which are not known here.
    const grid = step ?? stepNm ?? (byNumbers ? 0.1 : null)
    if (grid !== null && stepsBetween(0, to, grid) < Math.ceil(from / grid - 1e-9)) {
      reader.complain(path, `holds no whole multiple of the step of ${grid} nm`, 'Widen it, or write a finer step.')
      return null
    }
  }
  return { unit, from, to, step }
}

import { hcEvNm, opticalConstants, opticalMaterial } from '../media/index.js'
import type { MediumOption, StackSpec } from './job.js'
import type { Problems } from './Problems.js'
import type { PlacedLayer } from './readStack.js'
import type { SpectralRange } from './spectral.js'
import type { Path } from './YamlSource.js'

/** Every medium of light has to be listed over the whole scan, and the entry must not absorb in it. */
export function checkOptics(
  { entry, exit, back, referenceNm }: StackSpec,
  layers: readonly PlacedLayer[],
  scan: SpectralRange,
  problems: Problems,
): void {
  const [fromNm, toNm] = [hcEvNm / scan.highEv, hcEvNm / scan.lowEv]
  covers(entry, ['stack', 'entry'])
  if (exit !== 'hard wall') covers(exit, ['stack', 'exit'])
  if (back) covers(back.behind, ['stack', 'back', 'then'])
  for (const { spec, path } of layers) for (const option of spec.media ?? []) covers(option, [...path, 'material'])
  if (absorbs(entry)) {
    const rule = 'The entry absorbs within the scan, where no incoming wave is defined.'
    problems.add(['stack', 'entry'], rule, 'Write a lossless entry, like "air", and make this a layer.')
  }
  if (back && exit !== 'hard wall' && absorbs(exit)) {
    const rule = 'The exit absorbs within the scan: nothing comes back from behind a thick plate of it.'
    problems.add(['stack', 'exit'], rule, 'Take "back" out, or name a lossless plate.')
  }

  function covers(option: MediumOption, path: Path): void {
    const range = rangeOf(option)
    if (range === null) return
    const [from, to] = range
    // A scan that ends where the list ends may have been rounded once.
    const ends = [fromNm >= from * (1 - 1e-9), toNm <= to * (1 + 1e-9)]
    const name = option.kind === 'material' ? option.material : option.kind === 'table' ? option.name : ''
    const table = option.kind === 'table' ? 'extend the table' : `give ${name} by a table of your own`
    const remedy = `Narrow the scan to what all media cover, or ${table}.`
    if (!ends[0] || !ends[1]) {
      const rule = `${name} is listed from ${short(from)} to ${short(to)} nm, but the scan goes from ${short(fromNm)} to ${short(toNm)} nm.`
      problems.add(path, rule, remedy)
    } else if (referenceNm !== null && !(referenceNm >= from && referenceNm <= to)) {
      const rule = `${name} is listed from ${short(from)} to ${short(to)} nm, which leaves out the reference, ${short(referenceNm)} nm.`
      problems.add(path, rule, 'Choose another "reference".')
    }
  }

  function absorbs(option: MediumOption): boolean {
    if (option.kind === 'index') return option.extinction.some((value) => value > 0)
    if (option.kind === 'table')
      return option.rows.some(
        ([nm, , k], i) => k > 0 && (option.rows[i + 1]?.[0] ?? nm) >= fromNm && (option.rows[i - 1]?.[0] ?? nm) <= toNm,
      )
    if (option.kind !== 'material') return false
    if (option.own?.extinction !== undefined) return option.own.extinction > 0
    const { extinction } = opticalConstants(opticalMaterial(option.material), [fromNm, toNm])
    if (typeof extinction === 'number') return extinction > 0
    const [from, to] = rangeOf(option)!
    const steps = 16
    return Array.from({ length: steps + 1 }, (_, i) => fromNm + ((toNm - fromNm) * i) / steps)
      .filter((nm) => nm >= from && nm <= to)
      .some((nm) => extinction(nm) > 0)
  }
}

function rangeOf(option: MediumOption): readonly [number, number] | null {
  if (option.kind === 'material') return opticalMaterial(option.material).rangeNm
  if (option.kind === 'table') return [option.rows[0][0], option.rows[option.rows.length - 1][0]]
  return null
}

function short(nm: number): string {
  return String(Number(nm.toPrecision(6)))
}

import { hcEvNm } from '../media/index.js'
import type { Axis, Kind } from './job.js'
import { pointsOf, type Quantity } from './quantities.js'
import type { Reader } from './Reader.js'
import type { Path } from './YamlSource.js'

/** A range of energies, or of the vacuum wavelengths of light, as written and in eV. */
export interface SpectralRange {
  readonly axis: Axis
  readonly written: Quantity
  readonly lowEv: number
  readonly highEv: number
}

/** One place on either axis. */
export interface SpectralPlace {
  readonly axis: Axis
  readonly value: number
  readonly energyEv: number
}

/** Electrons have energies; light is told by wavelengths, or by photon energies where the unit says so. */
export function axisOf(value: string | number | undefined, kind: Kind): Axis {
  return kind === 'electron' || /e\s?V\b/i.test(String(value)) ? 'eV' : 'nm'
}

export const dimensionOn = { eV: 'energy', nm: 'wavelength' } as const

/** From an axis to eV and back. */
export function otherAxis(axis: Axis, value: number): number {
  return axis === 'eV' ? value : hcEvNm / value
}

/** Null where it is not in order; wavelengths are above 0. */
export function readSpectralRange(
  value: string | number | undefined,
  path: Path,
  kind: Kind,
  reader: Reader,
): SpectralRange | null {
  const axis = axisOf(value, kind)
  const written = reader.range(value, path, dimensionOn[axis])
  if (written === null) return null
  if (axis === 'eV') return { axis, written, lowEv: written.from, highEv: written.to }
  if (!(written.from > 0)) {
    reader.complain(path, 'starts at or below 0', `Write "400..${Math.max(700, written.written[1])} ${written.unit}".`)
    return null
  }
  return { axis, written, lowEv: hcEvNm / written.to, highEv: hcEvNm / written.from }
}

export function readSpectralPlace(
  value: string | number | undefined,
  path: Path,
  kind: Kind,
  reader: Reader,
): SpectralPlace | null {
  const axis = axisOf(value, kind)
  const single = reader.single(value, path, dimensionOn[axis])
  if (single === null) return null
  if (axis === 'nm' && !(single > 0)) {
    reader.complain(path, 'is not above 0', 'Write a wavelength, like "633 nm".')
    return null
  }
  return { axis, value: single, energyEv: otherAxis(axis, single) }
}

/** Points evenly spaced over a range in the unit that it is written in; eV, ascending. */
export function energiesIn({ axis, written }: SpectralRange, count: number): number[] {
  const points = pointsOf(written, count)
  return axis === 'eV' ? points : points.map((nm) => hcEvNm / nm).reverse()
}

/** The energies (eV) that lie within `reach` of the centre of a line. */
export function energiesAround(
  { axis, centre }: { readonly axis: Axis; readonly centre: number },
  reach: number,
): readonly [number, number] {
  if (axis === 'eV') return [centre - reach, centre + reach]
  return [hcEvNm / (centre + reach), reach < centre ? hcEvNm / (centre - reach) : Number.POSITIVE_INFINITY]
}

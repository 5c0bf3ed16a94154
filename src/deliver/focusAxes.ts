import type { Kind } from '../job/index.js'
import type { PeakFigures } from '../target/index.js'
import { type Axis, roundAxis } from './frame.js'
import { spectralUnit } from './spectralUnit.js'

/**
 * An axis over [from, to] (eV): energies in meV or wavelengths in nm, or, where the digits that differ would be far behind the point,
 * distances from the peak in the unit that suits them. `at` gives the place of an energy on it.
 */
export function energyAxis(
  from: number,
  to: number,
  peak: PeakFigures | null,
  kind: Kind,
): { axis: Axis; at: (ev: number) => number } {
  const { place, text, rising } = spectralUnit(kind)
  const [first, last] = rising ? [from, to] : [to, from]
  const narrow = kind === 'electron' ? to - from <= 1e-4 : place(from) - place(to) <= 0.1
  if (peak === null || !narrow) {
    const name = kind === 'electron' ? 'energy (meV)' : 'vacuum wavelength (nm)'
    return { axis: roundAxis(name, place(first), place(last), kind === 'electron' ? 7 : 5), at: place }
  }
  if (kind === 'light') {
    const at = (ev: number) => (place(ev) - place(peak.energyEv)) * 1000
    const name = `wavelength \u2212 ${text(peak.energyEv)} (pm)`
    return { axis: roundAxis(name, at(first), at(last), 5), at }
  }
  const unit = units.find(({ perEv }) => (to - from) * perEv >= 1) ?? units[units.length - 1]
  const at = (ev: number) => (ev - peak.energyEv) * unit.perEv
  const centre = (peak.energyEv * 1000).toPrecision(7)
  return { axis: roundAxis(`energy \u2212 ${centre} meV (${unit.name})`, at(from), at(to), 5), at }
}

const units = [
  { name: '\u00b5eV', perEv: 1e6 },
  { name: 'neV', perEv: 1e9 },
  { name: 'peV', perEv: 1e12 },
  { name: 'feV', perEv: 1e15 },
]

/** The unit of a linear T axis whose curve reaches `greatest`: 1, or the power of ten that keeps its labels short. */
export function heightUnit(greatest: number): { inverse: number; top: number; name: string } {
  if (greatest > 0.5) return { inverse: 1, top: 1.08, name: 'transmission T' }
  let inverse = 1
  let exponent = 0
  while (greatest * inverse < 0.1) {
    inverse *= 10
    exponent++
  }
  return {
    inverse,
    top: 1.15 * greatest * inverse,
    name: exponent === 0 ? 'transmission T' : `T in units of 1e-${exponent}`,
  }
}

import type { Axis } from '../job/index.js'
import { hcEvNm } from '../media/index.js'

/** The axis that a line is stated on, as a function of the energy in eV. */
export interface LineScale {
  /** The place of an energy on the axis, and back. */
  of(energyEv: number): number
  energy(place: number): number
  /** d(place)/dE. */
  slope(energyEv: number): number
  /** The distance between two energies, low and high. */
  width(lowEv: number, highEv: number): number
}

const scales: Readonly<Record<Axis, LineScale>> = {
  eV: {
    of: (energyEv) => energyEv,
    energy: (place) => place,
    slope: () => 1,
    width: (lowEv, highEv) => highEv - lowEv,
  },
  nm: {
    of: (energyEv) => hcEvNm / energyEv,
    energy: (place) => hcEvNm / place,
    slope: (energyEv) => -hcEvNm / (energyEv * energyEv),
    // As one quotient: the difference of two would lose the digits of a narrow line.
    width: (lowEv, highEv) => (hcEvNm * (highEv - lowEv)) / (lowEv * highEv),
  },
}

export function lineScale(axis: Axis): LineScale {
  return scales[axis]
}

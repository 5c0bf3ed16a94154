import { GaAs } from './GaAs.js'
import { InAs } from './InAs.js'
import type { Alloy } from './material.js'
import { twoCopies } from './sources.js'

export const InGaAs: Alloy = {
  kind: 'alloy',
  name: 'InGaAs',
  title: 'indium gallium arsenide',
  temperatureK: [0, 400],
  x: 'x is the share of In: In(x)Ga(1-x)As',
  xRange: [0, 1],
  atZero: GaAs,
  atOne: InAs,
  bowings: {
    gap: { constant: { value: 0.477, unit: 'eV', source: twoCopies }, slope: null },
    mass: { constant: { value: 0.0091, unit: 'm0', source: twoCopies }, slope: null },
    vbo: { constant: { value: -0.38, unit: 'eV', source: twoCopies }, slope: null },
    ac: { constant: { value: 2.61, unit: 'eV', source: twoCopies }, slope: null },
  },
}

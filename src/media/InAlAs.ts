import { AlAs } from './AlAs.js'
import { InAs } from './InAs.js'
import type { Alloy } from './material.js'
import { twoCopies } from './sources.js'

export const InAlAs: Alloy = {
  kind: 'alloy',
  name: 'InAlAs',
  title: 'indium aluminium arsenide',
  temperatureK: [0, 400],
  x: 'x is the share of In: In(x)Al(1-x)As',
  xRange: [0, 1],
  atZero: AlAs,
  atOne: InAs,
  bowings: {
    gap: { constant: { value: 0.7, unit: 'eV', source: twoCopies }, slope: null },
    mass: { constant: { value: 0.049, unit: 'm0', source: twoCopies }, slope: null },
    vbo: { constant: { value: -0.64, unit: 'eV', source: twoCopies }, slope: null },
    ac: { constant: { value: -1.4, unit: 'eV', source: twoCopies }, slope: null },
  },
}

import { AlAs } from './AlAs.js'
import { GaAs } from './GaAs.js'
import type { Alloy } from './material.js'
import { twoCopies } from './sources.js'

export const AlGaAs: Alloy = {
  kind: 'alloy',
  name: 'AlGaAs',
  title: 'aluminium gallium arsenide',
  temperatureK: [0, 400],
  x: 'x is the share of Al: Al(x)Ga(1-x)As',
  xRange: [0, 1],
  atZero: GaAs,
  atOne: AlAs,
  bowings: {
    gap: {
      constant: { value: -0.127, unit: 'eV', source: twoCopies },
      slope: { value: 1.31, unit: 'eV', source: twoCopies },
    },
    gapX: { constant: { value: 0.055, unit: 'eV', source: twoCopies }, slope: null },
  },
}

import { AlSb } from './AlSb.js'
import { GaSb } from './GaSb.js'
import type { Alloy } from './material.js'
import { oneCopy } from './sources.js'

export const AlGaSb: Alloy = {
  kind: 'alloy',
  name: 'AlGaSb',
  title: 'aluminium gallium antimonide',
  temperatureK: [0, 400],
  x: 'x is the share of Al: Al(x)Ga(1-x)Sb',
  xRange: [0, 1],
  atZero: GaSb,
  atOne: AlSb,
  bowings: {
    gap: {
      constant: { value: -0.044, unit: 'eV', source: oneCopy },
      slope: { value: 1.22, unit: 'eV', source: oneCopy },
    },
  },
}

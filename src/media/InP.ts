import type { Binary } from './material.js'
import { elasticCopies, oneCopy, twoCopies } from './sources.js'

export const InP: Binary = {
  kind: 'binary',
  name: 'InP',
  title: 'indium phosphide',
  temperatureK: [0, 400],
  lattice: { value: 0.58697, unit: 'nm', source: twoCopies },
  gap: {
    zero: { value: 1.4236, unit: 'eV', source: twoCopies },
    alpha: { value: 0.363e-3, unit: 'eV/K', source: oneCopy },
    beta: { value: 162, unit: 'K', source: oneCopy },
  },
  gapX: null,
  mass: { value: 0.0795, unit: 'm0', source: twoCopies },
  vbo: { value: -0.94, unit: 'eV', source: oneCopy },
  ac: { value: -6.0, unit: 'eV', source: twoCopies },
  av: { value: -0.6, unit: 'eV', source: twoCopies },
  c11: { value: 101.1, unit: 'GPa', source: elasticCopies },
  c12: { value: 56.1, unit: 'GPa', source: elasticCopies },
}

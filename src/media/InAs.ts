import type { Binary } from './material.js'
import { elasticCopies, twoCopies } from './sources.js'

export const InAs: Binary = {
  kind: 'binary',
  name: 'InAs',
  title: 'indium arsenide',
  temperatureK: [0, 400],
  lattice: { value: 0.60583, unit: 'nm', source: twoCopies },
  gap: {
    zero: { value: 0.417, unit: 'eV', source: twoCopies },
    alpha: { value: 0.276e-3, unit: 'eV/K', source: twoCopies },
    beta: { value: 93, unit: 'K', source: twoCopies },
  },
  gapX: null,
  mass: { value: 0.026, unit: 'm0', source: twoCopies },
  vbo: { value: -0.59, unit: 'eV', source: twoCopies },
  ac: { value: -5.08, unit: 'eV', source: twoCopies },
  av: { value: -1.0, unit: 'eV', source: twoCopies },
  c11: { value: 83.29, unit: 'GPa', source: elasticCopies },
  c12: { value: 45.26, unit: 'GPa', source: elasticCopies },
}

import type { Binary } from './material.js'
import { elasticCopies, oneCopy, twoCopies } from './sources.js'

export const AlAs: Binary = {
  kind: 'binary',
  name: 'AlAs',
  title: 'aluminium arsenide',
  temperatureK: [0, 400],
  lattice: { value: 0.56611, unit: 'nm', source: twoCopies },
  gap: {
    zero: { value: 3.099, unit: 'eV', source: twoCopies },
    alpha: { value: 0.885e-3, unit: 'eV/K', source: twoCopies },
    beta: { value: 530, unit: 'K', source: twoCopies },
  },
  gapX: {
    zero: { value: 2.24, unit: 'eV', source: oneCopy },
    alpha: { value: 0.7e-3, unit: 'eV/K', source: oneCopy },
    beta: { value: 530, unit: 'K', source: oneCopy },
  },
  mass: { value: 0.15, unit: 'm0', source: twoCopies },
  vbo: { value: -1.33, unit: 'eV', source: twoCopies },
  ac: { value: -5.64, unit: 'eV', source: twoCopies },
  av: { value: -2.47, unit: 'eV', source: twoCopies },
  c11: { value: 125.0, unit: 'GPa', source: elasticCopies },
  c12: { value: 53.4, unit: 'GPa', source: elasticCopies },
}

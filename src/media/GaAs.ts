import type { Binary } from './material.js'
import { elasticCopies, fromMemory, twoCopies } from './sources.js'

export const GaAs: Binary = {
  kind: 'binary',
  name: 'GaAs',
  title: 'gallium arsenide',
  temperatureK: [0, 400],
  lattice: { value: 0.565325, unit: 'nm', source: twoCopies },
  gap: {
    zero: { value: 1.519, unit: 'eV', source: twoCopies },
    alpha: { value: 0.5405e-3, unit: 'eV/K', source: twoCopies },
    beta: { value: 204, unit: 'K', source: twoCopies },
  },
  gapX: {
    zero: { value: 1.981, unit: 'eV', source: fromMemory },
    alpha: { value: 0.46e-3, unit: 'eV/K', source: fromMemory },
    beta: { value: 204, unit: 'K', source: fromMemory },
  },
  mass: { value: 0.067, unit: 'm0', source: twoCopies },
  vbo: { value: -0.8, unit: 'eV', source: twoCopies },
  ac: { value: -7.17, unit: 'eV', source: twoCopies },
  av: { value: -1.16, unit: 'eV', source: twoCopies },
  c11: { value: 122.1, unit: 'GPa', source: elasticCopies },
  c12: { value: 56.6, unit: 'GPa', source: elasticCopies },
}

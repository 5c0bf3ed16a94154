import type { Binary } from './material.js'
import { elasticCopies, fromMemory, twoCopies } from './sources.js'

export const AlSb: Binary = {
  kind: 'binary',
  name: 'AlSb',
  title: 'aluminium antimonide',
  temperatureK: [0, 400],
  lattice: { value: 0.61355, unit: 'nm', source: twoCopies },
  gap: {
    zero: { value: 2.386, unit: 'eV', source: twoCopies },
    alpha: { value: 0.42e-3, unit: 'eV/K', source: twoCopies },
    beta: { value: 140, unit: 'K', source: twoCopies },
  },
  gapX: {
    zero: { value: 1.696, unit: 'eV', source: fromMemory },
    alpha: { value: 0.39e-3, unit: 'eV/K', source: fromMemory },
    beta: { value: 140, unit: 'K', source: fromMemory },
  },
  mass: { value: 0.14, unit: 'm0', source: twoCopies },
  vbo: { value: -0.41, unit: 'eV', source: twoCopies },
  ac: { value: -4.5, unit: 'eV', source: twoCopies },
  av: { value: -1.4, unit: 'eV', source: `${twoCopies}; a third has -1.47` },
  c11: { value: 87.69, unit: 'GPa', source: elasticCopies },
  c12: { value: 43.41, unit: 'GPa', source: elasticCopies },
}

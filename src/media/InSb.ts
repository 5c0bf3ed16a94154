import type { Binary } from './material.js'
import { elasticCopies, twoCopies } from './sources.js'

export const InSb: Binary = {
  kind: 'binary',
  name: 'InSb',
  title: 'indium antimonide',
  temperatureK: [0, 400],
  lattice: { value: 0.64794, unit: 'nm', source: twoCopies },
  gap: {
    zero: { value: 0.235, unit: 'eV', source: twoCopies },
    alpha: { value: 0.32e-3, unit: 'eV/K', source: twoCopies },
    beta: { value: 170, unit: 'K', source: twoCopies },
  },
  gapX: null,
  mass: { value: 0.0135, unit: 'm0', source: twoCopies },
  vbo: { value: 0, unit: 'eV', source: twoCopies },
  ac: { value: -6.94, unit: 'eV', source: twoCopies },
  av: { value: -0.36, unit: 'eV', source: twoCopies },
  c11: { value: 68.47, unit: 'GPa', source: elasticCopies },
  c12: { value: 37.35, unit: 'GPa', source: elasticCopies },
}

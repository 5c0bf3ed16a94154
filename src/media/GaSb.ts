import type { Binary } from './material.js'
import { elasticCopies, twoCopies } from './sources.js'

export const GaSb: Binary = {
  kind: 'binary',
  name: 'GaSb',
  title: 'gallium antimonide',
  temperatureK: [0, 400],
  lattice: { value: 0.60959, unit: 'nm', source: twoCopies },
  gap: {
    zero: { value: 0.812, unit: 'eV', source: twoCopies },
    alpha: { value: 0.417e-3, unit: 'eV/K', source: twoCopies },
    beta: { value: 140, unit: 'K', source: twoCopies },
  },
  gapX: null,
  mass: { value: 0.039, unit: 'm0', source: twoCopies },
  vbo: { value: -0.03, unit: 'eV', source: twoCopies },
  ac: { value: -7.5, unit: 'eV', source: twoCopies },
  av: { value: -0.8, unit: 'eV', source: twoCopies },
  c11: { value: 88.42, unit: 'GPa', source: elasticCopies },
  c12: { value: 40.26, unit: 'GPa', source: elasticCopies },
}

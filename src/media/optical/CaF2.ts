import type { OpticalMaterial } from './OpticalMaterial.js'
import { coefficient, resonances } from './sourced.js'

const source =
  'Li, J. Phys. Chem. Ref. Data 9, 161 (1980), by a public-domain collection of index data; range from memory'

export const CaF2: OpticalMaterial = {
  kind: 'optical',
  name: 'CaF2',
  title: 'calcium fluoride crystal',
  form: 'bulk',
  rangeNm: [150, 12000],
  dispersion: {
    kind: 'sellmeier',
    constant: coefficient(1.33973, '', source),
    terms: resonances(source, [
      [0.69913, 0.09374],
      [0.11994, 21.18],
      [4.35181, 38.46],
    ]),
  },
  extinction: null,
  remarks: ['Malitson (1963) gives 3e-5 less in the visible.'],
}

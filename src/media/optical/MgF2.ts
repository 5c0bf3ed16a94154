import type { OpticalMaterial } from './OpticalMaterial.js'
import { coefficient, resonances } from './sourced.js'

const source =
  'Dodge, Appl. Opt. 23, 1980 (1984), 19 °C, by a public-domain collection of index data; range from memory'

export const MgF2: OpticalMaterial = {
  kind: 'optical',
  name: 'MgF2',
  title: 'magnesium fluoride crystal, ordinary ray',
  form: 'bulk',
  rangeNm: [200, 7000],
  dispersion: {
    kind: 'sellmeier',
    constant: coefficient(1, '', source),
    terms: resonances(source, [
      [0.48755108, 0.04338408],
      [0.39875031, 0.09461442],
      [2.3120353, 23.793604],
    ]),
  },
  extinction: null,
  remarks: ['The extraordinary ray is MgF2-e.'],
}

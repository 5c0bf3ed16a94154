import type { OpticalMaterial } from './OpticalMaterial.js'
import { coefficient, resonances } from './sourced.js'

const source =
  'Dodge, Appl. Opt. 23, 1980 (1984), 19 °C, by a public-domain collection of index data; range from memory'

export const MgF2e: OpticalMaterial = {
  kind: 'optical',
  name: 'MgF2-e',
  title: 'magnesium fluoride crystal, extraordinary ray',
  form: 'bulk',
  rangeNm: [200, 7000],
  dispersion: {
    kind: 'sellmeier',
    constant: coefficient(1, '', source),
    terms: resonances(source, [
      [0.41344023, 0.03684262],
      [0.50497499, 0.09076162],
      [2.4904862, 23.771995],
    ]),
  },
  extinction: null,
  remarks: ['The ordinary ray is MgF2.'],
}

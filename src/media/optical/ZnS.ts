import type { OpticalMaterial } from './OpticalMaterial.js'
import { coefficient, poles } from './sourced.js'

const source =
  'Debenham, Appl. Opt. 23, 2238 (1984), and Klein, Opt. Eng. 25, 519 (1986), by a public-domain collection of index data; range from memory'

export const ZnS: OpticalMaterial = {
  kind: 'optical',
  name: 'ZnS',
  title: 'zinc sulphide, cubic',
  form: 'bulk',
  rangeNm: [405, 13000],
  dispersion: {
    kind: 'poles',
    constant: coefficient(8.393, '', source),
    terms: poles(source, [
      [0.14383, 0.2421 * 0.2421],
      [4430.99, 36.71 * 36.71],
    ]),
  },
  extinction: null,
  remarks: [],
}

import type { OpticalMaterial } from './OpticalMaterial.js'
import { coefficient, resonances } from './sourced.js'

const source =
  'Malitson, J. Opt. Soc. Am. 55, 1205 (1965), by a public-domain collection of index data; range from memory'

export const fusedSilica: OpticalMaterial = {
  kind: 'optical',
  name: 'fused-silica',
  title: 'fused silica',
  form: 'bulk',
  rangeNm: [210, 3710],
  dispersion: {
    kind: 'sellmeier',
    constant: coefficient(1, '', source),
    terms: resonances(source, [
      [0.6961663, 0.0684043],
      [0.4079426, 0.1162414],
      [0.8974794, 9.896161],
    ]),
  },
  extinction: null,
  remarks: [],
}

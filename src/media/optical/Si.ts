import type { OpticalMaterial } from './OpticalMaterial.js'
import { coefficient, resonances } from './sourced.js'

const source =
  'Salzberg and Villa, J. Opt. Soc. Am. 47, 244 (1957), fit by Tatian (1984), by a public-domain collection of index data; range from memory'

export const Si: OpticalMaterial = {
  kind: 'optical',
  name: 'Si',
  title: 'silicon crystal',
  form: 'bulk',
  rangeNm: [1360, 11000],
  dispersion: {
    kind: 'sellmeier',
    constant: coefficient(1, '', source),
    terms: resonances(source, [
      [10.6684293, 0.301516485],
      [0.0030434748, 1.13475115],
      [1.54133408, 1104],
    ]),
  },
  extinction: null,
  remarks: ['Edwards and Ochoa (1980), 2.4 to 25 um, give 0.004 more at 10 um; that fit is Si-infrared.'],
}

import type { OpticalMaterial } from './OpticalMaterial.js'
import { coefficient, poles } from './sourced.js'

const source =
  'Schott, Optical Glass data sheets (2017), by a public-domain collection of index data; range from memory'

export const NBK7: OpticalMaterial = {
  kind: 'optical',
  name: 'N-BK7',
  title: 'borosilicate crown glass N-BK7',
  form: 'bulk',
  rangeNm: [300, 2500],
  dispersion: {
    kind: 'sellmeier',
    constant: coefficient(1, '', source),
    terms: poles(source, [
      [1.03961212, 0.00600069867],
      [0.231792344, 0.0200179144],
      [1.01046945, 103.560653],
    ]),
  },
  extinction: null,
  remarks: [],
}

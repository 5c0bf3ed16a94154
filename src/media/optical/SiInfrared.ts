import type { OpticalMaterial } from './OpticalMaterial.js'
import { coefficient } from './sourced.js'

const source =
  'Edwards and Ochoa, Appl. Opt. 19, 4130 (1980), by a public-domain collection of index data; range from memory'

export const SiInfrared: OpticalMaterial = {
  kind: 'optical',
  name: 'Si-infrared',
  title: 'silicon crystal, infrared fit',
  form: 'bulk',
  rangeNm: [2440, 25000],
  dispersion: {
    kind: 'herzberger',
    coefficients: [
      coefficient(3.41983, '', source),
      coefficient(0.159906, 'um²', source),
      coefficient(-0.123109, 'um⁴', source),
      coefficient(1.26878e-6, 'um⁻²', source),
      coefficient(-1.95104e-9, 'um⁻⁴', source),
    ],
  },
  extinction: null,
  remarks: ['Salzberg and Villa (1957) give 0.004 less at 10 um; that fit is Si.'],
}

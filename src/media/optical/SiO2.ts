import type { OpticalMaterial } from './OpticalMaterial.js'
import { coefficient } from './sourced.js'

const source =
  'Cauchy through the rows of 550, 632 and 1064 nm of Gao, Lemarchand, Lequime (2013), fit of ours; rows by a public-domain collection of index data'

export const SiO2: OpticalMaterial = {
  kind: 'optical',
  name: 'SiO2',
  title: 'silicon dioxide film',
  form: 'film',
  rangeNm: [400, 1100],
  dispersion: {
    kind: 'cauchy',
    coefficients: [
      coefficient(1.46701549, '', source),
      coefficient(3.66945022e-3, 'um²', source),
      coefficient(-4.84087461e-6, 'um⁴', source),
    ],
  },
  extinction: null,
  remarks: [
    'A film: 0.02 above fused silica, which is fused-silica. Below 550 nm the fit is continued, within some 1e-3.',
  ],
}

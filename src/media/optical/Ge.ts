import type { OpticalMaterial } from './OpticalMaterial.js'
import { coefficient, poles } from './sourced.js'

const source =
  'Burnett, Kaplan, Stover, Phenis, Proc. SPIE 9974, 99740X (2016), 295 K, by a public-domain collection of index data; range from memory'

export const Ge: OpticalMaterial = {
  kind: 'optical',
  name: 'Ge',
  title: 'germanium crystal',
  form: 'bulk',
  rangeNm: [2000, 14000],
  dispersion: {
    kind: 'sellmeier',
    constant: coefficient(1, '', source),
    terms: poles(source, [
      [0.4886331, 1.393959],
      [14.5142535, 0.1626427],
      [0.0091224, 752.19],
    ]),
  },
  extinction: null,
  remarks: [],
}

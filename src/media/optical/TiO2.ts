import type { OpticalMaterial } from './OpticalMaterial.js'
import { coefficient, poles } from './sourced.js'

const source = 'DeVore, J. Opt. Soc. Am. 41, 416 (1951), by a public-domain collection of index data; range from memory'

export const TiO2: OpticalMaterial = {
  kind: 'optical',
  name: 'TiO2',
  title: 'titanium dioxide, rutile crystal, ordinary ray',
  form: 'bulk',
  rangeNm: [430, 1530],
  dispersion: {
    kind: 'poles',
    constant: coefficient(5.913, '', source),
    terms: poles(source, [[0.2441, 0.0803]]),
  },
  extinction: null,
  remarks: [
    'Films have 2.2 to 2.5 at 550 nm by how they are made (from memory), far below the crystal: give yours as a table.',
  ],
}

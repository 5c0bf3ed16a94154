import type { OpticalMaterial } from './OpticalMaterial.js'
import { coefficient, resonances } from './sourced.js'

const source =
  'Connolly, Proc. SPIE 181, 141 (1979), and Tatian, Appl. Opt. 23, 4477 (1984), by a public-domain collection of index data; range from memory'

export const ZnSe: OpticalMaterial = {
  kind: 'optical',
  name: 'ZnSe',
  title: 'zinc selenide, vapour-grown',
  form: 'bulk',
  rangeNm: [540, 18200],
  dispersion: {
    kind: 'sellmeier',
    constant: coefficient(1, '', source),
    terms: resonances(source, [
      [4.45813734, 0.200859853],
      [0.467216334, 0.391371166],
      [2.8956629, 47.1362108],
    ]),
  },
  extinction: null,
  remarks: ['Marple (1964) gives 0.013 less at 633 nm: samples differ.'],
}

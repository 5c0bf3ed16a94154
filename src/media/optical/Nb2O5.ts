import type { OpticalMaterial } from './OpticalMaterial.js'
import { coefficient, poles } from './sourced.js'

const table = 'Lemarchand (2013), rows by a public-domain collection of index data'
const fit = `one pole through its rows of 400, 550 and 1000 nm, fit of ours, no row left to test it; ${table}`

export const Nb2O5: OpticalMaterial = {
  kind: 'optical',
  name: 'Nb2O5',
  title: 'niobium pentoxide film',
  form: 'film',
  rangeNm: [400, 1100],
  dispersion: {
    kind: 'sellmeier',
    constant: coefficient(2.353408672205293, '', fit),
    terms: poles(fit, [[2.582302748894111, 0.05973355960240646]]),
  },
  extinction: {
    rows: [
      [400, 1.046e-3],
      [550, 0],
    ],
    source: table,
  },
  remarks: ['A film of one machine; others differ by some 0.02. Beyond 1000 nm the fit is continued.'],
}

import type { OpticalMaterial } from './OpticalMaterial.js'
import { coefficient, poles } from './sourced.js'

const table =
  'Gao, Lemarchand, Lequime, Opt. Express 20, 15734 (2012), rows by a public-domain collection of index data'
const fit = `one pole through its rows of 400, 550 and 1000 nm, fit of ours, 2e-5 off its row of 632 nm; ${table}`

export const Ta2O5: OpticalMaterial = {
  kind: 'optical',
  name: 'Ta2O5',
  title: 'tantalum pentoxide film',
  form: 'film',
  rangeNm: [400, 1100],
  dispersion: {
    kind: 'sellmeier',
    constant: coefficient(1.7897131061859755, '', fit),
    terms: poles(fit, [[2.5211570048344387, 0.03621775210643291]]),
  },
  extinction: {
    rows: [
      [400, 3.27e-4],
      [550, 0],
    ],
    source: table,
  },
  remarks: ['A film of one machine; others differ by some 0.02. Beyond 1000 nm the fit is continued.'],
}

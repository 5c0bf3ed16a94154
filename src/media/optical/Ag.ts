import type { OpticalMaterial } from './OpticalMaterial.js'

const paper = 'Johnson and Christy, Phys. Rev. B 6, 4370 (1972)'
const checked = `${paper}, by a public-domain collection of index data`

export const Ag: OpticalMaterial = {
  kind: 'optical',
  name: 'Ag',
  title: 'silver, evaporated film',
  form: 'film',
  rangeNm: [321, 1937],
  dispersion: {
    kind: 'table',
    variable: 'eV',
    source: `${paper}, from memory`,
    rows: [
      [0.64, 0.24, 14.08],
      [0.77, 0.15, 11.85],
      [0.89, 0.13, 10.1],
      [1.02, 0.09, 8.828],
      [1.14, 0.04, 7.795, checked],
      [1.26, 0.04, 6.992],
      [1.39, 0.04, 6.312],
      [1.51, 0.04, 5.727, checked],
      [1.64, 0.03, 5.242],
      [1.76, 0.04, 4.838],
      [1.88, 0.05, 4.483, checked],
      [2.01, 0.06, 4.152, checked],
      [2.13, 0.05, 3.858],
      [2.26, 0.06, 3.586, checked],
      [2.38, 0.05, 3.324],
      [2.5, 0.05, 3.093, checked],
      [2.63, 0.05, 2.869],
      [2.75, 0.04, 2.657],
      [2.88, 0.04, 2.462],
      [3.0, 0.05, 2.275],
      [3.12, 0.05, 2.07, checked],
      [3.25, 0.05, 1.864],
      [3.37, 0.07, 1.657],
      [3.5, 0.1, 1.419],
      [3.62, 0.14, 1.142],
      [3.74, 0.17, 0.829],
      [3.87, 0.81, 0.392],
    ],
  },
  extinction: null,
  remarks: [
    'Its n is given to 0.02 at best (from memory), and what a film absorbs goes with n: a forecast of its absorption with n = 0.05 is good to some 50 %.',
    'Films thinner than some 10 nm are islands and no layer (from memory).',
  ],
}

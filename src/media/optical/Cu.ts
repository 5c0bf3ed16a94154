import type { OpticalMaterial } from './OpticalMaterial.js'

const paper = 'Johnson and Christy, Phys. Rev. B 6, 4370 (1972)'
const checked = `${paper}, by a public-domain collection of index data`

export const Cu: OpticalMaterial = {
  kind: 'optical',
  name: 'Cu',
  title: 'copper, evaporated film',
  form: 'film',
  rangeNm: [321, 1937],
  dispersion: {
    kind: 'table',
    variable: 'eV',
    source: `${paper}, from memory`,
    rows: [
      [0.64, 1.09, 13.43],
      [0.77, 0.76, 11.12],
      [0.89, 0.6, 9.439],
      [1.02, 0.48, 8.245],
      [1.14, 0.36, 7.217, checked],
      [1.26, 0.32, 6.421],
      [1.39, 0.3, 5.768],
      [1.51, 0.26, 5.18, checked],
      [1.64, 0.24, 4.665],
      [1.76, 0.21, 4.205],
      [1.88, 0.22, 3.747, checked],
      [2.01, 0.3, 3.205, checked],
      [2.13, 0.7, 2.704],
      [2.26, 1.02, 2.577, checked],
      [2.38, 1.18, 2.608],
      [2.5, 1.22, 2.564, checked],
      [2.63, 1.25, 2.483],
      [2.75, 1.24, 2.397],
      [2.88, 1.25, 2.305],
      [3.0, 1.28, 2.207],
      [3.12, 1.32, 2.116, checked],
      [3.25, 1.33, 2.045],
      [3.37, 1.36, 1.975],
      [3.5, 1.37, 1.916],
      [3.62, 1.36, 1.864],
      [3.74, 1.34, 1.821],
      [3.87, 1.38, 1.783],
    ],
  },
  extinction: null,
  remarks: ['Films thinner than some 10 nm are islands and no layer (from memory).'],
}

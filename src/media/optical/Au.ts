import type { OpticalMaterial } from './OpticalMaterial.js'

const paper = 'Johnson and Christy, Phys. Rev. B 6, 4370 (1972)'
const checked = `${paper}, by a public-domain collection of index data`

export const Au: OpticalMaterial = {
  kind: 'optical',
  name: 'Au',
  title: 'gold, evaporated film',
  form: 'film',
  rangeNm: [321, 1937],
  dispersion: {
    kind: 'table',
    variable: 'eV',
    source: `${paper}, from memory`,
    rows: [
      [0.64, 0.92, 13.78],
      [0.77, 0.56, 11.21],
      [0.89, 0.43, 9.519],
      [1.02, 0.35, 8.145],
      [1.14, 0.27, 7.15, checked],
      [1.26, 0.22, 6.35],
      [1.39, 0.17, 5.663],
      [1.51, 0.16, 5.083, checked],
      [1.64, 0.14, 4.542],
      [1.76, 0.13, 4.103],
      [1.88, 0.14, 3.697, checked],
      [2.01, 0.21, 3.272, checked],
      [2.13, 0.29, 2.863],
      [2.26, 0.43, 2.455, checked],
      [2.38, 0.62, 2.081],
      [2.5, 1.04, 1.833, checked],
      [2.63, 1.31, 1.849],
      [2.75, 1.38, 1.914],
      [2.88, 1.45, 1.948],
      [3.0, 1.46, 1.958],
      [3.12, 1.47, 1.952, checked],
      [3.25, 1.46, 1.933],
      [3.37, 1.48, 1.895],
      [3.5, 1.5, 1.866],
      [3.62, 1.48, 1.871],
      [3.74, 1.48, 1.883],
      [3.87, 1.54, 1.898],
    ],
  },
  extinction: null,
  remarks: ['Films thinner than some 10 nm are islands and no layer (from memory).'],
}

import type { OpticalMaterial } from './OpticalMaterial.js'
import { coefficient, resonances } from './sourced.js'

const source =
  'Malitson, J. Opt. Soc. Am. 52, 1377 (1962), 24 °C, by a public-domain collection of index data; range from memory'

export const sapphire: OpticalMaterial = {
  kind: 'optical',
  name: 'sapphire',
  title: 'sapphire, ordinary ray',
  form: 'bulk',
  rangeNm: [265, 5577],
  dispersion: {
    kind: 'sellmeier',
    constant: coefficient(1, '', source),
    terms: resonances(source, [
      [1.023798, 0.06144821],
      [1.058264, 0.1106997],
      [5.280792, 17.92656],
    ]),
  },
  extinction: null,
  remarks: [
    'Another fit of the same crystal (Malitson and Dodge, 1972) lies 6e-5 lower.',
    'The crystal is birefringent: the extraordinary ray has 0.008 less.',
  ],
}

import type { OpticalMaterial } from './OpticalMaterial.js'
import { coefficient } from './sourced.js'

export const air: OpticalMaterial = {
  kind: 'optical',
  name: 'air',
  title: 'air',
  form: 'gas',
  rangeNm: [1, 1e6],
  dispersion: {
    kind: 'constant',
    index: coefficient(1, '', 'the listed indices of glasses and crystals count from air'),
  },
  extinction: null,
  remarks: [
    'Listed indices are relative to air, which is taken as 1. Against vacuum all of them, and air, are 2.7e-4 higher (from memory); that is left out.',
  ],
}

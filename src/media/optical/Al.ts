import type { OpticalMaterial } from './OpticalMaterial.js'
import { coefficient } from './sourced.js'

const source = 'Rakic, Djurisic, Elazar, Majewski, Appl. Opt. 37, 5271 (1998), Lorentz-Drude model, from memory'

/** Plasma energy in eV. */
const plasma = 14.98

export const Al: OpticalMaterial = {
  kind: 'optical',
  name: 'Al',
  title: 'aluminium',
  form: 'film',
  rangeNm: [410, 2070],
  dispersion: {
    kind: 'lorentz-drude',
    terms: [
      term(0.523, 0, 0.047),
      term(0.227, 0.162, 0.333),
      term(0.05, 1.544, 0.312),
      term(0.166, 1.808, 1.351),
      term(0.03, 3.473, 3.382),
    ],
  },
  extinction: null,
  remarks: [
    'The model lies within 10 % in n and 4 % in kappa of five rows of the table of Rakic (1995), which is another evaluation.',
    'Air puts 2 to 3 nm of oxide on it (from memory).',
  ],
}

function term(strength: number, centre: number, width: number) {
  return {
    strength: coefficient(strength * plasma * plasma, 'eV²', source),
    centre: coefficient(centre, 'eV', source),
    width: coefficient(width, 'eV', source),
  }
}

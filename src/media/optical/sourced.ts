import type { Sourced } from '../material.js'
import type { Term } from './OpticalMaterial.js'

/** Coefficients of one formula out of one source, so that each of them carries it. */
export function coefficient(value: number, unit: string, source: string): Sourced {
  return { value, unit, source }
}

/** Terms of a Sellmeier formula that lists wavelengths of resonance (um): the pole is their square. */
export function resonances(
  source: string,
  terms: readonly (readonly [strength: number, resonanceUm: number])[],
): readonly Term[] {
  return terms.map(([strength, um]) => ({
    strength: coefficient(strength, '', source),
    pole: coefficient(um * um, 'um²', source),
  }))
}

/** Terms of a formula that lists the poles (um²) themselves. */
export function poles(
  source: string,
  terms: readonly (readonly [strength: number, poleUm2: number])[],
): readonly Term[] {
  return terms.map(([strength, pole]) => ({
    strength: coefficient(strength, '', source),
    pole: coefficient(pole, 'um²', source),
  }))
}

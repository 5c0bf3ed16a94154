import type { ListedNumber } from '../listedNumbers.js'
import type { OpticalMaterial } from './OpticalMaterial.js'

/** Every number behind a medium of light, for a table. */
export function opticalNumbers({ dispersion, extinction }: OpticalMaterial): ListedNumber[] {
  const beside = (extinction?.rows ?? []).map(([nm, value]) => ({
    name: `extinction at ${nm} nm`,
    value,
    unit: '',
    source: extinction!.source,
  }))
  return [...formula(), ...beside]

  function formula(): ListedNumber[] {
    switch (dispersion.kind) {
      case 'constant':
        return [{ name: 'index', ...dispersion.index }]
      case 'cauchy':
      case 'herzberger':
        return dispersion.coefficients.map((number, i) => ({
          name: `${'ABCDF'[i]} of ${formulas[dispersion.kind]}`,
          ...number,
        }))
      case 'sellmeier':
      case 'poles':
        return [
          { name: `constant of ${formulas[dispersion.kind]}`, ...dispersion.constant },
          ...dispersion.terms.flatMap(({ strength, pole }, i) => [
            { name: `strength ${i + 1}`, ...strength },
            { name: `pole ${i + 1}`, ...pole },
          ]),
        ]
      case 'lorentz-drude':
        return dispersion.terms.flatMap(({ strength, centre, width }, i) => [
          { name: `strength ${i + 1} of ${formulas[dispersion.kind]}`, ...strength },
          { name: `centre ${i + 1}`, ...centre },
          { name: `width ${i + 1}`, ...width },
        ])
      case 'table': {
        const { rows, variable, source } = dispersion
        return rows.flatMap(([where, n, k, own]) => [
          { name: `index at ${where} ${variable}`, value: n, unit: '', source: own ?? source },
          { name: `extinction at ${where} ${variable}`, value: k, unit: '', source: own ?? source },
        ])
      }
    }
  }
}

const formulas = {
  cauchy: 'n = A + B/l² + C/l⁴ (l in um)',
  herzberger: 'n = A + B L + C L² + D l² + F l⁴, L = 1/(l² - 0.028) (l in um)',
  sellmeier: 'n² = constant + sum strength l²/(l² - pole) (l in um)',
  poles: 'n² = constant + sum strength/(l² - pole) (l in um)',
  'lorentz-drude': '(n + ik)² = 1 - sum strength/(E² - centre² + i E width)',
}

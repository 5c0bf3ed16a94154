import type { Kind } from '../job/index.js'
import { type Cell, csv } from './csv.js'
import { type SpectralUnit, spectralUnit } from './spectralUnit.js'
import type { SpectrumReport } from './types.js'

/** spectrum.csv, energies or wavelengths ascending: the conditions of the job one after another, named in a first column where there are several. */
export function spectrumCsv(spectra: readonly SpectrumReport[], kind: Kind): string {
  const several = spectra.length > 1
  const absorbs = spectra.some(({ A }) => A !== null)
  const unit = spectralUnit(kind)
  const header = [
    ...(several ? ['condition'] : []),
    unit.rising ? 'energy_meV' : 'wavelength_nm',
    'T',
    'R',
    ...(absorbs ? ['A'] : []),
    'log10_T',
  ]
  return csv(header, rows(spectra, several, absorbs, unit))
}

function* rows(
  spectra: readonly SpectrumReport[],
  several: boolean,
  absorbs: boolean,
  unit: SpectralUnit,
): Iterable<Cell[]> {
  for (const { condition, energyEv, T, R, A, log10T } of spectra) {
    for (let k = 0; k < energyEv.length; k++) {
      const i = unit.rising ? k : energyEv.length - 1 - k
      const cells = [unit.cell(energyEv[i]), T[i], R[i], ...(absorbs ? [A?.[i] ?? 0] : []), log10T[i]]
      yield several ? [condition, ...cells] : cells
    }
  }
}

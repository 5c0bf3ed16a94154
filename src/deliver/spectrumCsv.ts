import { type Cell, csv, meV } from './csv.js'
import type { SpectrumReport } from './types.js'

/** spectrum.csv: the conditions of the job one after another, named in a first column where there are several. */
export function spectrumCsv(spectra: readonly SpectrumReport[]): string {
  const several = spectra.length > 1
  const header = [...(several ? ['condition'] : []), 'energy_meV', 'T', 'R', 'log10_T']
  return csv(header, rows(spectra, several))
}

function* rows(spectra: readonly SpectrumReport[], several: boolean): Iterable<Cell[]> {
  for (const { condition, energyEv, T, R, log10T } of spectra) {
    for (let i = 0; i < energyEv.length; i++) {
      const cells = [meV(energyEv[i]), T[i], R[i], log10T[i]]
      yield several ? [condition, ...cells] : cells
    }
  }
}

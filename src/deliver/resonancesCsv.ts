import type { Pole } from '../wave/index.js'
import { csv, meV } from './csv.js'

const header = ['energy_meV', 'width_meV', 'entry_width_meV', 'exit_width_meV', 'peak_T']

/** resonances.csv: every pole in the scan, ascending. */
export function resonancesCsv(poles: readonly Pole[]): string {
  return csv(
    header,
    poles.map((pole) => [
      ...[meV(pole.energyEv), meV(pole.widthEv), meV(pole.entryWidthEv), meV(pole.exitWidthEv)],
      pole.peakT,
    ]),
  )
}

import { csv, meV } from './csv.js'
import type { ProfileReport } from './types.js'

const header = ['z_nm', 'edge_meV', 'density_per_nm']

/** profile.csv: the band edge from entry to exit, an interface given twice, and abs(u)² of the wave at the peak. */
export function profileCsv({ zNm, edgeEv, densityPerNm }: ProfileReport): string {
  return csv(
    header,
    Array.from(zNm, (z, i) => [z, meV(edgeEv[i]), densityPerNm?.[i] ?? null]),
  )
}

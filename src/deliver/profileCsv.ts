import type { Kind } from '../job/index.js'
import { csv, meV } from './csv.js'
import type { ProfileReport } from './types.js'

/** profile.csv: the band edge (for light the index) from entry to exit, an interface given twice, and abs(u)² of the wave at the peak. */
export function profileCsv({ zNm, edge, densityPerNm }: ProfileReport, kind: Kind): string {
  const electrons = kind === 'electron'
  return csv(
    ['z_nm', electrons ? 'edge_meV' : 'index', 'density_per_nm'],
    Array.from(zNm, (z, i) => [z, electrons ? meV(edge[i]) : edge[i], densityPerNm?.[i] ?? null]),
  )
}

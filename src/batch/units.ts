import type { SearchSpec } from '../job/index.js'

/** Effort is counted, never timed: independent units of the sampled method. */
export const sampledUnits: Readonly<Record<SearchSpec['effort'], number>> = {
  brief: 64,
  standard: 1024,
  overnight: 16384,
}

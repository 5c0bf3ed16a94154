import type { Demand, Job } from '../job/index.js'
import type { PeakFigures } from '../target/index.js'
import { rangeEv } from './demandMarks.js'

/**
 * The energies (eV) worth a look on a linear scale: the pass ranges of the job with some room beside them, else the peak with three of
 * its widths on either side, and its window where that is not much wider. Null when there is neither, or the peak is
 * too narrow to have a shape in doubles.
 */
export function focusRange(job: Job, peak: PeakFigures | null): [number, number] | null {
  const passes = job.demands.filter(({ kind, quantity }) => kind === 'pass' && quantity === 'T').map(rangeEv)
  if (passes.length > 0) {
    const marked = peak !== null && job.demands.some(isLine) ? [peak.energyEv] : []
    const from = Math.min(...passes.map(([a]) => a), ...marked)
    const to = Math.max(...passes.map(([, b]) => b), ...marked)
    const room = to > from ? 0.35 * (to - from) : 0.02 * (job.scanEv[1] - job.scanEv[0])
    return within(job, from - room, to + room)
  }
  // A line of a few spacings of doubles has no shape that could be drawn.
  if (peak === null || !(peak.fwhmEv > 1e-13 * Math.abs(peak.energyEv))) return null
  const windows = job.demands.filter(isLine).map(rangeEv)
  const reaches = windows.map(([a, b]) => 1.1 * Math.max(Math.abs(peak.energyEv - a), Math.abs(b - peak.energyEv)))
  const half = Math.max(3 * peak.fwhmEv, ...reaches.filter((reach) => reach <= 8 * peak.fwhmEv))
  return within(job, peak.energyEv - half, peak.energyEv + half)
}

/** A peak or a band, which have a window. */
export function isLine({ kind }: Demand): boolean {
  return kind === 'peak' || kind === 'band'
}

/** Cut to the scan; a range that lies outside of it stays what it is. */
function within({ scanEv: [first, last] }: Job, from: number, to: number): [number, number] {
  const cut: [number, number] = [Math.max(from, first), Math.min(to, last)]
  return cut[0] < cut[1] ? cut : [from, to]
}

/** Where a run is; counts include what earlier sittings finished. */
export interface Progress {
  readonly name: string
  readonly phase: 'search' | 'yield' | 'results'
  readonly done: number
  readonly total: number
  /** Of the best stack so far; null before the first unit. */
  readonly bestMerit: number | null
  /** Whether that stack meets all limits, and its margin. */
  readonly bestMeets: boolean
  readonly bestMargin: number | null
  /** Finished a second in this sitting, and the seconds that the rest of the phase takes at that rate; null before the first. */
  readonly rate: number | null
  readonly secondsLeft: number | null
}

/** Counts a phase's work of this sitting. */
export class Pace {
  private readonly start = performance.now()
  private finished = 0

  constructor(
    private done: number,
    readonly total: number,
  ) {}

  finish(): void {
    this.done++
    this.finished++
  }

  get now(): Pick<Progress, 'done' | 'total' | 'rate' | 'secondsLeft'> {
    const seconds = (performance.now() - this.start) / 1000
    const rate = this.finished > 0 ? this.finished / seconds : null
    return {
      done: this.done,
      total: this.total,
      rate,
      secondsLeft: rate === null ? null : (this.total - this.done) / rate,
    }
  }
}

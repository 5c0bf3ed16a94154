import type { Progress } from '../batch/index.js'
import { colours } from './console.js'

const minute = 60_000
const barWidth = 24

/** Progress on stderr: a line that is drawn over on a terminal, a new one a minute elsewhere. */
export class ProgressLine {
  private last = 0
  private drawn = 0
  private phase = ''

  constructor(
    private readonly out: NodeJS.WriteStream = process.stderr,
    private readonly clock: () => number = Date.now,
  ) {}

  show(progress: Progress): void {
    const now = this.clock()
    const fresh = progress.phase !== this.phase
    const whole = progress.done === progress.total
    if (this.out.isTTY) {
      if (!fresh && !whole && now - this.last < 100) return
      this.draw(progress, now)
    } else {
      if (this.last !== 0 && now - this.last < minute) return
      this.out.write(`${textOf(progress, now)}\n`)
    }
    this.phase = progress.phase
    this.last = now
  }

  /** Clears the drawn line. */
  end(): void {
    if (this.drawn > 0) this.out.write(`\r${' '.repeat(this.drawn)}\r`)
    this.drawn = 0
  }

  private draw(progress: Progress, now: number): void {
    const { done, total } = progress
    const filled = Math.round((barWidth * done) / Math.max(1, total))
    const bar = `${'━'.repeat(filled)}${'─'.repeat(barWidth - filled)}`
    const text = `${bar} ${textOf(progress, now)}`.slice(0, (this.out.columns || 120) - 1)
    this.out.write(
      `\r${colours.cyan(text.slice(0, filled))}${text.slice(filled)}${' '.repeat(Math.max(0, this.drawn - text.length))}`,
    )
    this.drawn = text.length
  }
}

const doing = { search: 'units', yield: 'stacks grown on paper', results: 'results written' } as const

function textOf(progress: Progress, now: number): string {
  const { name, phase, done, total, rate, secondsLeft } = progress
  const parts = [name, `${done} of ${total} ${doing[phase]}`, bestOf(progress)]
  if (rate !== null && done < total) parts.push(`${rate < 10 ? rate.toPrecision(2) : rate.toFixed(0)} a second`)
  if (secondsLeft !== null && done < total) parts.push(`done at ${timeOf(now + 1000 * secondsLeft)}`)
  return parts.filter((part) => part !== '').join(', ')
}

function bestOf({ bestMerit, bestMeets, bestMargin }: Progress): string {
  if (bestMerit === null) return ''
  if (!bestMeets) return `best merit ${Number(bestMerit.toPrecision(4))}`
  return bestMargin === null ? 'best meets all' : `best meets all, margin ${Number(bestMargin.toPrecision(4))}`
}

function timeOf(ms: number): string {
  return new Date(ms).toTimeString().slice(0, 5)
}

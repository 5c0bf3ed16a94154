import { describe, expect, it } from 'vitest'
import type { Progress } from '../../src/batch/index.js'
import { ProgressLine } from '../../src/cli/ProgressLine.js'

const half: Progress = {
  ...{ name: 'cold-collector-80', phase: 'search', done: 512, total: 1024 },
  ...{ bestMerit: 0.0123456, bestMeets: false, bestMargin: null, rate: 4, secondsLeft: 128 },
}

/** What a stream that is or is not a terminal is told, at times in seconds. */
function written(isTTY: boolean, shows: readonly (readonly [number, Progress])[]): string[] {
  const out: string[] = []
  let now = new Date(2026, 11, 1, 22, 0).getTime()
  const begin = now
  const stream = { isTTY, columns: 120, write: (text: string) => out.push(text) } as unknown as NodeJS.WriteStream
  const line = new ProgressLine(stream, () => now)
  for (const [seconds, progress] of shows) {
    now = begin + 1000 * seconds
    line.show(progress)
  }
  line.end()
  return out
}

describe('progress', () => {
  it('says units, the best, the rate and when it is done', () => {
    expect(written(false, [[0, half]])).toEqual([
      'cold-collector-80, 512 of 1024 units, best merit 0.01235, 4.0 a second, done at 22:02\n',
    ])
  })

  it('says of a best that meets all limits its margin', () => {
    const [line] = written(false, [[0, { ...half, bestMeets: true, bestMerit: 0, bestMargin: 1.65887 }]])
    expect(line).toContain('best meets all, margin 1.659')
  })

  it('is a line a minute where there is no terminal', () => {
    const seconds = [0, 1, 59, 60, 61, 119, 121]
    expect(
      written(
        false,
        seconds.map((second) => [second, half] as const),
      ),
    ).toHaveLength(3)
  })

  it('is one line drawn over on a terminal, no wider than it, and cleared in the end', () => {
    const out = written(true, [
      [0, half],
      [0.01, half],
      [1, half],
    ])
    expect(out).toHaveLength(3)
    for (const text of out) {
      expect(text.startsWith('\r')).toBe(true)
      expect(text).not.toContain('\n')
    }
    expect(out[2].trim()).toBe('')
  })
})

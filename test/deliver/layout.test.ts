import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { fitted, textWidth, wrapped } from '../../src/deliver/label.js'
import { pushApart } from '../../src/deliver/pushApart.js'
import { rollUp } from '../../src/deliver/rollUp.js'
import { escapeXml, fixed } from '../../src/deliver/svg.js'
import { roundTicks } from '../../src/deliver/ticks.js'
import { evenly } from './sampleNight.js'

describe('roundTicks', () => {
  it('gives round numbers with clean texts', () => {
    expect(roundTicks(5, 200, 10).map(({ text }) => text)).toEqual(evenly(20, 200, 10).map(String))
    expect(roundTicks(0, 1.08, 6).map(({ text }) => text)).toEqual(['0.0', '0.2', '0.4', '0.6', '0.8', '1.0'])
    expect(roundTicks(-5, 5, 5).map(({ text }) => text)).toEqual(['\u22124', '\u22122', '0', '2', '4'])
  })

  it('stays inside the axis, and never gives more than two over what was asked', () => {
    const ends = fc.tuple(
      fc.double({ min: -1e6, max: 1e6, noNaN: true }),
      fc.double({ min: 1e-9, max: 1e7, noNaN: true }),
    )
    fc.assert(
      fc.property(ends, fc.integer({ min: 2, max: 12 }), ([from, span], wanted) => {
        fc.pre(span > 1e-9 * Math.abs(from))
        const ticks = roundTicks(from, from + span, wanted)
        const slack = 1e-6 * span
        return (
          ticks.length <= wanted + 2 &&
          ticks.every(({ value }) => value >= from - slack && value <= from + span + slack)
        )
      }),
    )
  })

  it('refuses an axis that has no extent', () => {
    expect(() => roundTicks(1, 1, 5)).toThrow(/No round step/)
  })
})

describe('pushApart', () => {
  const labels = fc.array(
    fc.record({ at: fc.double({ min: 0, max: 700, noNaN: true }), width: fc.integer({ min: 1, max: 60 }) }),
  )

  it('keeps labels apart, in order and inside, or says that they do not fit', () => {
    fc.assert(
      fc.property(labels, (items) => {
        const places = pushApart(
          items.map(({ at }) => at),
          items.map(({ width }) => width),
          0,
          700,
        )
        const total = items.reduce((sum, { width }) => sum + width, 0)
        if (places === null) return total > 700
        const order = items.map((_, i) => i).sort((a, b) => places[a] - places[b])
        return order.every((i, n) => {
          const left = places[i] - items[i].width / 2
          const before = n === 0 ? 0 : places[order[n - 1]] + items[order[n - 1]].width / 2
          const inOrder = n === 0 || items[order[n - 1]].at <= items[i].at
          return left >= before - 1e-9 && places[i] + items[i].width / 2 <= 700 + 1e-9 && inOrder
        })
      }),
    )
  })

  it('leaves labels where they want to be when they do not meet', () => {
    expect(pushApart([600, 100, 300], [40, 40, 40], 0, 700)).toEqual([600, 100, 300])
  })
})

describe('rollUp', () => {
  it('keeps a short curve as it is, with one neighbour beyond each end', () => {
    const x = evenly(0, 10, 11)
    expect(rollUp({ x, y: x }, 3, 6, 100)).toEqual([2, 3, 4, 5, 6, 7])
  })

  it('keeps the least and the greatest of every pixel column, in order', () => {
    const x = evenly(0, 1, 50_001)
    const y = x.map((_, i) => (i === 31_337 ? 500 : i === 12_345 ? -5 : (i * 7919) % 101))
    const kept = rollUp({ x, y }, 0, 1, 500)
    expect(kept).toContain(31_337)
    expect(kept).toContain(12_345)
    expect(kept.length).toBeLessThanOrEqual(4 * 501)
    expect(kept.every((at, i) => i === 0 || at > kept[i - 1])).toBe(true)
  })
})

describe('labels', () => {
  it('fit what they were cut for', () => {
    fc.assert(
      fc.property(
        fc.string(),
        fc.integer({ min: 20, max: 300 }),
        (text, width) => textWidth(fitted(text, width, 12), 12) <= width,
      ),
    )
    fc.assert(
      fc.property(fc.lorem({ maxCount: 60 }), (text) => {
        const lines = wrapped(text, 200, 12, 4)
        return lines.length <= 4 && lines.every((line) => textWidth(line, 12) <= 200)
      }),
    )
  })

  it('have two digits in their places, no negative zero, and nothing that XML lacks', () => {
    expect([1.005, 2 / 3, -0.001, 120].map(fixed)).toEqual(['1', '0.67', '0', '120'])
    expect(escapeXml('a<b>&"\u0007\ud800\u00b2')).toBe('a&lt;b&gt;&amp;&quot;\ufffd\ufffd\u00b2')
  })
})

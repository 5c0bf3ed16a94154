import { describe, expect, it } from 'vitest'
import { Archive, type UnitResult } from '../../src/search/index.js'
import { byMerit, scoreOf } from './functions.js'

const unit = (number: number, ...merits: number[]): UnitResult => ({
  unit: number,
  found: merits.map((merit) => ({ assignment: [merit], score: scoreOf(merit, `id-${merit}`) })),
  examined: 10,
  cut: 5,
  stop: 'no move helps',
})

const units = Array.from({ length: 20 }, (_, i) => {
  const base = (i * 7) % 11
  return unit(i, base, base + 1, base + 4)
})

function folded(results: readonly UnitResult[], kept?: number): Archive {
  const archive = new Archive(byMerit, units.length, kept)
  for (const result of results) archive.add(result)
  return archive
}

describe('Archive', () => {
  it('keeps each stack once, the best first', () => {
    const merits = folded(units).best(100)
    expect(merits.map(({ score }) => score.merit)).toEqual([0, 1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 11, 12, 13, 14])
    expect(folded(units).best(2).length).toBe(2)
  })

  it('counts the starts that end in the best of all', () => {
    // Units 0 and 11 have 0 as their best.
    expect(folded(units).startsInBest).toBe(2)
    expect(folded([]).startsInBest).toBe(0)
  })

  it("estimates the chance of an end point not seen yet by Good's share of those seen once", () => {
    // Ends 1, 1, 1, 2, 2, 3, 4: two of seven starts ended where no other did.
    const ends = [1, 2, 1, 3, 2, 1, 4].map((merit, i) => unit(i, merit))
    expect(folded(ends).unseenShare).toBe(2 / 7)
    expect(folded(ends.slice(0, 1)).unseenShare).toBe(1)
    expect(folded([]).unseenShare).toBeNull()
  })

  it('tells the best merit after each tenth', () => {
    const late = Array.from({ length: 20 }, (_, i) => unit(i, 20 - i))
    expect(folded(late).meritAfterTenths).toEqual([19, 17, 15, 13, 11, 9, 7, 5, 3, 1])
    expect(folded(late.slice(0, 5)).meritAfterTenths).toEqual([19, 17])
    const three = new Archive(byMerit, 3)
    for (const result of late.slice(0, 3)) three.add(result)
    expect(three.meritAfterTenths).toEqual([20, 20, 20, 19, 19, 19, 18, 18, 18, 18])
  })

  it('is the same for a unit read back from a line of JSON, and after an interruption', () => {
    const archive = new Archive(byMerit, units.length)
    for (const result of units.slice(0, 7)) archive.add(result)
    archive.best(1)
    for (const result of units.slice(7)) archive.add(JSON.parse(JSON.stringify(result)) as UnitResult)
    expect(archive.best(100)).toEqual(folded(units).best(100))
    expect(archive.startsInBest).toBe(folded(units).startsInBest)
    expect(archive.meritAfterTenths).toEqual(folded(units).meritAfterTenths)
  })

  it('loses nothing that counts by keeping few', () => {
    const few = folded(units, 3)
    expect(few.best(3)).toEqual(folded(units).best(3))
    expect(few.startsInBest).toBe(folded(units).startsInBest)
  })

  it('refuses a unit out of order', () => {
    expect(() => folded([units[3], units[2]])).toThrow(/Unit 2 comes after unit 3/)
    expect(() => folded([units[3], units[3]])).toThrow(RangeError)
  })
})

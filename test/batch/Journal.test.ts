import { appendFileSync, mkdtempSync, readdirSync, readFileSync, truncateSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { describe, expect, it } from 'vitest'
import { Journal, journalName } from '../../src/batch/Journal.js'
import { decodeLine, encodeLine, type JournalEntry, type JournalHead } from '../../src/batch/journalLine.js'
import { RunError } from '../../src/batch/RunError.js'

const head: JournalHead = {
  format: 1,
  name: 'cold-collector-80',
  engine: '0.1.0',
  kernel: 'plain',
  checksum: 'c8fd25b4',
  resume_hash: 'ab'.repeat(32),
}
const unit = (number: number): JournalEntry => ({
  unit: { unit: number, found: [], examined: number, cut: 0, stop: 'no move helps' },
  seconds: 0.1,
})

function folder(): string {
  return mkdtempSync(join(tmpdir(), 'journal-'))
}

/** The unit numbers that a journal hands back, and its notes. */
function reopen(place: string, wanted = head, fresh = false): { units: number[]; notes: readonly string[] } {
  const units: number[] = []
  const journal = Journal.open(place, wanted, fresh, (entry) => {
    if ('unit' in entry) units.push(entry.unit.unit)
  })
  journal.close()
  return { units, notes: journal.notes }
}

function filled(numbers: readonly number[]): string {
  const place = folder()
  const journal = Journal.open(place, head, false, () => {})
  for (const number of numbers) journal.append(unit(number))
  journal.close()
  return place
}

describe('a line of the journal', () => {
  it('is one JSON object and reads back as it was', () => {
    const line = encodeLine(unit(3))
    expect(JSON.parse(line).entry).toEqual(unit(3))
    expect(decodeLine(line.slice(0, -1))).toEqual(unit(3))
  })

  it('is nothing when any character of it is missing or another', () => {
    const line = encodeLine(unit(3)).slice(0, -1)
    for (let i = 0; i < line.length; i++) {
      expect(decodeLine(line.slice(0, i))).toBeNull()
      expect(decodeLine(`${line.slice(0, i)}#${line.slice(i + 1)}`)).toBeNull()
    }
  })
})

describe('a journal', () => {
  it('hands back what was appended, in that order', () => {
    expect(reopen(filled([2, 0, 1])).units).toEqual([2, 0, 1])
  })

  it('is cut after its last whole line, wherever a kill left it, and goes on from there', () => {
    const whole = readFileSync(join(filled([0, 1]), journalName))
    const lines = whole.toString().split('\n')
    const ends = [lines[0].length + 1, lines[0].length + lines[1].length + 2]
    for (let size = ends[0]; size < whole.length; size += 7) {
      const place = filled([0, 1])
      truncateSync(join(place, journalName), size)
      const expected = size >= ends[1] ? [0] : []
      expect(reopen(place).units).toEqual(expected)
      const journal = Journal.open(place, head, false, () => {})
      journal.append(unit(9))
      journal.close()
      expect(reopen(place).units).toEqual([...expected, 9])
    }
  })

  it('keeps nothing after a line that was changed on the disk, and says so', () => {
    const place = filled([0, 1, 2])
    const path = join(place, journalName)
    writeFileSync(path, readFileSync(path, 'utf8').replace('"examined":1', '"examined":7'))
    const { units, notes } = reopen(place)
    expect(units).toEqual([0])
    expect(notes.join()).toContain('computed again')
  })

  it('reads a file longer than its chunks', () => {
    const place = folder()
    const journal = Journal.open(place, head, false, () => {})
    journal.close()
    const long = { ...unit(0), padding: 'x'.repeat(5000) } as JournalEntry
    appendFileSync(join(place, journalName), Array.from({ length: 700 }, () => encodeLine(long)).join(''))
    expect(reopen(place).units).toHaveLength(700)
  })

  it('of another search is kept under its own name, and comes back when the job is changed back', () => {
    const place = filled([0, 1])
    const other = { ...head, resume_hash: 'cd'.repeat(32) }
    expect(reopen(place, other).units).toEqual([])
    expect(readdirSync(place).sort()).toEqual([`journal-${'ab'.repeat(6)}.ndjson`, journalName])
    expect(reopen(place).units).toEqual([0, 1])
    expect(readdirSync(place).sort()).toEqual([`journal-${'cd'.repeat(6)}.ndjson`, journalName])
  })

  it('is renamed, not lost, when a run starts afresh', () => {
    const place = filled([0, 1])
    expect(reopen(place, head, true).units).toEqual([])
    expect(reopen(place, head, true).units).toEqual([])
    expect(readdirSync(place)).toHaveLength(3)
  })

  it('from a machine whose arithmetic differs is refused with both checksums', () => {
    const place = filled([0])
    const elsewhere = { ...head, checksum: '00000000' }
    expect(() => reopen(place, elsewhere)).toThrow(RunError)
    expect(() => reopen(place, elsewhere)).toThrow(/c8fd25b4.*00000000/)
    expect(reopen(place).units).toEqual([0])
  })

  it('goes on with another kernel that computes the same', () => {
    expect(reopen(filled([0]), { ...head, kernel: 'wasm-simd' }).units).toEqual([0])
  })
})

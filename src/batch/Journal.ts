import {
  closeSync,
  existsSync,
  fstatSync,
  fsyncSync,
  ftruncateSync,
  openSync,
  readSync,
  renameSync,
  writeSync,
} from 'node:fs'
import { dirname, join } from 'node:path'
import { decodeLine, encodeLine, type JournalEntry, type JournalHead } from './journalLine.js'
import { RunError } from './RunError.js'

export const journalName = 'journal.ndjson'

/**
 * The finished work of a job, one line each, forced to the disk before it counts. A line that a kill or a power cut left in the
 * middle is cut off when the journal is opened; what it stood for is done again.
 */
export class Journal {
  private constructor(
    private readonly file: number,
    /** What became of an earlier journal, in sentences. */
    readonly notes: readonly string[],
  ) {}

  /**
   * Opens or starts the journal of `folder` and hands every entry that it holds to `read`, in the order in which they were written.
   * The journal of another search (its resume hash differs) is kept under a name of its own, and one of this search that was so
   * kept comes back. `fresh`: the old journal is renamed whatever it holds.
   *
   * @throws RunError when it was computed by a machine whose arithmetic differs
   */
  static open(folder: string, head: JournalHead, fresh: boolean, read: (entry: JournalEntry) => void): Journal {
    const path = join(folder, journalName)
    const notes: string[] = []
    const old = existsSync(path) ? headOf(path) : null
    if (existsSync(path) && (fresh || old === null || old.resume_hash !== head.resume_hash)) {
      const kept = freeName(folder, old)
      renameSync(path, join(folder, kept))
      notes.push(`${whyKept(old, head, fresh)} It is kept as ${kept}.`)
    }
    const earlier = join(folder, keptName(head.resume_hash))
    if (!fresh && !existsSync(path) && existsSync(earlier)) {
      renameSync(earlier, path)
      notes.push('This very job was run here before: its journal goes on.')
    }
    const file = openSync(path, existsSync(path) ? 'r+' : 'wx+')
    try {
      const { end, damaged } = readEntries(file, (entry) => {
        if ('head' in entry) refuseOther(path, entry.head, head)
        else read(entry)
      })
      if (damaged) notes.push(`${journalName} was cut after its last whole line; what came after it is computed again.`)
      ftruncateSync(file, end)
      const journal = new Journal(file, notes)
      if (end === 0) journal.append({ head })
      syncFolder(dirname(path))
      return journal
    } catch (error) {
      closeSync(file)
      throw error
    }
  }

  /** Returns when the entry is on the disk. */
  append(entry: JournalEntry): void {
    const bytes = Buffer.from(encodeLine(entry))
    let written = 0
    const { size } = fstatSync(this.file)
    while (written < bytes.length) {
      written += writeSync(this.file, bytes, written, bytes.length - written, size + written)
    }
    fsyncSync(this.file)
  }

  close(): void {
    closeSync(this.file)
  }
}

function refuseOther(path: string, found: JournalHead, wanted: JournalHead): void {
  if (found.checksum === wanted.checksum) return
  throw new RunError(
    `${path} was computed where the fixed calculation gives ${found.checksum} (kernel ${found.kernel}); here it gives ` +
      `${wanted.checksum} (kernel ${wanted.kernel}). The same job would not give the same answer. Go on where it was begun, or ` +
      'start anew with --fresh.',
  )
}

function whyKept(old: JournalHead | null, head: JournalHead, fresh: boolean): string {
  if (old === null) return `${journalName} had no whole first line.`
  if (fresh) return 'The old journal is left aside, as asked.'
  if (old.engine !== head.engine)
    return `The old journal is of engine ${old.engine}, this is ${head.engine}: the search starts anew.`
  return 'The job has changed since its last run, and the search starts anew. The old journal may be wanted again.'
}

/** Kept journals are named after their search, so that it can go on when the job is changed back. */
function keptName(resumeHash: string): string {
  return `journal-${resumeHash.slice(0, 12)}.ndjson`
}

function freeName(folder: string, head: JournalHead | null): string {
  const name = head ? keptName(head.resume_hash) : 'journal-unread.ndjson'
  if (!existsSync(join(folder, name))) return name
  for (let n = 2; ; n++) {
    const numbered = name.replace('.ndjson', `-${n}.ndjson`)
    if (!existsSync(join(folder, numbered))) return numbered
  }
}

function headOf(path: string): JournalHead | null {
  const file = openSync(path, 'r')
  try {
    let head: JournalHead | null = null
    readEntries(file, (entry) => {
      if ('head' in entry) head = entry.head
      return false
    })
    return head
  } finally {
    closeSync(file)
  }
}

const chunkBytes = 1 << 20

/**
 * Reads whole lines until `read` returns false or one is damaged; `end` is where the last good one ends. Memory does not grow
 * with the file.
 */
function readEntries(file: number, read: (entry: JournalEntry) => unknown): { end: number; damaged: boolean } {
  const chunk = Buffer.alloc(chunkBytes)
  let rest = Buffer.alloc(0)
  let end = 0
  for (;;) {
    const count = readSync(file, chunk, 0, chunkBytes, end + rest.length)
    if (count === 0) return { end, damaged: rest.length > 0 }
    let bytes = Buffer.concat([rest, chunk.subarray(0, count)])
    for (let stop = bytes.indexOf(10); stop >= 0; stop = bytes.indexOf(10)) {
      const entry = decodeLine(bytes.toString('utf8', 0, stop))
      if (entry === null) return { end, damaged: true }
      end += stop + 1
      if (read(entry) === false) return { end, damaged: false }
      bytes = bytes.subarray(stop + 1)
    }
    rest = Buffer.from(bytes)
  }
}

function syncFolder(folder: string): void {
  const handle = openSync(folder, 'r')
  try {
    fsyncSync(handle)
  } finally {
    closeSync(handle)
  }
}

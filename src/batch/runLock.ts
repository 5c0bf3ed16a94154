import { linkSync, readFileSync, renameSync, rmSync, writeFileSync } from 'node:fs'
import { hostname } from 'node:os'
import { join } from 'node:path'
import { RunError } from './RunError.js'

const lockName = 'run.lock'

/** Locks of this very process, whose number a dead one may have had before. */
const held = new Set<string>()

/**
 * Keeps two runs out of one folder. A lock whose process is gone (kill -9, power cut) is taken over.
 *
 * @returns gives the lock back
 * @throws RunError when another run has it, or may have it on another machine
 */
export function takeLock(folder: string): () => void {
  const path = join(folder, lockName)
  const mine = JSON.stringify({ pid: process.pid, host: hostname(), since: new Date().toISOString() })
  for (let attempt = 0; attempt < 10; attempt++) {
    if (create(path, mine)) {
      held.add(path)
      return () => release(path, mine)
    }
    const found = contents(path)
    if (found === null) continue
    const holder = parse(found)
    if (holder === null) throw new RunError(`${path} is no lock of a run. Look at it, and delete it.`)
    if (!isGone(path, holder)) throw new RunError(sentence(path, holder))
    // Several may see the dead lock; only who moves that very one away goes on.
    const aside = `${path}.${process.pid}`
    try {
      renameSync(path, aside)
    } catch {
      continue
    }
    const moved = contents(aside)
    rmSync(aside, { force: true })
    if (moved !== found && moved !== null) create(path, moved)
  }
  throw new RunError(`${path} can't be taken. Is another run starting in the same folder?`)
}

interface Holder {
  readonly pid: number
  readonly host: string
  readonly since: string
}

/** Whole or not at all: a lock is never seen half written. */
function create(path: string, text: string): boolean {
  const draft = `${path}.${process.pid}.new`
  writeFileSync(draft, text, { flush: true })
  try {
    linkSync(draft, path)
    return true
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code === 'EEXIST') return false
    throw error
  } finally {
    rmSync(draft, { force: true })
  }
}

function release(path: string, mine: string): void {
  held.delete(path)
  if (contents(path) === mine) rmSync(path, { force: true })
}

function contents(path: string): string | null {
  try {
    return readFileSync(path, 'utf8')
  } catch {
    return null
  }
}

/** Null for a lock that nobody wrote. */
function parse(text: string): Holder | null {
  try {
    const { pid, host, since } = JSON.parse(text) as Partial<Holder>
    return typeof pid === 'number' && typeof host === 'string' ? { pid, host, since: String(since) } : null
  } catch {
    return null
  }
}

function isGone(path: string, { pid, host }: Holder): boolean {
  if (host !== hostname()) return false
  if (pid === process.pid) return !held.has(path)
  try {
    process.kill(pid, 0)
    return false
  } catch (error) {
    return (error as NodeJS.ErrnoException).code === 'ESRCH'
  }
}

function sentence(path: string, { pid, host, since }: Holder): string {
  const away =
    host === hostname() ? '' : ` Whether it still runs can't be seen from here; if it does not, delete ${path}.`
  return `Another run has this folder: process ${pid} on ${host}, since ${since}. Let it end, or give --results.${away}`
}

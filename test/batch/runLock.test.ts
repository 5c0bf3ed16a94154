import { spawnSync } from 'node:child_process'
import { mkdtempSync, readdirSync, writeFileSync } from 'node:fs'
import { hostname, tmpdir } from 'node:os'
import { join } from 'node:path'
import { describe, expect, it } from 'vitest'
import { RunError } from '../../src/batch/RunError.js'
import { takeLock } from '../../src/batch/runLock.js'

const folder = () => mkdtempSync(join(tmpdir(), 'lock-'))
const lock = (pid: number, host = hostname()) => JSON.stringify({ pid, host, since: '2026-12-01T20:00:00.000Z' })

describe('the lock of a results folder', () => {
  it('is had by one at a time, and leaves nothing behind', () => {
    const place = folder()
    const release = takeLock(place)
    expect(() => takeLock(place)).toThrow(RunError)
    release()
    expect(readdirSync(place)).toEqual([])
    takeLock(place)()
  })

  it('of a process that lives is respected, with its number and time', () => {
    const place = folder()
    writeFileSync(join(place, 'run.lock'), lock(process.ppid))
    expect(() => takeLock(place)).toThrow(`process ${process.ppid} on ${hostname()}, since 2026-12-01T20:00`)
  })

  it('of a process that is gone is taken over', () => {
    const gone = spawnSync(process.execPath, ['-e', '']).pid
    const place = folder()
    writeFileSync(join(place, 'run.lock'), lock(gone))
    takeLock(place)()
    expect(readdirSync(place)).toEqual([])
  })

  it('of another machine is left to the engineer', () => {
    const place = folder()
    writeFileSync(join(place, 'run.lock'), lock(1, 'elsewhere'))
    expect(() => takeLock(place)).toThrow(/elsewhere.*delete .*run\.lock/s)
  })

  it('that is none is not thrown away', () => {
    const place = folder()
    writeFileSync(join(place, 'run.lock'), 'keep me')
    expect(() => takeLock(place)).toThrow('no lock of a run')
  })
})

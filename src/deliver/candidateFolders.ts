import { lstatSync, mkdirSync, readdirSync, rmdirSync, rmSync } from 'node:fs'
import { join } from 'node:path'
import { partSuffix } from './writeFileWhole.js'

/** What this program puts into a candidate's folder; all that it may ever remove from one. */
const ours = ['layers.csv', 'spectrum.csv', 'resonances.csv', 'profile.csv', 'transmission.svg', 'profile.svg']

/** candidate-01, ..., candidate-99, candidate-100. */
export function candidateFolder(rank: number): string {
  return `candidate-${String(rank).padStart(2, '0')}`
}

/**
 * Makes a candidate's folder and gives its path.
 *
 * @throws Error when something else stands there: through a link, files would land outside the results
 */
export function openCandidateFolder(results: string, rank: number): string {
  const folder = join(results, candidateFolder(rank))
  const there = lstatSync(folder, { throwIfNoEntry: false })
  if (there !== undefined && !there.isDirectory()) {
    throw new Error(`${folder} is ${there.isSymbolicLink() ? 'a link' : 'no folder'}. Move it away and run again.`)
  }
  mkdirSync(folder, { recursive: true })
  return folder
}

/**
 * Removes the folders of candidates that are no longer listed: only real folders directly under `results` with a name of ours, only
 * our own files in them, and the folder only when that leaves it empty. Links are neither followed nor removed.
 */
export function removeStaleCandidates(results: string, keep: ReadonlySet<string>): void {
  for (const entry of readdirSync(results, { withFileTypes: true })) {
    if (!entry.isDirectory() || !/^candidate-\d{2,}$/.test(entry.name) || keep.has(entry.name)) continue
    const folder = join(results, entry.name)
    for (const name of ours) {
      rmSync(join(folder, name), { force: true })
      rmSync(join(folder, name + partSuffix), { force: true })
    }
    if (readdirSync(folder).length === 0) rmdirSync(folder)
  }
}

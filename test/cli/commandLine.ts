import { type ChildProcess, spawn } from 'node:child_process'
import { mkdtempSync, readdirSync, readFileSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'

const main = fileURLToPath(new URL('../../dist/cli/main.js', import.meta.url))

export interface Ended {
  readonly code: number | null
  readonly stdout: string
  readonly stderr: string
}

/** Starts the built command in `cwd`. */
export function start(args: readonly string[], cwd: string): { child: ChildProcess; ended: Promise<Ended> } {
  const env = { ...process.env, NO_COLOR: '1' }
  const child = spawn(process.execPath, [main, ...args], { cwd, env })
  let stdout = ''
  let stderr = ''
  child.stdout.on('data', (data) => {
    stdout += data
  })
  child.stderr.on('data', (data) => {
    stderr += data
  })
  const ended = new Promise<Ended>((resolve) => {
    child.on('close', (code) => resolve({ code, stdout, stderr }))
  })
  return { child, ended }
}

export function command(args: readonly string[], cwd: string): Promise<Ended> {
  return start(args, cwd).ended
}

export function emptyFolder(): string {
  return mkdtempSync(join(tmpdir(), 'tunnelwright-'))
}

/** A job that a second searches: 63 stacks of the design's filter, some of which meet it. */
export const smallJob = `format: 1
name: small
kind: electron
temperature: 77 K
stack:
  entry: GaAs
  layers:
    - { id: outer, material: AlGaAs, x: { pick: [0.25, 0.35] }, width: 10..12 ML }
    - { id: well, material: GaAs, width: 15..20 ML }
    - { like: outer }
  exit: GaAs
target:
  scan: 5..200 meV
  demands:
    - { peak: 80 meV, within: 5 meV, fwhm: 1..4 meV, height: 0.8 }
    - { block: 5..60 meV, below: 2e-2, points: 8 }
growth:
  sources: { Ga: 0.70 ML/s, Al-1: 0.233 ML/s, Al-2: 0.377 ML/s }
  compositions: 1
  trials: 64
search: { method: sampled, effort: brief, seed: 11 }
deliver: { candidates: 4 }
`

export function withJob(text = smallJob): string {
  const folder = emptyFolder()
  writeFileSync(join(folder, 'job.yaml'), text)
  return folder
}

/** Every CSV and SVG below a folder, by its path. */
export function tablesAndPictures(folder: string): Map<string, string> {
  const names = readdirSync(folder, { recursive: true }) as string[]
  const wanted = names.filter((name) => /\.(csv|svg)$/.test(name)).sort()
  return new Map(wanted.map((name) => [name, readFileSync(join(folder, name), 'utf8')]))
}

/** How many units a journal holds. */
export function unitsIn(folder: string): number {
  return readFileSync(join(folder, 'journal.ndjson'), 'utf8').split('"entry":{"unit"').length - 1
}

import { type BoundJob, problemOf } from '../../../src/batch/problem.js'
import { readJobText } from '../../../src/job/index.js'
import { Archive, type Found, planComplete, runSlice, type SliceResult } from '../../../src/search/index.js'
import type { Score } from '../../../src/target/index.js'

/** Numbers from 0 to 1 that a seed fixes. */
export function seeded(seed: number): () => number {
  let state = seed >>> 0
  return () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0
    return state / 4294967296
  }
}

/** A job of electrons by parts of its YAML. */
export function boundJob({ stack, demands, rest = '' }: { stack: string; demands: string; rest?: string }): BoundJob {
  const text = `format: 1\nname: test\nkind: electron\nstack:\n${stack}\ntarget:\n  scan: 5..220 meV\n  demands:\n${demands}\n${rest}`
  const bound = problemOf(readJobText(text, 'test.yaml'))
  const { problem } = bound
  // Brute force asks for every score, and the searches after it for many of them again.
  const scores = new Map<string, Score>()
  const score = (assignment: Int32Array) => {
    const key = assignment.join()
    if (!scores.has(key)) scores.set(key, problem.score(assignment))
    return scores.get(key)!
  }
  return { ...bound, problem: { ...problem, score } }
}

/** Every stack of a job in its order, each once, by the library's own merit: what a complete search must find. */
export function bruteForce({ problem, design }: BoundJob): Found[] {
  const stacks = new Map<string, Found>()
  for (const assignment of design.assignments()) {
    if (problem.canonical(assignment) !== assignment) continue
    const listed = Int32Array.from(assignment)
    const { met, merit, margin, totalNm, id } = problem.score(listed)
    if (!stacks.has(id)) stacks.set(id, { assignment: [...listed], score: { met, merit, margin, totalNm, id } })
  }
  return [...stacks.values()].sort((a, b) => problem.compare(a.score, b.score))
}

/** The first 256 by slices, folded as a run folds them, and the sums of their accounts. */
export function bySlices({ problem }: BoundJob, startBound: Score | null): { found: Found[]; accounts: SliceResult[] } {
  const plan = planComplete(problem)
  if ('refused' in plan) throw new Error(plan.refused)
  const archive = new Archive(problem.compare, plan.slices)
  const accounts: SliceResult[] = []
  for (let slice = 0; slice < plan.slices; slice++) {
    const result = runSlice(problem, plan, slice, startBound)
    accounts.push(result)
    archive.add({ ...result, unit: slice, cut: 0, stop: '' })
  }
  return { found: archive.best(256), accounts }
}

/** Stacks of every structure, some hundreds to some thousands each; `r` chooses their numbers. */
export const structures: Readonly<Record<string, (r: () => number) => string>> = {
  'three layers': (r) =>
    `  entry: GaAs
  layers:
    - { id: a, material: AlGaAs, x: 0.3, width: ${from(r, 4)}..${from(r, 13)} ML }
    - { id: b, material: GaAs, width: ${from(r, 10)}..${from(r, 22)} ML }
    - { id: c, material: AlGaAs, x: 0.3, width: ${from(r, 4)}..${from(r, 13)} ML }
  exit: GaAs`,
  'numbers between unequal leads': (r) =>
    `  entry: { potential: 0 eV, mass: 0.067 }
  layers:
    - { potential: 0.2..0.3 eV step 50 meV, mass: 0.09, width: 1..2 nm step 0.25 nm }
    - { potential: ${-20 + 40 * r()} meV, mass: 0.067, width: 4..7 nm step 0.2 nm }
    - { potential: 0.25 eV, mass: 0.09, width: 1..2.4 nm step 0.2 nm }
  exit: { potential: -40 meV, mass: 0.067 }`,
  ties: (r) =>
    `  entry: GaAs
  layers:
    - { id: a, material: AlGaAs, x: { pick: [0.2, 0.3] }, width: ${from(r, 4)}..${from(r, 12)} ML }
    - { id: b, material: GaAs, width: ${from(r, 12)}..${from(r, 22)} ML }
    - { id: c, material: AlGaAs, x: 0.3, width: 4..8 ML }
    - { like: b }
    - { like: a }
  exit: GaAs`,
  mirror: (r) =>
    `  entry: GaAs
  layers:
    - { id: a, material: AlGaAs, x: 0.35, width: ${from(r, 3)}..${from(r, 10)} ML }
    - { id: b, material: GaAs, width: ${from(r, 12)}..${from(r, 20)} ML }
    - { id: c, material: AlGaAs, x: 0.35, width: ${from(r, 5)}..${from(r, 14)} ML }
  mirror: true
  exit: GaAs`,
  repeats: (r) =>
    `  entry: GaAs
  layers:
    - { id: a, material: AlGaAs, x: 0.3, width: ${from(r, 3)}..${from(r, 10)} ML }
    - repeat: 3
      period:
        - { id: w, material: GaAs, width: ${from(r, 10)}..${from(r, 18)} ML }
        - { id: b, material: AlGaAs, x: 0.3, width: 5..${from(r, 10)} ML }
    - { like: w }
    - { like: a }
  exit: GaAs`,
  'picks and a composition limit': (r) =>
    `  entry: GaAs
  layers:
    - { id: a, material: AlGaAs, x: { pick: [0.2, 0.3, 0.4] }, width: ${from(r, 5)}..${from(r, 8)} ML }
    - { id: b, material: { pick: [GaAs, InGaAs] }, x: { pick: [0.05, 0.1] }, width: ${from(r, 14)}..${from(r, 18)} ML }
    - { id: c, material: AlGaAs, x: { pick: [0.2, 0.3, 0.4] }, width: ${from(r, 5)}..${from(r, 8)} ML }
  exit: GaAs`,
  'layers that vanish and merge': (r) =>
    `  entry: GaAs
  layers:
    - { id: a, material: AlGaAs, x: 0.3, width: 0..${from(r, 6)} ML }
    - { id: b, material: AlGaAs, x: { pick: [0.3, 0.2] }, width: ${from(r, 3)}..${from(r, 6)} ML }
    - { id: c, material: GaAs, width: ${from(r, 14)}..${from(r, 18)} ML }
    - { id: d, material: AlGaAs, x: 0.3, width: ${from(r, 5)}..${from(r, 8)} ML }
  exit: GaAs`,
}

/** Demands of every kind, met by some stacks or by none. */
export const targets: Readonly<Record<string, (r: () => number) => string>> = {
  'a pass and blocks': (r) =>
    `    - { pass: ${Math.round(70 + 30 * r())}..105 meV, above: 0.7, points: 8 }
    - { block: 5..50 meV, below: 1e-2, points: 16 }
    - { block: 150..200 meV, below: 5e-2, weight: 0.5, points: 16 }`,
  'blocks that many stacks meet': (r) =>
    `    - { block: ${Math.round(10 + 20 * r())}..45 meV, below: 5e-2, points: 24 }
    - { block: 130..135 meV, below: 0.4, points: 8 }`,
  'a peak and blocks': (r) =>
    `    - { peak: ${Math.round(75 + 20 * r())} meV, within: 5 meV, fwhm: 1..5 meV, height: 0.8 }
    - { block: 5..50 meV, below: 2e-2, points: 16 }`,
  'a peak alone': (r) => `    - { peak: ${Math.round(75 + 20 * r())} meV, within: 2 meV, fwhm: 2..4 meV }`,
}

function from(r: () => number, least: number): number {
  return least + Math.floor(3 * r())
}

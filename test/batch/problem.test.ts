import { fileURLToPath } from 'node:url'
import { describe, expect, it } from 'vitest'
import { problemOf } from '../../src/batch/problem.js'
import { readJob } from '../../src/job/index.js'
import { Archive, type Found, runUnit } from '../../src/search/index.js'

const pathOf = (relative: string) => fileURLToPath(new URL(relative, import.meta.url))
const coldCollector = await readJob(pathOf('../../jobs/cold-collector-80.yaml'))

describe('the main example, every stack looked at', () => {
  const { problem, design, target } = problemOf(coldCollector)
  const all: Found[] = []
  let boundsHold = true
  for (const assignment of design.assignments()) {
    const score = problem.score(assignment)
    boundsHold &&= problem.bound(assignment) <= score.merit * (1 + 1e-12)
    all.push({ assignment: [...assignment], score })
  }
  all.sort((a, b) => problem.compare(a.score, b.score))
  const met = all.filter(({ score }) => score.met)
  const text = ({ assignment }: Found) => design.text(Int32Array.from(assignment))

  it('has 630 stacks, of which eight meet all limits, in both alloys', () => {
    expect(all.length).toBe(630)
    expect(new Set(all.map(({ score }) => score.id)).size).toBe(630)
    expect(design.stackCount()).toBe(630)
    // Eight, in both alloys: worked-example.md.
    expect(met.length).toBe(8)
    expect(new Set(met.map(({ assignment }) => assignment[0]))).toEqual(new Set([0, 1]))
    expect(text(met[0])).toBe('AlGaAs(0.35) 12 / GaAs 18 / AlGaAs(0.35) 12 ML')
    expect(met[0].score.margin).toBeCloseTo(1.7082, 5)
  })

  it('has bounds that are bounds, and goals that its stacks reach', () => {
    expect(boundsHold).toBe(true)
    const best = Int32Array.from(met[0].assignment)
    expect(target.evaluate(design.systems(best)).met).toBe(true)
    expect(problem.score(best).totalNm).toBe(design.totalNm(best))
  })

  it('is found by 64 units: the same eight, the same order, and the best of the unmet after them', () => {
    const results = Array.from({ length: 64 }, (_, unit) => runUnit(problem, unit, 'brief'))
    const archive = new Archive(problem.compare, 64)
    for (const result of results) archive.add(result)
    const ids = (found: readonly Found[]) => found.map(({ score }) => score.id)
    expect(ids(archive.best(8))).toEqual(ids(met))
    expect(ids(archive.best(64))).toEqual(ids(all.slice(0, 64)))
    expect(archive.best(64).map(({ score }) => score.merit)).toEqual(all.slice(0, 64).map(({ score }) => score.merit))
    expect(archive.startsInBest).toBeGreaterThan(32)

    // A unit run alone, on rooms bound anew, and read back from a line of JSON is the same unit.
    for (const unit of [63, 17, 0]) {
      const alone = runUnit(problemOf(coldCollector).problem, unit, 'brief')
      expect(JSON.parse(JSON.stringify(alone))).toEqual(results[unit])
    }
  })
})

/** Merit squared of scipy's best in 60 s (speed.md, section 5), to its digits. */
const benchmarks = [
  { task: 'a', units: 2, best: 0.007783 },
  { task: 'b', units: 2, best: 0.006412 },
  { task: 'd', units: 8, best: 0.000342 },
]

describe.each(benchmarks)('bench task $task', ({ task, units, best }) => {
  const path = pathOf(`../bench/tasks/${task}.yaml`)

  it(`reaches the best known merit in ${units} units`, async () => {
    const { problem } = problemOf(await readJob(path))
    const archive = new Archive(problem.compare, units)
    for (let unit = 0; unit < units; unit++) archive.add(runUnit(problem, unit, '1'))
    const { merit } = archive.best(1)[0].score
    expect(merit).toBeLessThan(Math.sqrt(best + 5e-7))
  })
})

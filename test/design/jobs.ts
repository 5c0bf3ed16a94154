import { readFileSync } from 'node:fs'
import { designOf } from '../../src/design/index.js'
import { type Job, readJobText } from '../../src/job/index.js'

const file = new URL('../../jobs/cold-collector-80.yaml', import.meta.url)

export function coldCollector(): Job {
  return readJobText(readFileSync(file, 'utf8'), 'cold-collector-80.yaml')
}

/** A job whose stack section is `stack`, indented by two; the rest is the least that a job needs. */
export function jobWith(stack: string, rest = ''): Job {
  const head = ['format: 1', 'name: test', 'kind: electron', 'stack:', '  entry: GaAs']
  const target = ['target:', '  scan: 5..200 meV', '  demands: [{ block: 5..60 meV, below: 0.1 }]']
  const exit = stack.includes('exit:') ? [] : ['  exit: GaAs']
  return readJobText([...head, stack, ...exit, ...target, rest].join('\n'), 'test.yaml')
}

/** The same by numbers only, leads at 0. */
export function numbersJob(layers: string, rest = ''): Job {
  const stack = `  entry: { potential: 0 eV, mass: 0.067 }\n  layers:\n${layers}\n  exit: { potential: 0 eV, mass: 0.067 }`
  const target = 'target:\n  scan: 5..200 meV\n  demands: [{ block: 5..60 meV, below: 0.1 }]'
  return readJobText(`format: 1\nname: test\nkind: electron\nstack:\n${stack}\n${target}\n${rest}`, 'test.yaml')
}

/** Ids of all stacks that the lattice holds, mirror images once. */
export function distinctIds(job: Job): Set<string> {
  const design = designOf(job)
  const ids = new Set<string>()
  for (const assignment of design.assignments()) ids.add(design.id(design.canonical(assignment)))
  return ids
}

import { describe, expect, test } from 'vitest'
import { JobError, readJobText } from '../../src/job/index.js'

const job = (rest: string, demand = '{ peak: 80 meV, within: 5 meV }', scan = '5..200 meV') => `format: 1
name: any
kind: electron
stack: { entry: GaAs, layers: [{ id: a, material: AlAs, width: 3 ML }, { id: b, material: GaAs, width: 9 ML }], exit: GaAs }
target: { scan: ${scan}, demands: [${demand}] }
${rest}`

const complaint = (text: string): string => {
  try {
    readJobText(text, 'any.yaml')
  } catch (error) {
    expect(error).toBeInstanceOf(JobError)
    return (error as JobError).message
  }
  throw new Error('The job was read.')
}

describe('the conditions of a job', () => {
  test('are one without the section, from the top', () => {
    const { conditions } = readJobText(job('temperature: 4.2 K\nbias: -120 mV\nin-plane: 3 meV\n'), 'any.yaml')
    expect(conditions).toEqual([
      { name: '', temperatureK: 4.2, biasV: -0.12, inPlaneEv: 0.003, angleDeg: 0, polarisation: 's' },
    ])
  })

  test('take from the top what they do not state', () => {
    const rest =
      'temperature: 77 K\nbias: 1 mV\nconditions: { rest: { bias: 0 mV }, on: { bias: 0.35 V }, warm: { temperature: 300 K } }\n'
    expect(readJobText(job(rest), 'any.yaml').conditions).toEqual([
      { name: 'rest', temperatureK: 77, biasV: 0, inPlaneEv: 0, angleDeg: 0, polarisation: 's' },
      { name: 'on', temperatureK: 77, biasV: 0.35, inPlaneEv: 0, angleDeg: 0, polarisation: 's' },
      { name: 'warm', temperatureK: 300, biasV: 0.001, inPlaneEv: 0, angleDeg: 0, polarisation: 's' },
    ])
    expect(readJobText(job(rest), 'any.yaml').notes.join()).not.toContain('assumed.\nThe job states no temperature')
  })

  test('are named by demands, and a name that is none is an error with the nearest one', () => {
    const rest = 'conditions: { rest: { bias: 0 mV }, loaded: { bias: 350 mV } }\n'
    expect(readJobText(job(rest, '{ peak: 80 meV, within: 5 meV, at: loaded }'), 'any.yaml').demands[0].at).toBe(
      'loaded',
    )
    expect(complaint(job(rest, '{ peak: 80 meV, within: 5 meV, at: loadde }'))).toContain(
      'no condition "loadde". Did you mean "loaded"?',
    )
    expect(complaint(job('', '{ peak: 80 meV, within: 5 meV, at: on }'))).toContain(
      'no condition "on". Add "conditions:" with it.',
    )
  })

  test('bias over names the first and the last layer', () => {
    expect(readJobText(job('bias: 9 mV\nbias over: [a, b]\n'), 'any.yaml').stack.biasOver).toEqual(['a', 'b'])
    expect(readJobText(job('bias: 9 mV\n'), 'any.yaml').stack.biasOver).toBeNull()
    expect(complaint(job('bias over: [b, a]\n'))).toContain(
      'The first layer stands behind the last. Write "bias over: [a, b]".',
    )
    expect(complaint(job('bias over: [a, c]\n'))).toContain('no layer with the id "c"')
    expect(complaint(job('bias over: [a]\n'))).toContain('takes two ids')
  })

  test('have units, and limits', () => {
    expect(complaint(job('bias: 350\n'))).toContain('bias "350" has no unit. Write "350 mV" or "350 V".')
    expect(complaint(job('bias: 12 V\n'))).toContain('is more than 10 V')
    expect(complaint(job('conditions: { on: { in-plane: -3 meV } }\n'))).toContain('is negative')
    expect(complaint(job('conditions: { on: { angle: 3 deg } }\n'))).toContain('belongs to jobs with kind: light')
    expect(complaint(job('conditions: {}\n'))).toContain('There are no conditions.')
    expect(complaint(job('conditions: { "1": { bias: 3 mV } }\n'))).toContain('The condition "1" has no name')
  })

  test('a scan starts above the in-plane energy, for its energies are total ones', () => {
    expect(complaint(job('in-plane: 20 meV\n'))).toContain('starts at or below the in-plane energy, 20 meV')
    expect(readJobText(job('in-plane: 20 meV\n', undefined, '21..200 meV'), 'any.yaml').conditions[0].inPlaneEv).toBe(
      0.02,
    )
  })
})

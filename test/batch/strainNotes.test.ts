import { describe, expect, it } from 'vitest'
import { strainNotes } from '../../src/batch/strainNotes.js'
import { designOf } from '../../src/design/index.js'
import { readJobText } from '../../src/job/index.js'

/** Layers of a job that leaves nothing to choose, and what they are strained to. */
function notesOf(lead: string, layers: string): string[] {
  const text = `format: 1
name: any
kind: electron
stack: { entry: ${lead}, layers: [${layers}], exit: ${lead} }
target: { scan: 5..200 meV, demands: [{ peak: 80 meV, within: 5 meV }] }
`
  const design = designOf(readJobText(text, 'any.yaml'))
  return strainNotes(design.layers(new Int32Array(design.places.length)), design.situations[0].substrateNm)
}

describe('notes on strain', () => {
  it('are none where the crystals nearly match', () => {
    expect(notesOf('GaAs', '{ material: AlAs, width: 20 ML }')).toEqual([])
  })

  it('give the mean strain of a thin layer, which grows as it is', () => {
    const [only, ...more] = notesOf('InP', '{ material: AlAs, width: 3 ML }, { material: InP, width: 20 ML }')
    expect(more).toEqual([])
    // AlAs on InP: +3.685 % (lattice constants 0.56611 and 0.58697 nm), over 3 of its own strained monolayers of 0.27414 nm.
    const nm = 3 * 0.27414
    expect(only).toMatch(/^The mean strain of the stack is [\d.]+ %/)
    expect(Number(/is ([\d.]+) %/.exec(only)![1])).toBeCloseTo((3.685 * nm) / (nm + 20 * 0.293485), 2)
  })

  it('warn of one thicker than its critical thickness, with both', () => {
    const notes = notesOf('InP', '{ material: AlAs, width: 40 ML }')
    expect(notes[0]).toMatch(/^AlAs, 11 nm thick, is strained by 3.6\d % and thicker than its critical thickness of \d/)
    expect(notes).toHaveLength(2)
  })
})

import { material } from './materials.js'

/** Above this share of Al the X valley of AlGaAs comes near or under the Gamma edge (they cross at x = 0.43, 300 K). */
const alGaAsLimit = 0.4

/**
 * What an engineer must know about a material at a composition and temperature: sentences, none when all is well.
 * Throws MaterialError for an unknown name.
 */
export function materialNotes(name: string, x: number | null, temperatureK: number): string[] {
  const listed = material(name)
  const { temperatureK: range } = listed
  const notes: string[] = []
  if ((name === 'AlGaAs' && x !== null && x > alGaAsLimit) || name === 'AlAs') {
    notes.push(
      `${x === null ? name : `${name} x = ${x}`}: above x = ${alGaAsLimit} in AlGaAs the X valley lies near or below the ` +
        'Gamma edge; electrons leak through it, and this one-valley calculation does not see that path.',
    )
  }
  if (name !== 'AlAs' && listed.kind === 'binary' && listed.gapX && listed.gapX.zero.value < listed.gap.zero.value) {
    notes.push(
      `${name}: its X valley lies below the Gamma edge; electrons leak through it, and this one-valley calculation does not see that path.`,
    )
  }
  if (temperatureK < range[0] || temperatureK > range[1]) {
    notes.push(`${name}: ${temperatureK} K is outside ${range[0]}..${range[1]} K, where its numbers are meant to hold.`)
  }
  return notes
}

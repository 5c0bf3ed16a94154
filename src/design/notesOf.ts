import type { Lattice } from './Lattice.js'

/** What became of fixed nm: a sentence for each medium whose monolayers they are not a whole number of. */
export function notesOf({ layers }: Lattice): string[] {
  return layers.flatMap((layer) => {
    const { unit, from, to } = layer.spec.width!
    if (unit !== 'nm' || from !== to) return []
    const media = layer.options.flatMap((_, option) => [...layer.widthMedia(option)])
    return media.flatMap(({ widths, choice, key }) => {
      const nm = widths.first * widths.stepNm
      if (choice.kind !== 'material' || Math.abs(nm - from) <= 1e-9) return []
      const tied = `${Number(nm.toFixed(4))} nm`
      return [`Layer ${layer.spec.id}: ${from} nm of ${key} is taken as ${widths.first} ML, ${tied}.`]
    })
  })
}

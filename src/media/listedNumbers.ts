import type { Material, Sourced } from './material.js'

export interface ListedNumber extends Sourced {
  /** In the words of a table: `direct gap at 0 K`, `bowing of the direct gap`. */
  readonly name: string
}

/** Every number behind a material, for a table: of a binary its own, of an alloy its bowings (the rest is linear in x). */
export function listedNumbers(material: Material): ListedNumber[] {
  if (material.kind === 'alloy') {
    return Object.entries(material.bowings).flatMap(([of, bowing]) => [
      { name: `bowing of the ${words[of as keyof typeof words]}`, ...bowing.constant },
      ...(bowing.slope ? [{ name: `bowing of the ${words[of as keyof typeof words]}, per x`, ...bowing.slope }] : []),
    ])
  }
  return [
    { name: 'lattice constant at 300 K', ...material.lattice },
    { name: 'direct gap at 0 K', ...material.gap.zero },
    { name: 'Varshni alpha of the direct gap', ...material.gap.alpha },
    { name: 'Varshni beta of the direct gap', ...material.gap.beta },
    ...(material.gapX
      ? [
          { name: 'X gap at 0 K', ...material.gapX.zero },
          { name: 'Varshni alpha of the X gap', ...material.gapX.alpha },
          { name: 'Varshni beta of the X gap', ...material.gapX.beta },
        ]
      : []),
    { name: 'band-edge mass', ...material.mass },
    { name: 'valence band offset', ...material.vbo },
    { name: 'deformation potential a_c', ...material.ac },
    { name: 'deformation potential a_v', ...material.av },
    { name: 'elastic constant c11', ...material.c11 },
    { name: 'elastic constant c12', ...material.c12 },
  ]
}

const words = {
  gap: 'direct gap',
  gapX: 'X gap',
  mass: 'band-edge mass',
  vbo: 'valence band offset',
  ac: 'deformation potential a_c',
}

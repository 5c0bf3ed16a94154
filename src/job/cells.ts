import type { Source } from './job.js'

/** The group III elements of a material, the first-named first: In, Ga of InGaAs. */
export function elementsOf(material: string): string[] {
  return material.match(/Al|Ga|In/g) ?? []
}

/** The compositions that pairs of cells, one for each element, give by their rates; ascending. */
export function reachableX([first, second]: readonly string[], cells: readonly Source[]): number[] {
  const of = (element: string) => cells.filter((cell) => cell.element === element)
  const found = of(first).flatMap((a) => of(second).map((b) => a.rate / (a.rate + b.rate)))
  return [...new Set(found)].sort((a, b) => a - b)
}

import { AlAs } from './AlAs.js'
import { AlGaAs } from './AlGaAs.js'
import { AlGaSb } from './AlGaSb.js'
import { AlSb } from './AlSb.js'
import { GaAs } from './GaAs.js'
import { GaSb } from './GaSb.js'
import { InAlAs } from './InAlAs.js'
import { InAs } from './InAs.js'
import { InGaAs } from './InGaAs.js'
import { InP } from './InP.js'
import { InSb } from './InSb.js'
import { MaterialError } from './MaterialError.js'
import type { Material } from './material.js'
import { nearest } from './nearest.js'

/** The built-in materials, in the order in which they are listed to a user. */
export const materials: readonly Material[] = [GaAs, AlAs, InAs, InP, GaSb, AlSb, InSb, AlGaAs, InGaAs, InAlAs, AlGaSb]

const byName: ReadonlyMap<string, Material> = new Map(materials.map((material) => [material.name, material]))

export const materialNames: readonly string[] = materials.map((material) => material.name)

export function isMaterial(name: string): boolean {
  return byName.has(name)
}

/** True for alloys, which are only defined with a composition x. Throws MaterialError for an unknown name. */
export function needsX(name: string): boolean {
  return material(name).kind === 'alloy'
}

/** Throws MaterialError with the nearest known names. */
export function material(name: string): Material {
  const found = byName.get(name)
  if (found) return found
  const near = nearest(name, materialNames)
  const hint = near.length > 0 ? `Did you mean ${near.join(' or ')}?` : `Known: ${materialNames.join(', ')}.`
  throw new MaterialError(`Unknown material "${name}". ${hint}`, near)
}

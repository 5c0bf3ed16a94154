import { MaterialError } from '../MaterialError.js'
import { nearest } from '../nearest.js'
import { Ag } from './Ag.js'
import { Al } from './Al.js'
import { Au } from './Au.js'
import { air } from './air.js'
import { CaF2 } from './CaF2.js'
import { Cu } from './Cu.js'
import { fusedSilica } from './fusedSilica.js'
import { Ge } from './Ge.js'
import { MgF2 } from './MgF2.js'
import { MgF2e } from './MgF2e.js'
import { NBK7 } from './NBK7.js'
import { Nb2O5 } from './Nb2O5.js'
import type { OpticalMaterial } from './OpticalMaterial.js'
import { Si } from './Si.js'
import { SiInfrared } from './SiInfrared.js'
import { SiO2 } from './SiO2.js'
import { sapphire } from './sapphire.js'
import { Ta2O5 } from './Ta2O5.js'
import { TiO2 } from './TiO2.js'
import { TiO2e } from './TiO2e.js'
import { vacuum } from './vacuum.js'
import { ZnS } from './ZnS.js'
import { ZnSe } from './ZnSe.js'

/** The built-in media of light, in the order in which they are listed to a user. */
export const opticalMaterials: readonly OpticalMaterial[] = [
  ...[air, vacuum, fusedSilica, NBK7, sapphire, MgF2, MgF2e, CaF2, ZnS, ZnSe, Si, SiInfrared, Ge, TiO2, TiO2e],
  ...[SiO2, Ta2O5, Nb2O5, Ag, Au, Cu, Al],
]

const byName: ReadonlyMap<string, OpticalMaterial> = new Map(opticalMaterials.map((one) => [one.name, one]))

export const opticalNames: readonly string[] = opticalMaterials.map(({ name }) => name)

export function isOptical(name: string): boolean {
  return byName.has(name)
}

/** Throws MaterialError with the nearest known names. */
export function opticalMaterial(name: string): OpticalMaterial {
  const found = byName.get(name)
  if (found) return found
  const near = nearest(name, opticalNames)
  const hint = near.length > 0 ? `Did you mean ${near.join(' or ')}?` : `Known: ${opticalNames.join(', ')}.`
  throw new MaterialError(`Unknown medium of light "${name}". ${hint}`, near)
}

import { readFileSync } from 'node:fs'
import type { Region } from '../wave/regionSystem.js'

/** Spectra and poles by independent arithmetic of at least 60 digits; the head of the file says how they were made. */
const file = new URL('./reference-open.json', import.meta.url)

export interface ReferencePoint {
  E: number
  k_par: number
  wavelength: number
  angle: number
  pol: 's' | 'p'
  T: string
  R: string
  A: string
  log10_T: string | null
  phase_t_rad: string | null
  phase_r_rad: string | null
  phase_time_t_fs: string | null
  phase_time_r_fs: string | null
  group_delay_t_fs: string | null
  rel_sens_T: number
  rel_sens_R: number
}

export interface ElectronCase {
  id: string
  title: string
  kind: 'electron'
  incidence: 'left' | 'right'
  left: Region
  layers: (Region & { d: number })[]
  right: Region & { hard_wall?: boolean }
  points: ReferencePoint[]
}

export interface LightRegion {
  n: number
  k: number
}

export interface OpticalCase {
  id: string
  title: string
  kind: 'optical'
  incidence: 'left' | 'right'
  left: LightRegion
  layers: (LightRegion & { d: number })[]
  right: LightRegion
  points: ReferencePoint[]
}

function cases(): (ElectronCase | OpticalCase)[] {
  return JSON.parse(readFileSync(file, 'utf8')).cases
}

export const electronCases = cases().filter((c) => c.kind === 'electron')
export const opticalCases = cases().filter((c) => c.kind === 'optical')

/** The relative error that a fair double-precision program keeps, as the head of the reference says. */
export function tolerance(relativeSensitivity: number): number {
  return Math.max(1e-12, 100 * relativeSensitivity)
}

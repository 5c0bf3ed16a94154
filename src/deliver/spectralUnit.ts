import type { Axis, Kind } from '../job/index.js'
import { hcEvNm } from '../media/index.js'
import type { PeakFigures } from '../target/index.js'
import { type Cell, meV } from './csv.js'
import { energyText, short } from './layerText.js'

/** What results tell spectra in: meV for electrons, vacuum wavelengths in nm for light. */
export interface SpectralUnit {
  readonly name: 'meV' | 'nm'
  /** Under an axis over the whole scan. */
  readonly axisName: string
  /** The place of an energy on an axis, and whether places rise with the energy. */
  place(ev: number): number
  readonly rising: boolean
  /** An energy in a table. */
  cell(ev: number | null): Cell
  /** The width of a peak in a table. */
  widthCell(peak: PeakFigures | null): Cell
  /** A shift of a line in a table, from where it is. */
  shiftCell(shiftEv: number | null, fromEv: number | null): Cell
  /** For the eye: `79.87 meV`, `633.2 nm`. */
  text(ev: number): string
  widthText(peak: PeakFigures): string
  shiftText(shiftEv: number, fromEv: number | null): string
  /** A range, low and high in eV. */
  rangeText(range: readonly [number, number]): string
}

const energies: SpectralUnit = {
  name: 'meV',
  axisName: 'energy above the band edge of the entry (meV)',
  place: (ev) => ev * 1000,
  rising: true,
  cell: meV,
  widthCell: (peak) => meV(peak?.fwhmEv ?? null),
  shiftCell: meV,
  text: (ev) => `${short(ev * 1000)} meV`,
  widthText: ({ fwhmEv }) => energyText(fwhmEv),
  shiftText: (ev) => `${short(ev * 1000)} meV`,
  rangeText: ([low, high]) => `${short(low * 1000)}..${short(high * 1000)} meV`,
}

const wavelengths: SpectralUnit = {
  name: 'nm',
  axisName: 'vacuum wavelength (nm)',
  place: (ev) => hcEvNm / ev,
  rising: false,
  cell: (ev) => (ev === null ? null : hcEvNm / ev),
  widthCell: (peak) => (peak === null ? null : widthNm(peak)),
  shiftCell: (shiftEv, fromEv) => (shiftEv === null || fromEv === null ? null : shiftNm(shiftEv, fromEv)),
  text: (ev) => `${fine(hcEvNm / ev)} nm`,
  widthText: (peak) => lengthText(widthNm(peak)),
  shiftText: (shiftEv, fromEv) => (fromEv === null ? '' : lengthText(shiftNm(shiftEv, fromEv))),
  rangeText: ([low, high]) => `${fine(hcEvNm / high)}..${fine(hcEvNm / low)} nm`,
}

export function spectralUnit(kind: Kind): SpectralUnit {
  return kind === 'electron' ? energies : wavelengths
}

/** `80 ± 5 meV`, `633 ± 2 nm`: a line as it is stated. */
export function lineText({ axis, centre, within }: { axis: Axis; centre: number; within: number }): string {
  return axis === 'eV'
    ? `${short(centre * 1000)} \u00b1 ${short(within * 1000)} meV`
    : `${fine(centre)} \u00b1 ${short(within)} nm`
}

/** A range of widths as it is stated. */
export function widthsText(axis: Axis, [least, most]: readonly [number, number]): string {
  return axis === 'eV' ? `${short(least * 1000)}..${short(most * 1000)} meV` : `${short(least)}..${short(most)} nm`
}

function widthNm({ lowEv, highEv, fwhmEv }: PeakFigures): number {
  return (hcEvNm * fwhmEv) / (lowEv * highEv)
}

function shiftNm(shiftEv: number, fromEv: number): number {
  return (-hcEvNm * shiftEv) / (fromEv * (fromEv + shiftEv))
}

function lengthText(nm: number): string {
  return Math.abs(nm) >= 0.1 ? `${short(nm)} nm` : `${short(nm * 1000)} pm`
}

/** A wavelength has one digit more than other numbers: lines are narrow. */
function fine(nm: number): string {
  return String(Number(nm.toPrecision(5)))
}

import { Decimal } from 'decimal.js'
import type { MediaTable, WaveStack } from '../../src/wave/index.js'

const D = Decimal.clone({ precision: 60 })
const degree = D.acos(-1).div(180)

/** hc, eV nm: exact by definition, here to double precision. */
export const hc = 1239.8419843320025

export interface Film {
  n: number
  k: number
}

/** Light stacks made here, apart from the model's: q and mu of one wavelength and angle, rounded once from 60 digits. */
export function lightTable(
  entry: Film,
  layers: readonly (Film & { d: number })[],
  exit: Film,
  from: 'entry' | 'exit',
  light: { wavelength: number; angle: number; pol: 's' | 'p' },
): { table: MediaTable; slope: MediaTable; stack: WaveStack } {
  const films = [entry, ...layers, exit]
  const count = films.length
  const row = () => new Float64Array(count)
  const table = { count, points: 1, q: row(), mu: row(), qIm: row(), muIm: row() }
  const slope = { count, points: 1, q: row(), mu: row(), qIm: row(), muIm: row() }
  const k0 = D.acos(-1).times(2).div(light.wavelength)
  const incident = from === 'entry' ? entry : exit
  const along = new D(light.angle).times(degree).sin().times(incident.n)
  const energy = hc / light.wavelength
  films.forEach((film, m) => {
    const re = new D(film.n).pow(2).minus(new D(film.k).pow(2))
    const im = new D(film.n).times(film.k).times(2)
    // The angle 30 of a medium of 2 must give exactly 1, which 60 digits of the sine of 30 degrees do not.
    const seen = re.minus(along.pow(2)).toDecimalPlaces(50)
    table.q[m] = k0.pow(2).times(seen).toNumber()
    table.qIm[m] = k0.pow(2).times(im).toNumber()
    table.mu[m] = light.pol === 's' ? 1 : re.toNumber()
    table.muIm[m] = light.pol === 's' ? 0 : im.toNumber()
    slope.q[m] = (2 * table.q[m]) / energy
    slope.qIm[m] = (2 * table.qIm[m]) / energy
  })
  const stack = {
    entry: 0,
    exit: count - 1,
    medium: Int32Array.from(layers, (_, j) => j + 1),
    width: Float64Array.from(layers, (l) => l.d),
  }
  return { table, slope, stack }
}

/** The same table without its imaginary parts, for stacks that do not absorb. */
export function losslessTable(table: MediaTable): MediaTable {
  return { count: table.count, points: table.points, q: table.q, mu: table.mu }
}

import { ComplexSweep } from './complexSweep.js'
import { Stretch } from './extremaStretch.js'
import { leadEdges } from './leadEdges.js'
import { resonances } from './resonances.js'
import { transmissionAt } from './transmissionAt.js'
import { type Extremum, hardWall, type Pole, type WaveSystem } from './types.js'

/** Relative difference of T that is rounding. */
const flat = 1e-13

/** Between two edges closer than this there is nothing. */
const shortestEv = 1e-12

/** Poles are looked for as far outside the range (eV): they bend T inside it. */
const marginEv = 0.02

/**
 * Every interior local maximum and minimum of T(E) over the open range, ascending; none where a lead is closed.
 *
 * What is searched for zeros is g = d(ln T)/dE. The poles of t put -2 (E - E0)/|E - E0 + i Gamma/2|² into it, each, and a
 * lead that opens at the lower end 1/(2 (E - end)). What remains, b(E), is smooth (`Stretch`).
 * A maximum narrower than `needleEv` is taken from its pole: E0 and the Breit-Wigner height.
 *
 * `poles`: those of the range and a little beyond, when the caller has them; found here otherwise.
 */
export function extrema(
  system: WaveSystem,
  rangeEv: readonly [number, number],
  poles: readonly Pole[] = nearbyPoles(system, rangeEv),
): Extremum[] {
  const [low, high] = rangeEv
  const sweep = new ComplexSweep(system)
  const { entry, exit } = system.stack
  if (exit === hardWall) return []
  const ends = [low, ...leadEdges(sweep, low, high), high]
  const found: Extremum[] = []
  for (let i = 1; i < ends.length; i++) {
    if (ends[i] - ends[i - 1] < shortestEv) continue
    sweep.prepare(0.5 * (ends[i - 1] + ends[i]), 0)
    if (!(sweep.at.qRe[entry] > 0 && sweep.at.qRe[exit] > 0)) continue
    const stretch = new Stretch(sweep, poles, ends[i - 1], ends[i])
    found.push(...extremaOf(system, poles, stretch))
  }
  return found
}

function extremaOf(system: WaveSystem, poles: readonly Pole[], stretch: Stretch): Extremum[] {
  const turns = stretch.turns()
  const energies = [stretch.first, ...turns.map(({ energy }) => energy), stretch.last]
  const T = transmissionAt(system, Float64Array.from(energies))
  const found = turns.map(({ energy, kind, needle }, i): Extremum => {
    if (needle) return { energyEv: energy, T: needle.peakT, kind, poleWidthEv: needle.widthEv }
    return { energyEv: energy, T: T[i + 1], kind, poleWidthEv: kind === 'maximum' ? poleWidthAt(poles, energy) : null }
  })
  dropFlat(found, T[0], T[T.length - 1])
  return found
}

/** Takes out pairs of turns, and turns beside an end, between which T does not change: they are the rounding of a flat T. */
function dropFlat(found: Extremum[], first: number, last: number): void {
  const same = (a: number, b: number) => Math.abs(a - b) <= flat * Math.max(a, b)
  for (let i = 0; i < found.length; i++) {
    if (i + 1 < found.length && same(found[i].T, found[i + 1].T)) found.splice(i, 2)
    else if ((i === 0 && same(found[i].T, first)) || (i + 1 === found.length && same(found[i].T, last)))
      found.splice(i, 1)
    else continue
    i = -1
  }
}

/** The poles of a range and of a margin around it, which is cut at the entry's edge. */
export function nearbyPoles(system: WaveSystem, [low, high]: readonly [number, number]): readonly Pole[] {
  const sweep = new ComplexSweep(system)
  const edges = leadEdges(sweep, low - marginEv, low)
  const from = edges.length > 0 ? edges[edges.length - 1] : low - marginEv
  return resonances(system, [Math.max(from, 1e-3 * low), high + marginEv]).poles
}

function poleWidthAt(poles: readonly Pole[], energy: number): number | null {
  let nearest: Pole | null = null
  for (const pole of poles) {
    const distance = Math.abs(pole.energyEv - energy)
    if (distance <= pole.widthEv && (!nearest || distance < Math.abs(nearest.energyEv - energy))) nearest = pole
  }
  return nearest ? nearest.widthEv : null
}

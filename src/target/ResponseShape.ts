import type { Quantity } from '../job/index.js'
import { Response } from '../model/index.js'
import { type Extremum, mediaTable, type Pole, resonances, type WaveSystem } from '../wave/index.js'
import type { Shape } from './Landscape.js'

/** Energies around a pole, in its widths: T, R and A bend there and nowhere faster. */
const bends = [0, 0.1, 0.25, 0.5, 0.75, 1, 1.5, 2, 3, 5, 8, 16]

/** Even energies a half turn of the phase through the stack, and at least. */
const perTurn = 12
const fewest = 64
const most = 4000

const rounds = 40

const newtons = 2

/** Of its first bracket. */
const closeEnough = 1e-6

const crossingRounds = 100

/** Relative: nearer to an end of the bracket, a crossing is that end. */
const closest = 4e-16

/** What differs by less is rounding. */
const flat = 1e-13

/** Closer poles (eV) than this give no new energies. */
const leastEv = 1e-12

/**
 * Extremes and widths of any share, of waves that add up: values at energies that are dense around every pole, then brackets that shrink.
 * A turn between two neighbouring energies is not seen; there is none where phases and poles alone bend the share.
 */
export class ResponseShape implements Shape {
  private readonly known: readonly Extremum[]
  /** Where a wave comes in. */
  private readonly windowEv: readonly [number, number]

  constructor(
    private readonly system: WaveSystem,
    private readonly quantity: Quantity,
    windowEv: readonly [number, number],
  ) {
    this.windowEv = [firstOpen(system, windowEv), windowEv[1]]
    this.known = this.find()
  }

  extrema(): readonly Extremum[] {
    return this.known
  }

  extremeOver(
    [low, high]: readonly [number, number],
    which: 'greatest' | 'least',
    found: readonly Extremum[],
  ): { readonly energyEv: number; readonly T: number } {
    const [atLow, atHigh] = this.values([low, high])
    const inside = found.filter(({ energyEv }) => energyEv > low && energyEv < high)
    const all = [{ energyEv: low, T: atLow }, ...inside, { energyEv: high, T: atHigh }]
    return all.reduce((best, next) => ((which === 'greatest' ? next.T > best.T : next.T < best.T) ? next : best))
  }

  halfWidth({ energyEv, T }: Extremum): { readonly lowEv: number; readonly highEv: number; readonly fwhmEv: number } {
    const below = this.known.filter((one) => one.energyEv < energyEv).reverse()
    const above = this.known.filter((one) => one.energyEv > energyEv)
    const lowEv = this.crossing(energyEv, below, this.windowEv[0], 0.5 * T)
    const highEv = this.crossing(energyEv, above, this.windowEv[1], 0.5 * T)
    return { lowEv, highEv, fwhmEv: highEv - lowEv }
  }

  /** Walking outwards from extreme to extreme, between which the share is monotone, to the first fall to half; else the end. */
  private crossing(from: number, outwards: readonly Extremum[], end: number, half: number): number {
    const fall = outwards.findIndex(({ T }) => T <= half)
    if (fall < 0 && this.values([end])[0] > half) return end
    const passed = fall < 0 ? outwards : outwards.slice(0, fall)
    let inner = passed.length > 0 ? passed[passed.length - 1].energyEv : from
    let outer = fall < 0 ? end : outwards[fall].energyEv
    // Regula falsi with halved weights (Illinois): the bracket shrinks from both sides.
    let above = this.values([inner])[0] - half
    let below = this.values([outer])[0] - half
    let last = 0
    for (let round = 0; round < crossingRounds; round++) {
      const x: number = (inner * below - outer * above) / (below - above)
      if (!(Math.abs(x - inner) > closest * x && Math.abs(x - outer) > closest * x)) return x
      const value = this.values([x])[0] - half
      if (value > 0) {
        inner = x
        above = value
        if (last > 0) below *= 0.5
        last = 1
      } else {
        outer = x
        below = value
        if (last < 0) above *= 0.5
        last = -1
      }
    }
    return 0.5 * (inner + outer)
  }

  private find(): Extremum[] {
    const poles = this.poles()
    const at = this.nodes(poles)
    const value = this.values(at)
    const brackets: Bracket[] = []
    for (let i = 1; i + 1 < at.length; i++) {
      const [before, here, after] = [value[i - 1], value[i], value[i + 1]]
      const sign = here > before && here >= after ? 1 : here < before && here <= after ? -1 : 0
      if (sign !== 0) brackets.push({ at: [at[i - 1], at[i], at[i + 1]], value: [before, here, after], sign })
    }
    const found = this.refined(brackets).map(({ energyEv, T, sign }): Extremum => {
      const kind = sign > 0 ? 'maximum' : 'minimum'
      return { energyEv, T, kind, poleWidthEv: kind === 'maximum' ? poleWidthAt(poles, energyEv) : null }
    })
    return withoutFlat(found, value[0], value[value.length - 1])
  }

  private poles(): Pole[] {
    const { system, windowEv } = this
    const waves = system.beside ? [system, system.beside] : [system]
    return waves.flatMap((wave) => [...resonances(wave, windowEv).poles])
  }

  private nodes(poles: readonly Pole[]): number[] {
    const [low, high] = this.windowEv
    const turns = this.phase(high) - this.phase(low)
    const even = Math.min(most, Math.ceil(fewest + (perTurn * Math.max(0, turns)) / Math.PI))
    const all = Array.from({ length: even + 1 }, (_, i) => (i === even ? high : low + ((high - low) * i) / even))
    for (const { energyEv, widthEv } of poles) {
      for (const bend of bends) all.push(energyEv - bend * widthEv, energyEv + bend * widthEv)
    }
    const sorted = [...new Set(all.filter((energy) => energy >= low && energy <= high))].sort((a, b) => a - b)
    return sorted.filter((energy, i) => i === 0 || energy - sorted[i - 1] > leastEv)
  }

  /** Of the wave through all layers, once. */
  private phase(energy: number): number {
    const { media, stack } = this.system
    const table = mediaTable(media, 1)
    media.fill(Float64Array.of(energy), table)
    return stack.medium.reduce((sum, m, j) => sum + Math.sqrt(Math.max(0, table.q[m])) * stack.width[j], 0)
  }

  /** By parabolas through three values, kept inside the bracket. */
  private refined(brackets: readonly Bracket[]): { energyEv: number; T: number; sign: number }[] {
    const now = brackets.map((one) => ({ ...one, first: one.at[2] - one.at[0], moving: true }))
    for (let round = 0; round < rounds; round++) {
      const open = now.filter(({ moving }) => moving)
      if (open.length === 0) break
      const tries = open.map(({ at, value }) => nextTry(at, value))
      const values = this.values(tries)
      open.forEach((one, i) => {
        const { at, value, sign } = one
        const [x, y] = [tries[i], values[i]]
        // A step so short moves a value by its square.
        one.moving = Math.abs(x - at[1]) > closeEnough * one.first
        const side = x > at[1] ? 2 : 0
        if (sign * (y - value[1]) > 0) {
          at[2 - side] = at[1]
          value[2 - side] = value[1]
          at[1] = x
          value[1] = y
        } else {
          at[side] = x
          value[side] = y
        }
      })
    }
    return this.polished(now)
  }

  /**
   * Values say where an extreme lies only to the root of their rounding: the zero of the slope, by differences over a fiftieth of the first
   * bracket, says it to some nine digits, so that a peak moves smoothly with what moves it.
   */
  private polished(
    found: readonly (Bracket & { readonly first: number })[],
  ): { energyEv: number; T: number; sign: number }[] {
    let places = found.map(({ at }) => at[1])
    for (let round = 0; round < newtons; round++) {
      const steps = found.map(({ first }) => first / 50)
      const value = this.values(places.flatMap((x, b) => [-2, -1, 0, 1, 2].map((n) => x + n * steps[b])))
      places = places.map((x, b) => {
        const [a, c, d, e, f] = value.subarray(5 * b, 5 * b + 5)
        const slope = (a - 8 * c + 8 * e - f) / 12
        const bend = (16 * (c + e) - 30 * d - (a + f)) / 12
        const by = (-slope / bend) * steps[b]
        // Flatter than its rounding, or bent by something else than this extreme: it stays.
        return Math.abs(by) < steps[b] ? x + by : x
      })
    }
    const value = this.values(places)
    return found.map(({ at, value: old, sign }, b) => {
      // Never worse than what was found, but for rounding.
      if (sign * (old[1] - value[b]) > 1e-12) return { energyEv: at[1], T: old[1], sign }
      return { energyEv: places[b], T: value[b], sign }
    })
  }

  private values(energies: readonly number[]): Float64Array {
    return new Response(Float64Array.from(energies), this.quantity === 'A').at(this.system)[this.quantity]
  }
}

/** Three energies, the middle one the most extreme. */
interface Bracket {
  readonly at: [number, number, number]
  readonly value: [number, number, number]
  /** 1 around a maximum, -1 around a minimum. */
  readonly sign: 1 | -1
}

/** The vertex of the parabola where it lies well inside and apart from the middle, else a step into the wider side. */
function nextTry([a, b, c]: readonly number[], [fa, fb, fc]: readonly number[]): number {
  const left = (b - a) * (fb - fc)
  const right = (b - c) * (fb - fa)
  const vertex = b - (0.5 * ((b - a) * left - (b - c) * right)) / (left - right)
  const wider = c - b > b - a ? b + 0.38 * (c - b) : b - 0.38 * (b - a)
  const [low, high] = [a + 0.02 * (b - a), c - 0.02 * (c - b)]
  if (!(vertex > low && vertex < high)) return wider
  const apart = 1e-3 * Math.min(b - a, c - b)
  if (Math.abs(vertex - b) >= apart) return vertex
  // As good as there: the bracket closes from the wider side.
  return c - b > b - a ? b + Math.max(apart, 1e-3 * (c - b)) : b - Math.max(apart, 1e-3 * (b - a))
}

/** The lowest energy of a window at which the entry carries a wave, to rounding. */
function firstOpen({ media, stack }: WaveSystem, [low, high]: readonly [number, number]): number {
  const table = mediaTable(media, 1)
  const open = (energy: number) => {
    media.fill(Float64Array.of(energy), table)
    return table.q[stack.entry] > 0
  }
  if (open(low)) return low
  let [closed, first] = [low, high]
  for (let step = 0; step < 60; step++) {
    const middle = 0.5 * (closed + first)
    if (open(middle)) first = middle
    else closed = middle
  }
  return first
}

function poleWidthAt(poles: readonly Pole[], energy: number): number | null {
  let nearest: Pole | null = null
  for (const pole of poles) {
    if (Math.abs(pole.energyEv - energy) > pole.widthEv) continue
    if (nearest === null || Math.abs(pole.energyEv - energy) < Math.abs(nearest.energyEv - energy)) nearest = pole
  }
  return nearest?.widthEv ?? null
}

/** Takes out pairs of turns, and turns beside an end, between which the share does not change: the rounding of a flat one. */
function withoutFlat(found: readonly Extremum[], first: number, last: number): Extremum[] {
  const kept: Extremum[] = []
  for (const one of found) {
    const before = kept.length > 0 ? kept[kept.length - 1].T : first
    if (Math.abs(one.T - before) > flat) kept.push(one)
    else if (kept.length > 0) kept.pop()
  }
  while (kept.length > 0 && Math.abs(kept[kept.length - 1].T - last) <= flat) kept.pop()
  return kept
}

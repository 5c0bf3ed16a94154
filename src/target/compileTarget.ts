import type { Demand, Job, Quantity } from '../job/index.js'
import type { Extremum, WaveSystem } from '../wave/index.js'
import { BandJudge } from './band.js'
import { BlockJudge } from './block.js'
import { CurveJudge } from './curve.js'
import { fitInto } from './fitInto.js'
import type { Judge, PointTerms, Verdict } from './Judge.js'
import { Landscape } from './Landscape.js'
import { leastExtremeSquare, meanSquare } from './meanSquare.js'
import { merit } from './merit.js'
import { PointSpectrum } from './PointSpectrum.js'
import { PassJudge } from './pass.js'
import { PeakJudge } from './peak.js'
import { peakSlopes } from './peakSlopes.js'
import { pointShares } from './pointShares.js'
import type { DemandResult, Evaluation, Limit, PeakFigures, PointShare, Target } from './types.js'

/** What of a job says how stacks are judged. */
export type TargetSpec = Pick<Job, 'kind' | 'demands' | 'scanEv' | 'resolutionEv' | 'conditions'>

/**
 * The demands of a job, ready to judge stacks. Maxima are looked for between the entry's edge, from which energies count, and the
 * scan's end plus the scan's length; of light, within the scan, beyond which its media need not be listed. What is found of a system is kept with it: limits after an evaluation cost no second search.
 */
export function compileTarget(job: TargetSpec): Target {
  return new CompiledTarget(job)
}

class CompiledTarget implements Target {
  readonly fitSize: number
  readonly pointShares: readonly PointShare[]
  private readonly judges: readonly Judge[]
  private readonly weights: readonly number[]
  /** Numbers of the conditions at which each demand holds. */
  private readonly holds: readonly (readonly number[])[]
  private readonly spectrum: PointSpectrum
  private readonly windowEv: readonly [number, number]
  /** The part of the window that decides what is met. */
  private readonly limitsEv: readonly [number, number]
  private readonly onlyCurves: boolean
  private readonly scanEv: readonly [number, number]
  private readonly landscapes = new WeakMap<WaveSystem, Map<Quantity, Landscape>>()
  /** What the figures of the first peak are of. */
  private readonly peakQuantity: Quantity
  readonly onlyT: boolean

  constructor({ kind, demands, scanEv, resolutionEv, conditions }: TargetSpec) {
    const points: number[] = []
    const quantities: Quantity[] = []
    this.judges = demands.map((demand) => {
      const judge = judgeOf(demand, points.length, { scanEv, resolutionEv })
      if (judge.terms) points.push(...judge.terms.energiesEv)
      while (quantities.length < points.length) quantities.push(demand.quantity)
      return judge
    })
    this.weights = this.judges.map(({ weight }) => weight)
    this.spectrum = new PointSpectrum(points, quantities)
    this.onlyT = demands.every(({ quantity }) => quantity === 'T')
    this.peakQuantity = demands.find((demand) => demand.kind === 'peak' || demand.kind === 'band')?.quantity ?? 'T'
    this.scanEv = scanEv
    this.windowEv = kind === 'electron' ? [0, 2 * scanEv[1] - scanEv[0]] : scanEv
    const ranges = this.judges.flatMap(({ rangeEv }) => (rangeEv ? [rangeEv] : []))
    this.limitsEv = [
      Math.max(this.windowEv[0], Math.min(...ranges.map(([from]) => from))),
      Math.min(this.windowEv[1], Math.max(...ranges.map(([, to]) => to))),
    ]
    this.onlyCurves = demands.every(({ kind }) => kind === 'curve')
    const all = conditions.map((_, i) => i)
    this.holds = demands.map(({ at }) => (at === null ? all : all.filter((i) => conditions[i].name === at)))
    const rows = this.judges.map(
      ({ terms, parts }, d) => this.holds[d].length * (parts + (terms?.energiesEv.length ?? 0)),
    )
    this.pointShares = this.judges.flatMap((judge, d) => pointShares(judge, this.holds[d], this.weights))
    this.fitSize = rows.reduce((sum, size) => sum + size, 0)
  }

  bound(systems: readonly WaveSystem[]): number {
    return this.meritOfPoints(systems, (terms, T) => meanSquare(terms, T) + leastExtremeSquare(terms, T))
  }

  pointMerit(systems: readonly WaveSystem[]): number {
    return this.meritOfPoints(systems, meanSquare)
  }

  private meritOfPoints(
    systems: readonly WaveSystem[],
    square: (terms: PointTerms, T: Float64Array) => number,
  ): number {
    const squares = new Float64Array(this.judges.length)
    for (let c = 0; c < systems.length; c++) {
      const T = this.spectrum.at(systems[c])
      for (let d = 0; d < squares.length; d++) {
        const { terms } = this.judges[d]
        if (terms && this.holds[d].includes(c)) squares[d] += square(terms, T) / this.holds[d].length
      }
    }
    return merit(squares, this.weights)
  }

  verdict(systems: readonly WaveSystem[]): { readonly merit: number; readonly met: boolean } {
    if (this.onlyCurves) return { merit: this.pointMerit(systems), met: true }
    const { merit, demands } = this.judgeAll(systems)
    return { merit, met: demands.every(({ met }) => met !== false) }
  }

  meets(systems: readonly WaveSystem[]): boolean[] {
    const landscapes = systems.map((system) => {
      const T = this.spectrum.at(system).slice()
      const made = new Map<Quantity, Landscape>()
      return (quantity: Quantity) => landscapeIn(made, system, T, this.limitsEv, quantity)
    })
    return this.judges.map((judge, d) => this.holds[d].every((c) => judge.met(landscapes[c](judge.quantity)) !== false))
  }

  evaluate(systems: readonly WaveSystem[]): Evaluation {
    const { merit, demands } = this.judgeAll(systems)
    const first = demands.find(({ kind }) => kind === 'peak' || kind === 'band')
    const peak = first ? first.peak : highestPeak(this.landscape(systems[0], 'T'), this.scanEv)
    const met = demands.every((demand) => demand.met !== false)
    return { merit, met, demands, peak, peakCondition: first?.condition ?? 0 }
  }

  fit(
    systems: readonly WaveSystem[],
    directions: readonly Float64Array[],
    variables: number,
    residuals: Float64Array,
    jacobian: Float64Array,
  ): void {
    const landscapes = systems.map((system) => (quantity: Quantity) => this.landscape(system, quantity))
    fitInto(landscapes, this.judges, this.holds, directions, variables, residuals, jacobian)
  }

  limits(systems: readonly WaveSystem[]): Limit[] {
    return systems.flatMap((system, condition) => {
      const judges = this.judges.filter((_, d) => this.holds[d].includes(condition))
      return judges.flatMap((judge) =>
        judge.limits(this.landscape(system, judge.quantity)).map((limit) => ({ ...limit, condition })),
      )
    })
  }

  maximumNear(system: WaveSystem, energyEv: number): number | null {
    return nearestPeak(this.landscape(system, this.peakQuantity), energyEv)?.energyEv ?? null
  }

  maximumSlope(system: WaveSystem, energyEv: number): Float64Array | null {
    const landscape = this.landscape(system, this.peakQuantity)
    const peak = nearestPeak(landscape, energyEv)
    return peak && peakSlopes(landscape, peak).energy
  }

  private judgeAll(systems: readonly WaveSystem[]): { merit: number; demands: DemandResult[] } {
    const squares = new Float64Array(this.judges.length)
    const demands = this.judges.map((judge, d) => {
      const verdicts = this.holds[d].map((c) => judge.judge(this.landscape(systems[c], judge.quantity)))
      // As in pointMerit: its sum is a lower bound of this one to the last bit.
      for (const { square } of verdicts) squares[d] += square / verdicts.length
      return resultOf(judge, squares[d], verdicts, this.holds[d])
    })
    return { merit: merit(squares, this.weights), demands }
  }

  private landscape(system: WaveSystem, quantity: Quantity): Landscape {
    let made = this.landscapes.get(system)
    if (!made) {
      made = new Map()
      this.landscapes.set(system, made)
    }
    const [any] = made.values()
    return landscapeIn(made, system, any?.T ?? this.spectrum.at(system).slice(), this.windowEv, quantity)
  }
}

function landscapeIn(
  made: Map<Quantity, Landscape>,
  system: WaveSystem,
  T: Float64Array,
  windowEv: readonly [number, number],
  quantity: Quantity,
): Landscape {
  const known = made.get(quantity)
  if (known) return known
  const landscape = new Landscape(system, T, windowEv, quantity)
  made.set(quantity, landscape)
  return landscape
}

function judgeOf(
  demand: Demand,
  first: number,
  { scanEv, resolutionEv }: Pick<TargetSpec, 'scanEv' | 'resolutionEv'>,
): Judge {
  switch (demand.kind) {
    case 'peak':
      return new PeakJudge(demand, scanEv)
    case 'band':
      return new BandJudge(demand)
    case 'pass':
      return new PassJudge(demand, first)
    case 'block':
      return new BlockJudge(demand, first, resolutionEv)
    case 'curve':
      return new CurveJudge(demand, first)
  }
}

/** Figures are those of the worst condition; met means met at each. */
function resultOf(
  { id, kind }: Judge,
  square: number,
  verdicts: readonly Verdict[],
  conditions: readonly number[],
): DemandResult {
  const worst = verdicts.reduce((most, next, i) => (next.square > verdicts[most].square ? i : most), 0)
  const { reached, extremeEv, peak, band } = verdicts[worst]
  const met = verdicts[0].met === null ? null : verdicts.every((verdict) => verdict.met)
  return { id, kind, reached, rms: Math.sqrt(square), met, extremeEv, peak, band, condition: conditions[worst] }
}

/**
 * Of the maxima in the scan, where they are seen; of all where it has none. Heights compare at 9 digits, the lower energy first:
 * maxima of T = 1 differ by rounding only.
 */
function highestPeak(landscape: Landscape, [low, high]: readonly [number, number]): PeakFigures | null {
  const height = ({ energyEv, T }: Extremum) => Number(T.toPrecision(9)) + (energyEv >= low && energyEv <= high ? 2 : 0)
  return greatest(landscape, height)
}

function nearestPeak(landscape: Landscape, energyEv: number): PeakFigures | null {
  return greatest(landscape, (maximum) => -Math.abs(maximum.energyEv - energyEv))
}

function greatest(landscape: Landscape, value: (maximum: Extremum) => number): PeakFigures | null {
  const maxima = landscape.extrema.filter(({ kind }) => kind === 'maximum')
  if (maxima.length === 0) return null
  return landscape.figuresOf(maxima.reduce((best, next) => (value(next) > value(best) ? next : best)))
}

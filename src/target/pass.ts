import type { PassDemand, Quantity } from '../job/index.js'
import { extremeError, type Judge, type JudgeLimit, nothing, type PointTerms, type Verdict } from './Judge.js'
import type { Landscape } from './Landscape.js'
import { meanSquare } from './meanSquare.js'

/** T at least t over a closed range: (t - T)/max(1 - t, 0.01) at its points and at the least T. */
export class PassJudge implements Judge {
  readonly kind = 'pass'
  readonly parts = 0
  readonly id: string
  readonly weight: number
  readonly quantity: Quantity
  readonly rangeEv: readonly [number, number]
  readonly terms: PointTerms

  constructor(
    private readonly demand: PassDemand,
    first: number,
  ) {
    this.id = demand.id
    this.weight = demand.weight
    this.quantity = demand.quantity
    this.rangeEv = [demand.pointsEv[0], demand.pointsEv[demand.pointsEv.length - 1]]
    const { above, pointsEv } = demand
    this.terms = {
      energiesEv: pointsEv,
      first,
      share: () => 1 / pointsEv.length,
      residual: (_, T) => this.lack(T),
      slope: (_, T) => (T < above ? -1 / Math.max(1 - above, 0.01) : 0),
      goal: () => [above, 1],
      extreme: (_, T) => this.lack(T * (1 + extremeError)),
    }
  }

  judge(landscape: Landscape): Verdict {
    const points = meanSquare(this.terms, landscape.T)
    const { energyEv, T } = this.least(landscape)
    const extreme = this.lack(T)
    const met = this.pointsMet(landscape) && extreme <= nothing
    return { square: points + extreme * extreme, reached: T, met, extremeEv: energyEv, peak: null, band: null }
  }

  met(landscape: Landscape): boolean {
    return this.pointsMet(landscape) && this.lack(this.least(landscape).T) <= nothing
  }

  fitParts(): Float64Array[] {
    return []
  }

  limits(landscape: Landscape): JudgeLimit[] {
    const { energyEv, T } = this.least(landscape)
    const { gradient } = landscape.gradient([energyEv])
    return [{ demand: this.id, part: 'least T', slack: T - this.demand.above, gradient }]
  }

  private least(landscape: Landscape): { energyEv: number; T: number } {
    return landscape.extremeOver(this.rangeEv, 'least')
  }

  private lack(T: number): number {
    const { above } = this.demand
    return Math.max(0, above - T) / Math.max(1 - above, 0.01)
  }

  private pointsMet({ T }: Landscape): boolean {
    return this.demand.pointsEv.every((_, i) => this.lack(T[this.terms.first + i]) <= nothing)
  }
}

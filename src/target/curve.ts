import type { CurveDemand, CurveRow, Quantity } from '../job/index.js'
import { log10 } from '../wave/index.js'
import { type Judge, type JudgeLimit, nothing, type PointTerms, type Verdict } from './Judge.js'
import type { Landscape } from './Landscape.js'
import { meanSquare } from './meanSquare.js'

/** T below this counts as this on a scale of decades. */
const floor = 1e-30

/** Least squares to a table: the violation on the row's scale over its tolerance. A goal: it has no limits, and a met state only under a greatest rms. */
export class CurveJudge implements Judge {
  readonly kind = 'curve'
  readonly parts = 0
  readonly rangeEv = null
  readonly id: string
  readonly weight: number
  readonly quantity: Quantity
  readonly terms: PointTerms

  private readonly mostRms: number | null

  constructor({ id, weight, quantity, rows, mostRms }: CurveDemand, first: number) {
    this.mostRms = mostRms
    this.id = id
    this.weight = weight
    this.quantity = quantity
    const total = rows.reduce((sum, row) => sum + row.weight, 0)
    const goals = rows.map((row) => onScale(row, row.T))
    this.terms = {
      energiesEv: rows.map((row) => row.energyEv),
      first,
      share: (i) => rows[i].weight / total,
      residual: (i, T) => violation(rows[i], goals[i], T),
      slope: (i, T) => violationSlope(rows[i], goals[i], T),
      goal: (i) => goalOf(rows[i]),
      extreme: () => 0,
    }
  }

  judge(landscape: Landscape): Verdict {
    const square = meanSquare(this.terms, landscape.T)
    return { square, reached: Math.sqrt(square), met: this.met(landscape), extremeEv: null, peak: null, band: null }
  }

  met(landscape: Landscape): boolean | null {
    if (this.mostRms === null) return null
    return Math.sqrt(meanSquare(this.terms, landscape.T)) <= this.mostRms + nothing
  }

  fitParts(): Float64Array[] {
    return []
  }

  limits(): JudgeLimit[] {
    return []
  }
}

/** Signed, so that the fit sees no kink at an `equal` row. */
function violation(row: CurveRow, goal: number, T: number): number {
  const difference = onScale(row, T) - goal
  return isFree(row, difference) ? 0 : difference / row.tolerance
}

function violationSlope(row: CurveRow, goal: number, T: number): number {
  if (isFree(row, onScale(row, T) - goal)) return 0
  if (row.scale === 'linear') return 1 / row.tolerance
  return T > floor ? 1 / (Math.LN10 * T) / row.tolerance : 0
}

function goalOf({ T, sense, scale }: CurveRow): [number, number] {
  const least = scale === 'decades' && T <= floor ? 0 : T
  const most = scale === 'decades' ? Math.max(T, floor) : T
  return [sense === 'most' ? 0 : least, sense === 'least' ? 1 : most]
}

/** On the side that the row allows. */
function isFree({ sense }: CurveRow, difference: number): boolean {
  return (sense === 'least' && difference >= 0) || (sense === 'most' && difference <= 0)
}

function onScale({ scale }: CurveRow, T: number): number {
  return scale === 'linear' ? T : log10(Math.max(T, floor))
}

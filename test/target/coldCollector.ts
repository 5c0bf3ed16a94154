import type { GrownLayer } from '../../src/design/index.js'
import type { Demand, GrowthSpec } from '../../src/job/index.js'
import { bandParameters } from '../../src/media/index.js'
import { buildSystem, type MediumChoice, resolveMedium, type Situation } from '../../src/model/index.js'
import type { TargetSpec } from '../../src/target/index.js'

/** The job of design.md section 2, written out by hand: 77 K, two-band mass, strained to GaAs. */

const GaAs: MediumChoice = { kind: 'material', material: 'GaAs', x: null }

export const situation: Situation = {
  kind: 'electron',
  temperatureK: 77,
  substrateNm: bandParameters('GaAs', null, 300).latticeNm,
  massModel: 'two-band',
  entry: GaAs,
  exit: GaAs,
  inPlaneKPerNm: 0,
  biasV: 0,
}

export const condition = { name: '', temperatureK: 77, biasV: 0, inPlaneEv: 0, angleDeg: 0, polarisation: 's' }

export const d1 = {
  kind: 'peak',
  alone: null,
  accept: null,
  at: null,
  quantity: 'T',
  id: 'd1',
  weight: 1,
  axis: 'eV',
  centre: 0.08,
  within: 0.005,
  fwhm: [0.001, 0.004],
  height: 0.8,
} as const satisfies Demand

export const d2 = block('d2', 1, 0.005, 0.06, 2e-2)
export const d3 = block('d3', 0.5, 0.11, 0.2, 2e-2)

export const spec: TargetSpec = {
  kind: 'electron',
  demands: [d1, d2, d3],
  scanEv: [0.005, 0.2],
  resolutionEv: 1e-5,
  conditions: [condition],
}

export const growth: GrowthSpec = {
  startsAt: 'exit',
  sources: [
    { name: 'Ga', element: 'Ga', rate: 0.7 },
    { name: 'Al-1', element: 'Al', rate: 0.233 },
    { name: 'Al-2', element: 'Al', rate: 0.377 },
  ],
  compositions: 1,
  stepNm: null,
  thinnestNm: null,
  totalNm: null,
  strain: null,
  critical: false,
  tooling: {},
  spread: { rate: 0.01, layer: { value: 0.5, unit: 'ML' }, x: 0.005, index: 0 },
  assumed: false,
  trials: 2048,
}

export function block(id: string, weight: number, from: number, to: number, below: number) {
  return {
    kind: 'block',
    accept: null,
    at: null,
    quantity: 'T',
    id,
    weight,
    pointsEv: evenly(from, to, 64),
    below,
  } as const satisfies Demand
}

export function evenly(from: number, to: number, points: number): number[] {
  return Array.from({ length: points }, (_, i) => (i === points - 1 ? to : from + ((to - from) * i) / (points - 1)))
}

/** AlGaAs(x) / GaAs / AlGaAs(x) / ..., whole monolayers from entry to exit. */
export function layersOf(x: number, counts: readonly number[]): GrownLayer[] {
  return counts.map((count, i) => {
    const choice: MediumChoice = i % 2 === 0 ? { kind: 'material', material: 'AlGaAs', x } : GaAs
    const resolved = resolveMedium(choice, situation)
    const stepNm = resolved.monolayerNm!
    return { id: `L${i + 1}`, choice, resolved, count, stepNm, widthNm: count * stepNm }
  })
}

export function systemsOf(layers: readonly GrownLayer[]) {
  return [buildSystem(situation, layers)]
}

import type { GrowthSpec, WidthSpec } from '../job/index.js'
import type { ResolvedMedium } from '../model/index.js'

/** The widths that a layer may have of one medium: (first + i stride) stepNm up to `last`; none when last < first. */
export interface Widths {
  readonly first: number
  readonly last: number
  readonly stride: number
  readonly stepNm: number
  /** The least count but 0 that can be made; 0: any. */
  readonly gap: number
  /** The step is the medium's own monolayer. */
  readonly monolayers: boolean
}

/** How many widths there are. */
export function countsOf({ first, last, stride, gap }: Widths): number {
  const all = Math.max(0, Math.floor((last - first) / stride) + 1)
  if (all === 0 || gap <= Math.max(first, 1)) return all
  // 0, and those from the gap on.
  return (first === 0 ? 1 : 0) + Math.max(0, all - Math.ceil((gap - first) / stride))
}

/**
 * A written width on the lattice of a medium (design 2). ML count the medium's own strained monolayers at 300 K. nm ranges hold the
 * whole multiples inside of the range's own step, else of growth.step, else of one monolayer, or 0.1 nm for media without one; so do
 * ranges of quarter waves, whose own step is one in quarter waves. Fixed nm of a material are the nearest whole monolayers; of numbers
 * and films they stay, as multiples of the step where they are.
 */
export function widthsOf(
  spec: WidthSpec,
  resolved: ResolvedMedium,
  { stepNm, thinnestNm }: Pick<GrowthSpec, 'stepNm' | 'thinnestNm'>,
): Widths {
  const widths = onLattice(spec, resolved, stepNm)
  if (thinnestNm === null) return widths
  const gap = Math.ceil((thinnestNm - inside) / widths.stepNm)
  if (widths.first === 0) return { ...widths, gap }
  const { first, stride } = widths
  return { ...widths, first: first + stride * Math.max(0, Math.ceil((gap - first) / stride)) }
}

function onLattice(spec: WidthSpec, resolved: ResolvedMedium, growthStepNm: number | null): Widths {
  const { unit, from, to } = spec
  const { monolayerNm } = resolved
  if (unit === 'ML') {
    return {
      first: from,
      last: to,
      stride: spec.step ?? 1,
      stepNm: monolayerNm ?? Number.NaN,
      gap: 0,
      monolayers: true,
    }
  }
  const quarterNm = unit === 'qw' && resolved.kind === 'light' ? resolved.quarterNm : 1
  if (from === to) return fixed(from * quarterNm, monolayerNm, growthStepNm)
  const own = spec.step === null ? null : spec.step * quarterNm
  const given = own ?? growthStepNm
  const stepNm = given ?? monolayerNm ?? numbersStepNm
  return {
    first: Math.max(0, Math.ceil((from * quarterNm - inside) / stepNm)),
    last: Math.floor((to * quarterNm + inside) / stepNm),
    stride: 1,
    stepNm,
    gap: 0,
    monolayers: given === null && monolayerNm !== null,
  }
}

/** Step of nm ranges of media that have no monolayer. */
const numbersStepNm = 0.1

/** A multiple so near (nm) to an end counts as inside. */
const inside = 1e-9

function fixed(widthNm: number, monolayerNm: number | null, growthStepNm: number | null): Widths {
  if (monolayerNm !== null) {
    const count = Math.round(widthNm / monolayerNm)
    return { first: count, last: count, stride: 1, stepNm: monolayerNm, gap: 0, monolayers: true }
  }
  const step = growthStepNm ?? numbersStepNm
  const multiple = Math.round(widthNm / step)
  // The same stack from a range and from fixed widths has one id.
  const onStep = Math.abs(multiple * step - widthNm) <= inside
  return onStep
    ? { first: multiple, last: multiple, stride: 1, stepNm: step, gap: 0, monolayers: false }
    : { first: 1, last: 1, stride: 1, stepNm: widthNm, gap: 0, monolayers: false }
}

import type { WidthSpec } from '../job/index.js'

/** The widths that a layer may have of one medium: (first + i stride) stepNm up to `last`; none when last < first. */
export interface Widths {
  readonly first: number
  readonly last: number
  readonly stride: number
  readonly stepNm: number
  /** The step is the medium's own monolayer. */
  readonly monolayers: boolean
}

/**
 * A written width on the lattice of a medium (design 2). ML count the medium's own strained monolayers at 300 K. nm ranges hold the
 * whole multiples inside of the range's own step, else of growth.step, else of one monolayer, or 0.1 nm for media without one.
 * Fixed nm of a material are the nearest whole monolayers; of numbers they stay, as multiples of the step where they are.
 */
export function widthsOf(spec: WidthSpec, monolayerNm: number | null, growthStepNm: number | null): Widths {
  const { unit, from, to } = spec
  if (unit === 'ML') {
    return { first: from, last: to, stride: spec.step ?? 1, stepNm: monolayerNm ?? Number.NaN, monolayers: true }
  }
  if (from === to) return fixed(from, monolayerNm, growthStepNm)
  const given = spec.step ?? growthStepNm
  const stepNm = given ?? monolayerNm ?? numbersStepNm
  return {
    first: Math.max(0, Math.ceil((from - inside) / stepNm)),
    last: Math.floor((to + inside) / stepNm),
    stride: 1,
    stepNm,
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
    return { first: count, last: count, stride: 1, stepNm: monolayerNm, monolayers: true }
  }
  const step = growthStepNm ?? numbersStepNm
  const multiple = Math.round(widthNm / step)
  // The same stack from a range and from fixed widths has one id.
  const onStep = Math.abs(multiple * step - widthNm) <= inside
  return onStep
    ? { first: multiple, last: multiple, stride: 1, stepNm: step, monolayers: false }
    : { first: 1, last: 1, stride: 1, stepNm: widthNm, monolayers: false }
}

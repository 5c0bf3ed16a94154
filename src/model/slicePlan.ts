import type { LayerSpec, MediumOption, StackItem, StackSpec } from '../job/index.js'
import { resolveRegion } from './resolveMedium.js'
import type { ElectronSituation } from './types.js'

/** Slices of a biased stack are at most this wide. */
const widestNm = 0.5
const fewest = 2

/** Slices of a layer that is at most so wide. */
export function ownSlices(widthNm: number): number {
  return Math.max(fewest, Math.ceil(widthNm / widestNm - 1e-9))
}

/** How a job cuts its layers under a bias, and over which of them the bias falls. */
export interface SlicePlan {
  /** Slices of the layer with this id: ceil(widest width that it may have/0.5 nm), at least 2. Merged layers (`a+b`) add up; 0: unknown. */
  slices(id: string): number
  /** Which of the ids, from entry to exit, the bias falls over. */
  biased(ids: readonly string[]): boolean[]
}

/** Throws as resolveMedium does. */
export function slicePlan(stack: StackSpec, situation: ElectronSituation): SlicePlan {
  const described = new Map<string, LayerSpec>()
  collect(stack.layers, described)
  const counts = new Map<string, number>()
  for (const [id, spec] of described) {
    const own = spec.like === null ? spec : described.get(spec.like)!
    counts.set(id, ownSlices(widest(own, situation)))
  }
  return {
    slices: (id) => id.split('+').reduce((sum, part) => sum + (counts.get(part) ?? 0), 0),
    biased: (ids) => {
      const { biasOver } = stack
      if (biasOver === null) return ids.map(() => true)
      const first = ids.findIndex((id) => id.split('+').includes(biasOver[0]))
      const last = ids.findLastIndex((id) => id.split('+').includes(biasOver[1]))
      return ids.map((_, i) => first >= 0 && i >= first && i <= last)
    },
  }
}

function collect(items: readonly StackItem[], into: Map<string, LayerSpec>): void {
  for (const item of items) {
    if (item.kind === 'period') {
      collect(item.period, into)
      collect(item.between, into)
    } else into.set(item.id, item)
  }
}

function widest({ media, width }: LayerSpec, situation: ElectronSituation): number {
  const { to, unit } = width!
  return unit === 'nm' ? to : to * Math.max(...media!.map((option) => widestMonolayer(option, situation)))
}

/** nm per ML grows or falls with x all the way, so that the ends tell. */
function widestMonolayer(option: MediumOption, situation: ElectronSituation): number {
  if (option.kind !== 'material') return 0
  const { material, x } = option
  const ends = x === null ? [null] : [x[0], x[x.length - 1]]
  return Math.max(...ends.map((end) => resolveRegion({ kind: 'material', material, x: end }, situation).monolayerNm!))
}

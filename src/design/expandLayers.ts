import type { LayerSpec, PeriodSpec, StackItem, StackSpec } from '../job/index.js'

/** A layer where the wave meets it: its own id, and the number of the described layer that it repeats. */
export interface Slot {
  readonly id: string
  readonly layer: number
}

/** A count of repetitions that the search chooses. */
export interface FreeRepeat {
  readonly name: string
  readonly from: number
  readonly to: number
}

export interface ExpandedStack {
  /** The layers that the job describes in full, in its order; all else repeats them. */
  readonly described: readonly LayerSpec[]
  /** The periods of which the search chooses the count, in the order of the job. */
  readonly repeats: readonly FreeRepeat[]
  /** From entry to exit, with a count for each of `repeats`. */
  slots(counts: readonly number[]): readonly Slot[]
}

/** Periods repeated, mirrors unfolded, ties followed. */
export function expandLayers(stack: Pick<StackSpec, 'layers' | 'mirror'>): ExpandedStack {
  const described: LayerSpec[] = []
  const free: PeriodSpec[] = []
  collect(stack.layers, described, free)
  const numberOf = new Map(described.map(({ id }, i) => [id, i]))
  return {
    described,
    repeats: free.map(({ id, repeat: [from, to] }, i) => ({ name: `${id ?? `period-${i + 1}`}.repeat`, from, to })),
    slots: (counts) => {
      const countOf = (period: PeriodSpec) => {
        const own = period.repeatLike === undefined
        const i = free.findIndex((one) => (own ? one === period : one.id === period.repeatLike))
        return counts[i] ?? period.repeat[0]
      }
      return unfold(stack.layers, stack.mirror, countOf).map(({ id, like }) => ({
        id,
        layer: numberOf.get(like ?? id)!,
      }))
    },
  }
}

function collect(items: readonly StackItem[], layers: LayerSpec[], free: PeriodSpec[]): void {
  for (const item of items) {
    if (item.kind === 'layer') {
      if (item.like === null) layers.push(item)
      continue
    }
    if (item.repeat[0] < item.repeat[1] && item.repeatLike === undefined) free.push(item)
    collect(item.period, layers, free)
    collect(item.between, layers, free)
  }
}

type CountOf = (period: PeriodSpec) => number

function unfold(items: readonly StackItem[], mirror: boolean, countOf: CountOf): LayerSpec[] {
  const once = items.flatMap((item) => (item.kind === 'layer' ? [item] : repeated(item, countOf)))
  return mirror ? [...once, ...once.slice(0, -1).reverse()] : once
}

function repeated(item: PeriodSpec, countOf: CountOf): LayerSpec[] {
  const once = unfold(item.period, item.mirror, countOf)
  const apart = unfold(item.between, false, countOf)
  return Array.from({ length: countOf(item) }, (_, i) => (i === 0 ? once : [...apart, ...once])).flat()
}

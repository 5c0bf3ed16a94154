import type { LayerSpec, StackItem, StackSpec } from '../job/index.js'

/** A layer where the wave meets it: its own id, and the number of the described layer that it repeats. */
export interface Slot {
  readonly id: string
  readonly layer: number
}

export interface ExpandedStack {
  /** The layers that the job describes in full, in its order; all else repeats them. */
  readonly described: readonly LayerSpec[]
  /** From entry to exit. */
  readonly slots: readonly Slot[]
}

/** Periods repeated, mirrors unfolded, ties followed. */
export function expandLayers(stack: Pick<StackSpec, 'layers' | 'mirror'>): ExpandedStack {
  const described: LayerSpec[] = []
  collect(stack.layers, described)
  const numberOf = new Map(described.map(({ id }, i) => [id, i]))
  const slots = unfold(stack.layers, stack.mirror).map(({ id, like }) => ({ id, layer: numberOf.get(like ?? id)! }))
  return { described, slots }
}

function collect(items: readonly StackItem[], into: LayerSpec[]): void {
  for (const item of items) {
    if (item.kind === 'period') {
      collect(item.period, into)
      collect(item.between, into)
    } else if (item.like === null) into.push(item)
  }
}

function unfold(items: readonly StackItem[], mirror: boolean): LayerSpec[] {
  const once = items.flatMap((item) => (item.kind === 'layer' ? [item] : repeated(item)))
  return mirror ? [...once, ...once.slice(0, -1).reverse()] : once
}

function repeated({ period, between, mirror, repeat }: Extract<StackItem, { kind: 'period' }>): LayerSpec[] {
  const once = unfold(period, mirror)
  const apart = unfold(between, false)
  return Array.from({ length: repeat }, (_, i) => (i === 0 ? once : [...apart, ...once])).flat()
}

import type { Lattice } from './Lattice.js'
import { type Candidate, listsOf } from './LayerLattice.js'
import { mediumKey } from './mediumIdentity.js'
import { canonicalOf, partners } from './mirror.js'
import { countsOf } from './widthsOf.js'

/**
 * How many different stacks a lattice holds, mirror images counted once where they are one.
 *
 * Where no two layers can merge and none can vanish, every assignment is a stack of its own and nothing is enumerated: with N
 * assignments, M of them with a mirror image on the lattice and F their own image, there are N - (M - F)/2 stacks. The limit on
 * alloys is kept by counting along sets of alloys. Else, and where widths may not fall, the whole is limited, the stacks are told apart one by one up to `enumerated` assignments; beyond,
 * the formula gives an upper bound (see `countsUpperBound`).
 */
export function countStacks(lattice: Lattice): number {
  if (lattice.layers.some(({ tied }) => tied) && placeProduct(lattice) > enumerated) return placeProduct(lattice)
  const all = lattice.layers.map((_, i) => new Set([i]))
  const assignments = count(
    lattice,
    all.map((layers) => ({ layers, fits: layers })),
  )
  if (needsEach(lattice) && placeProduct(lattice) <= enumerated) return countOneByOne(lattice)
  const repeats = lattice.repeats.reduce((product, { from: least, to }) => product * (to - least + 1), 1)
  if (!lattice.reversible || repeats > 1) return assignments * repeats
  const from = partners(lattice, new Int32Array(lattice.places.length)).map((list) => new Set(list))
  const mirrorable = count(lattice, mirrorClasses(from))
  const own = count(lattice, ownImageClasses(from))
  return assignments - (mirrorable - own) / 2
}

/** Whether `countStacks` counts layers that could merge or vanish as if they stayed apart. */
export function countsUpperBound(lattice: Lattice): boolean {
  return needsEach(lattice) && placeProduct(lattice) > enumerated
}

/** No formula tells how many there are: layers may coincide, widths may not fall, or images depend on counts of repetitions. */
function needsEach(lattice: Lattice): boolean {
  return (
    lattice.layers.some(({ tied }) => tied) ||
    mayCoincide(lattice) ||
    lattice.limitsWholes ||
    (lattice.repeats.length > 0 && lattice.reversible)
  )
}

const enumerated = 200_000

/** Described layers that share one value, and those that must allow it. */
interface ValueClass {
  readonly layers: ReadonlySet<number>
  readonly fits: ReadonlySet<number>
}

/** A stack has its image on the lattice when the layers that go to one layer agree, and that layer allows their value. */
function mirrorClasses(from: readonly ReadonlySet<number>[]): ValueClass[] {
  return united(from).map((layers) => {
    const fits = new Set(layers)
    from.forEach((list, i) => {
      if ([...list].every((layer) => layers.has(layer))) fits.add(i)
    })
    return { layers, fits }
  })
}

/** A stack is its own image when each layer agrees with those that go to it. */
function ownImageClasses(from: readonly ReadonlySet<number>[]): ValueClass[] {
  return united(from.map((list, i) => new Set([i, ...list]))).map((layers) => ({ layers, fits: layers }))
}

/** The classes of layers that the groups tie together. */
function united(groups: readonly ReadonlySet<number>[]): Set<number>[] {
  const classOf = groups.map((_, i) => new Set([i]))
  for (const group of groups) {
    const whole = new Set([...group].flatMap((i) => [...classOf[i]]))
    for (const i of whole) classOf[i] = whole
  }
  return [...new Set(classOf)]
}

/** Ways to give each class a value, at most `compositions` alloys in all. */
function count(lattice: Lattice, classes: readonly ValueClass[]): number {
  let bySet = new Map<string, { alloys: ReadonlySet<string>; ways: number }>([['', { alloys: new Set(), ways: 1 }]])
  for (const one of classes) {
    const groups = valuesByAlloy(lattice, one)
    const next: typeof bySet = new Map()
    for (const { alloys, ways } of bySet.values()) {
      for (const [alloy, size] of groups) {
        const union = alloy === null ? alloys : new Set([...alloys, alloy])
        if (lattice.compositions !== null && union.size > lattice.compositions) continue
        const name = [...union].sort().join(' ')
        const known = next.get(name)?.ways ?? 0
        next.set(name, { alloys: union, ways: known + ways * size })
      }
    }
    bySet = next
  }
  let sum = 0
  for (const { ways } of bySet.values()) sum += ways
  return sum
}

/** The number of common values of a class, by the alloy that they need; all under null where alloys are not limited. */
function valuesByAlloy(lattice: Lattice, { fits }: ValueClass): Map<string | null, number> {
  const [first, ...others] = [...fits].map((i) => lattice.layers[i])
  const alike = others.every(({ spec }) => sameLattice(spec, first.spec))
  const groups = new Map<string | null, number>()
  const add = (alloy: string | null, size: number): void => {
    if (size > 0) groups.set(alloy, (groups.get(alloy) ?? 0) + size)
  }
  first.options.forEach((option, number) => {
    if (alike && option.kind === 'numbers') {
      const media = option.potentialEv.length * option.massRel.length * option.alphaPerEv.length
      for (const { widths } of first.widthMedia(number)) add(null, media * countsOf(widths))
      return
    }
    for (const medium of first.media(number)) {
      const counts = commonCounts(medium)
      const limited = lattice.compositions !== null && lattice.countsAsAlloy(medium)
      const vanishing = limited ? counts.filter((n) => n === 0).length : 0
      add(limited ? medium.alloy : null, counts.length - vanishing)
      add(null, vanishing)
    }
  })
  return groups

  function commonCounts(medium: Candidate): number[] {
    const { first: from, last, stride, gap } = medium.widths
    const length = Math.max(0, Math.floor((last - from) / stride) + 1)
    const all = Array.from({ length }, (_, i) => from + i * stride)
    const counts = all.filter((n) => n === 0 || n >= gap)
    if (alike) return counts
    const theirs = others.map((layer) => ({ layer, own: layer.equalOf(medium) }))
    return counts.filter((n) => theirs.every(({ layer, own }) => own !== null && layer.allows(own, n)))
  }
}

function sameLattice(a: Lattice['layers'][number]['spec'], b: typeof a): boolean {
  return JSON.stringify([a.media, a.width]) === JSON.stringify([b.media, b.width])
}

/** Whether two assignments may be one stack, mirror images aside. */
function mayCoincide(lattice: Lattice): boolean {
  const { layers, places, repeats } = lattice
  if (layers.some((layer) => layer.leastCount === 0)) return true
  // Any two repetitions show every pair of neighbours.
  const most = Int32Array.from(places, ({ choices }) => choices - 1)
  for (const assignment of repeats.length > 0 ? [most, new Int32Array(places.length)] : [most]) {
    const slots = lattice.slots(assignment)
    // A layer between repetitions of which there is one is not there.
    if (new Set(slots.map(({ layer }) => layer)).size < layers.length) return true
    if (slots.some(({ layer }, i) => i > 0 && mayShareMedium(layers[slots[i - 1].layer], layers[layer]))) return true
  }
  return false
}

function mayShareMedium(a: Lattice['layers'][number], b: Lattice['layers'][number]): boolean {
  return a.options.some((one) =>
    b.options.some((other) => {
      if (one.kind === 'material' && other.kind === 'material') {
        return one.material === other.material && (one.x === null || one.x.some((x) => other.x!.includes(x)))
      }
      if (one.kind !== other.kind || one.kind === 'material') return false
      if (one.kind === 'table' && other.kind === 'table') return mediumKey(one) === mediumKey(other)
      const theirs = listsOf(other)
      return listsOf(one).every((list, p) => list === undefined || list.some((value) => theirs[p]!.includes(value)))
    }),
  )
}

function placeProduct({ places }: Lattice): number {
  return places.reduce((product, { choices }) => product * choices, 1)
}

function countOneByOne(lattice: Lattice): number {
  const seen = new Set<string>()
  for (const assignment of lattice.assignments()) {
    const stretches = lattice.stretches(canonicalOf(lattice, assignment))
    seen.add(stretches.map(({ medium, count: n }) => `${medium.key} ${n} ${medium.widths.stepNm}`).join('/'))
  }
  return seen.size
}

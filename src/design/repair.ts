import type { Lattice } from './Lattice.js'
import { type Candidate, type LayerLattice, parameters, valuesOf, widthRole } from './LayerLattice.js'
import { countsOf } from './widthsOf.js'

/**
 * The assignment itself when it is feasible, else a feasible one near it: choices beyond a list's end are taken back to it, widths
 * go to the nearest of the medium's own, and where the stack holds too many alloys a depth-first search chooses the ones that move
 * the compositions least; widths that may not fall are put in order. Infeasible only where no feasible assignment was found.
 */
export function repaired(lattice: Lattice, assignment: Int32Array): Int32Array {
  if (lattice.feasible(assignment)) return assignment
  const out = Int32Array.from(assignment)
  for (const layer of lattice.layers) withinLists(layer, out)
  if (lattice.compositions !== null && !lattice.feasible(out)) limitAlloys(lattice, out)
  if (!lattice.feasible(out)) raise(lattice, out)
  if (!lattice.fits(out)) intoTotal(lattice, out)
  if (!lattice.bears(out)) relieve(lattice, out)
  return out
}

/** Takes the one step of a width that relieves most, again and again, until the stack bears its strain or no step helps. */
function relieve(lattice: Lattice, out: Int32Array): void {
  const widths = lattice.layers.map(({ placeOf }) => placeOf[widthRole]).filter((place) => place >= 0)
  let least = lattice.excessStrain(out)
  while (least > 0) {
    let best: { readonly place: number; readonly choice: number } | null = null
    for (const place of new Set(widths)) {
      const here = out[place]
      for (const choice of [here - 1, here + 1, here >> 1, (here + lattice.places[place].choices) >> 1]) {
        if (choice < 0 || choice >= lattice.places[place].choices || choice === here) continue
        out[place] = choice
        const made = lattice.layers.every((layer) => layer.cell(out) !== null)
        const excess =
          made && lattice.rises(out) && lattice.fits(out) ? lattice.excessStrain(out) : Number.POSITIVE_INFINITY
        if (excess < least) {
          least = excess
          best = { place, choice }
        }
        out[place] = here
      }
    }
    if (best === null) return
    out[best.place] = best.choice
  }
}

/** Moves the widths towards the limits of the whole stack: all by the same share of what each has left, then one by one. */
function intoTotal(lattice: Lattice, out: Int32Array): void {
  const [least, most] = lattice.totalNm!
  const slots = lattice.slots(out)
  const times = lattice.layers.map((_, i) => slots.filter(({ layer }) => layer === i).length)
  const widthOf = (i: number) => {
    const cell = lattice.layers[i].cell(out)
    return cell === null ? 0 : cell.count * cell.medium.widths.stepNm
  }
  const total = () => times.reduce((sum, n, i) => sum + n * widthOf(i), 0)
  for (let round = 0; round < 60 && !lattice.fits(out); round++) {
    const now = total()
    const goal = now > most ? most : least
    const ends = lattice.layers.map((layer) => {
      const { first, last, stepNm } = layer.medium(out)!.widths
      return (now > most ? first : last) * stepNm
    })
    const room = times.reduce((sum, n, i) => sum + n * (ends[i] - widthOf(i)), 0)
    if (room === 0) return
    // A little further each time, for counts are whole.
    const share = Math.min(1, ((goal - now) / room) * (1 + 0.05 * round))
    lattice.layers.forEach((layer, i) => {
      if (layer.freeCount(out) === null) return
      const medium = layer.medium(out)!
      layer.writeCount(medium, (widthOf(i) + share * (ends[i] - widthOf(i))) / medium.widths.stepNm, out)
    })
  }
}

/**
 * Puts the widths that may not fall in order: from the last on none wider than those behind it may become, then from the first on none
 * narrower than the one before.
 */
function raise({ layers, rising }: Lattice, out: Int32Array): void {
  const rows = rising.map((i) => ({ layer: layers[i], medium: layers[i].medium(out)! }))
  let cap = Number.POSITIVE_INFINITY
  for (const { layer, medium } of [...rows].reverse()) {
    const { first, last, stride, stepNm } = medium.widths
    const most = Math.min(last, Math.floor(cap / stepNm + 1e-9))
    const count = layer.freeCount(out) ?? first
    if (count > most) layer.writeCount(medium, first + stride * Math.floor((most - first) / stride), out)
    cap = most * stepNm
  }
  let floor = 0
  for (const { layer, medium } of rows) {
    const { first, stride, stepNm } = medium.widths
    const least = Math.max(first, Math.ceil(floor / stepNm - 1e-9))
    const count = layer.freeCount(out) ?? first
    if (count < least) layer.writeCount(medium, first + stride * Math.ceil((least - first) / stride), out)
    floor = (layer.freeCount(out) ?? first) * stepNm
  }
}

function withinLists(layer: LayerLattice, out: Int32Array): void {
  const { placeOf, options } = layer
  const option = options[placeOf[0] < 0 ? 0 : out[placeOf[0]]]
  for (let p = 0; p < parameters.length; p++) {
    const place = placeOf[p + 1]
    if (place >= 0) out[place] = Math.min(out[place], valuesOf(option, p).length - 1)
  }
  moveTo(layer, widened(layer, layer.medium(out)!), out)
}

/** A medium of the same option that has a width at all, the nearest first; the medium itself where it has one. */
function widened(layer: LayerLattice, medium: Candidate): Candidate {
  if (countsOf(medium.widths) > 0) return medium
  const all = layer.options.flatMap((_, option) => [...layer.widthMedia(option)])
  return nearest(all, medium) ?? medium
}

/** Chooses a medium, and the width nearest to the one before. */
function moveTo(layer: LayerLattice, medium: Candidate, out: Int32Array): void {
  const count = layer.freeCount(out)
  layer.writeMedium(medium, out)
  if (count !== null) layer.writeCount(medium, count, out)
}

interface Step {
  readonly layer: LayerLattice
  readonly now: Candidate
  /** The nearest medium of each alloy that counts. */
  readonly byAlloy: ReadonlyMap<string, Candidate>
  /** The nearest medium that counts as none. */
  readonly free: Candidate | null
}

/**
 * Layer by layer, the nearest medium among the alloys already in the stack, or one more alloy while the limit allows it. What is left
 * once the limit is reached costs no branching, so that there are at most (alloys)^limit leaves; `mostNodes` ends it before.
 */
function limitAlloys(lattice: Lattice, out: Int32Array): void {
  // A composition that follows another comes along.
  const own = lattice.layers.filter(({ spec }) => spec.xLike === undefined)
  const steps = own.map((layer) => stepOf(lattice, layer, layer.medium(out)!))
  const chosen: Candidate[] = []
  let best: Candidate[] | null = null
  let bestCost = Number.POSITIVE_INFINITY
  let nodes = 0
  descend(0, 0, new Set())
  if (best === null) return
  ;(best as Candidate[]).forEach((medium, i) => {
    if (medium !== steps[i].now) moveTo(steps[i].layer, medium, out)
  })

  function descend(i: number, cost: number, alloys: ReadonlySet<string>): void {
    if (cost >= bestCost || (nodes++ > mostNodes && best !== null)) return
    if (i === steps.length) {
      best = [...chosen]
      bestCost = cost
      return
    }
    const { now, byAlloy, free } = steps[i]
    const held = [...alloys].map((alloy) => byAlloy.get(alloy)).filter((medium) => medium !== undefined)
    const old = nearest(free ? [free, ...held] : held, now)
    const fresh = alloys.size < lattice.compositions! ? [...byAlloy].filter(([alloy]) => !alloys.has(alloy)) : []
    const branches = fresh.map(([alloy, medium]) => ({
      medium,
      alloys: new Set([...alloys, alloy]) as ReadonlySet<string>,
    }))
    if (old) branches.push({ medium: old, alloys })
    branches.sort((a, b) => distance(a.medium, now) - distance(b.medium, now))
    for (const branch of branches) {
      chosen[i] = branch.medium
      descend(i + 1, cost + distance(branch.medium, now), branch.alloys)
    }
  }
}

/** Enough to be exact with two alloys out of a hundred. */
const mostNodes = 20_000

function stepOf(lattice: Lattice, layer: LayerLattice, now: Candidate): Step {
  const byAlloy = new Map<string, Candidate>()
  let free = lattice.countsAsAlloy(now) ? null : now
  for (let option = 0; option < layer.options.length; option++) {
    for (const medium of layer.widthMedia(option)) {
      if (countsOf(medium.widths) === 0) continue
      if (!lattice.countsAsAlloy(medium)) free = nearest(free ? [free, medium] : [medium], now)
      else byAlloy.set(medium.alloy!, nearest([byAlloy.get(medium.alloy!) ?? medium, medium], now)!)
    }
  }
  return { layer, now, byAlloy, free }
}

function nearest(media: readonly Candidate[], to: Candidate): Candidate | null {
  let best: Candidate | null = null
  for (const medium of media) {
    if (countsOf(medium.widths) > 0 && (best === null || distance(medium, to) < distance(best, to))) best = medium
  }
  return best
}

/** Squared change of composition; another material of the list is further than any composition. */
function distance({ choice: a, digits }: Candidate, { choice: b, digits: digitsB }: Candidate): number {
  if (digits[0] !== digitsB[0]) return 4
  if (a.kind !== 'material' || b.kind !== 'material') return 0
  const change = (a.x ?? 0) - (b.x ?? 0)
  return change * change
}

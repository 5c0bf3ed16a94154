import type { Job } from '../job/index.js'
import { type MediumChoice, type Situation, situationOf, slicePlan } from '../model/index.js'
import { DesignError } from './DesignError.js'
import { expandLayers, type FreeRepeat, type Slot } from './expandLayers.js'
import { alloyOf, type Candidate, type Cell, LayerLattice } from './LayerLattice.js'
import { mediumKey } from './mediumIdentity.js'
import { repaired } from './repair.js'
import { type StrainLimits, strainLimits } from './strainLimits.js'
import type { Place } from './types.js'

/** A stretch of one medium as it is grown. */
export interface Stretch extends Cell {
  readonly id: string
  readonly slices: number
  readonly biased: boolean
}

/** A layer where the wave meets it, and how a bias takes it. */
export interface SlicedSlot extends Slot {
  readonly slices: number
  readonly biased: boolean
}

/** The places of a job and what they mean, layer by layer: the ground on which the functions of this folder stand. */
export class Lattice {
  readonly layers: readonly LayerLattice[]
  /** Counts of repetitions that the search chooses, and the place of the first; the others follow. */
  readonly repeats: readonly FreeRepeat[]
  private readonly firstRepeat: number
  private readonly slotsOf: (counts: readonly number[]) => readonly SlicedSlot[]
  private readonly knownSlots = new Map<string, readonly SlicedSlot[]>()
  readonly places: readonly Place[]
  readonly situations: readonly Situation[]
  private readonly strain: StrainLimits | null
  /** Limits of the whole stack, nm; null: none. */
  readonly totalNm: readonly [number, number] | null
  /** At most so many different alloys in a stack, those of the leads free. */
  readonly compositions: number | null
  /** Numbers of described layers whose widths (nm) may not fall in this order; empty: no such rule. */
  readonly rising: readonly number[]
  /** A stack and its mirror image are one: equal lossless leads and no bias. */
  readonly reversible: boolean
  readonly leadAlloys: ReadonlySet<string>
  /** The lead or material that the layers are strained to; null: none. */
  readonly strainedTo: MediumChoice | null

  /** Throws DesignError where no stack is makeable, and as resolveMedium does. */
  constructor(job: Job) {
    const { stack, growth } = job
    this.situations = job.conditions.map((condition) => situationOf(job, condition))
    const { described, repeats, slots: slotsAt } = expandLayers(stack)
    const layers: LayerLattice[] = []
    let offset = 0
    for (const spec of described) {
      const layer = new LayerLattice(spec, offset, this.situations[0], growth)
      offset += layer.places.length
      layers.push(layer)
    }
    const byId = new Map(layers.map((layer) => [layer.spec.id, layer]))
    for (const layer of layers) layer.follow((id) => byId.get(id)!)
    this.layers = layers
    const [situation] = this.situations
    const biased = situation.kind === 'electron' && job.conditions.some(({ biasV }) => biasV !== 0)
    const plan = biased ? slicePlan(stack, situation) : null
    this.slotsOf = (counts) => {
      const slots = slotsAt(counts)
      const biased = plan?.biased(slots.map(({ id }) => id))
      return slots.map((slot, i) => ({ ...slot, slices: plan?.slices(slot.id) ?? 1, biased: biased?.[i] ?? false }))
    }
    this.repeats = repeats
    this.firstRepeat = offset
    const own = placesOf(layers)
    const families = own.reduce((most, { family }) => Math.max(most, family + 1), 0)
    this.places = [
      ...own,
      ...repeats.map(({ name, from, to }, i) => ({
        name,
        choices: to - from + 1,
        ordered: true,
        family: families + i,
      })),
    ]
    this.compositions = growth.compositions
    this.totalNm = growth.totalNm
    this.strain = strainLimits(growth, this.situations[0])
    this.rising = stack.rising.map((id) => slotsAt(repeats.map(({ to }) => to)).find((slot) => slot.id === id)!.layer)
    const { entry, exit } = this.situations[0]
    const leads = exit === 'hard wall' ? [entry] : [entry, exit]
    this.leadAlloys = new Set(leads.map(alloyOf).filter((alloy) => alloy !== null))
    this.reversible =
      exit !== 'hard wall' &&
      mediumKey(entry) === mediumKey(exit) &&
      job.conditions.every(({ biasV }) => biasV === 0) &&
      // What comes back of a stack that absorbs, or of one before a plate, depends on the side.
      stack.back === null &&
      job.demands.every(({ quantity }) => quantity === 'T')
    this.strainedTo =
      job.kind === 'light' ? null : strainedTo(stack.strainedTo, growth.startsAt === 'entry' ? entry : exit)
    if (!this.feasible(repaired(this, new Int32Array(this.places.length)))) {
      throw new DesignError(
        this.strain !== null && !this.bears(repaired(this, new Int32Array(this.places.length)))
          ? 'No stack was found that bears its strain. Raise growth.strain, let strained layers be thinner, or balance them.'
          : this.totalNm !== null && !this.fits(repaired(this, new Int32Array(this.places.length)))
            ? `No stack is ${growth.totalNm![0]} to ${growth.totalNm![1]} nm thick with these widths. Change growth.total, or the ranges.`
            : this.rising.length > 0
              ? `No stack has widths that rise along ${stack.rising.join(', ')}. Let the ranges of the later ones reach as far.`
              : `No stack holds at most ${growth.compositions} different alloys with these compositions. ` +
                'Raise growth.compositions, or give the layers compositions in common.',
      )
    }
  }

  feasible(assignment: Int32Array): boolean {
    if (this.compositions === null && this.rising.length === 0 && this.totalNm === null && this.strain === null) {
      return this.layers.every((layer) => layer.cell(assignment) !== null)
    }
    const alloys = new Set<string>()
    for (const layer of this.layers) {
      const cell = layer.cell(assignment)
      if (cell === null) return false
      const alloy = this.countedAlloy(cell)
      if (alloy !== null) alloys.add(alloy)
    }
    if (this.compositions !== null && alloys.size > this.compositions) return false
    return this.rises(assignment) && this.fits(assignment) && this.bears(assignment)
  }

  /** Whether something other than each layer's own places decides what is makeable. */
  get limitsWholes(): boolean {
    return this.rising.length > 0 || this.totalNm !== null || this.strain !== null
  }

  /** Whether the stack and its layers bear their strain. */
  bears(assignment: Int32Array): boolean {
    return this.strain === null || this.excessStrain(assignment) <= 0
  }

  /** How far a stack is beyond what it may be strained: 0 where it is not. Relative widths and strains, added up. */
  excessStrain(assignment: Int32Array): number {
    return this.strain === null ? 0 : this.strain.excess(this.stretches(assignment))
  }

  /** Whether the stack is as thick as it may be. */
  fits(assignment: Int32Array): boolean {
    if (this.totalNm === null) return true
    const widths = this.layers.map((layer) => {
      const cell = layer.cell(assignment)
      return cell === null ? Number.NaN : cell.count * cell.medium.widths.stepNm
    })
    const total = this.slots(assignment).reduce((sum, { layer }) => sum + widths[layer], 0)
    return total >= this.totalNm[0] - 1e-9 && total <= this.totalNm[1] + 1e-9
  }

  /** Whether the layers of `rising` have widths that do not fall; equal within rounding is level. */
  rises(assignment: Int32Array): boolean {
    let before = 0
    return this.rising.every((layer) => {
      const { medium, count } = this.layers[layer].cell(assignment)!
      const nm = count * medium.widths.stepNm
      const holds = nm >= before - 1e-9
      before = nm
      return holds
    })
  }

  /** Every feasible assignment, the last place fastest; one array, reused. */
  *assignments(): Iterable<Int32Array> {
    const { places } = this
    const assignment = new Int32Array(places.length)
    for (;;) {
      if (this.feasible(assignment)) yield assignment
      let place = places.length - 1
      while (place >= 0 && ++assignment[place] === places[place].choices) assignment[place--] = 0
      if (place < 0) return
    }
  }

  /** The alloy of a cell that counts against the limit; a layer of no width needs none. */
  countedAlloy({ medium, count }: Cell): string | null {
    return count > 0 && this.countsAsAlloy(medium) ? medium.alloy : null
  }

  countsAsAlloy({ alloy }: Candidate): boolean {
    return alloy !== null && !this.leadAlloys.has(alloy)
  }

  /** The cells of a feasible assignment. */
  cells(assignment: Int32Array): Cell[] {
    return this.layers.map((layer) => {
      const cell = layer.cell(assignment)
      if (cell === null) throw new RangeError(`Assignment ${assignment.join(' ')} gives ${layer.spec.id} no width.`)
      return cell
    })
  }

  /** From entry to exit, with the counts of repetitions that an assignment gives. */
  slots(assignment: Int32Array): readonly SlicedSlot[] {
    const counts = this.repeats.map(({ from }, i) => from + assignment[this.firstRepeat + i])
    const key = counts.join()
    const known = this.knownSlots.get(key)
    if (known) return known
    const slots = this.slotsOf(counts)
    this.knownSlots.set(key, slots)
    return slots
  }

  /** The stack as grown: equal neighbours merged, zero widths dropped. */
  stretches(assignment: Int32Array): Stretch[] {
    const cells = this.cells(assignment)
    const stretches: Stretch[] = []
    for (const { id, layer, slices, biased } of this.slots(assignment)) {
      const { medium, count } = cells[layer]
      if (count * medium.widths.stepNm === 0) continue
      const last = stretches.at(-1)
      const next = { id, medium, count, slices, biased }
      if (last?.medium.key !== medium.key || last.biased !== biased) stretches.push(next)
      else stretches[stretches.length - 1] = merged(last, next)
    }
    return stretches
  }
}

/** Families are numbered as they come. */
function placesOf(layers: readonly LayerLattice[]): Place[] {
  const families = new Map<string, number>()
  return layers.flatMap(({ spec, places }) =>
    places.map((place) => {
      const what = place.name.slice(spec.id.length)
      const key = JSON.stringify([spec.media, spec.width, what])
      if (!families.has(key)) families.set(key, families.size)
      return { ...place, family: families.get(key)! }
    }),
  )
}

/** A common step is kept; two steps make one width that is its own step. */
function merged(a: Stretch, b: Stretch): Stretch {
  const rest = { id: `${a.id}+${b.id}`, slices: a.slices + b.slices, biased: a.biased }
  if (a.medium.widths.stepNm === b.medium.widths.stepNm) return { ...rest, medium: a.medium, count: a.count + b.count }
  // Twelve digits: the sum of three is the same from either end.
  const stepNm = Number((a.count * a.medium.widths.stepNm + b.count * b.medium.widths.stepNm).toPrecision(12))
  const widths = { first: 1, last: 1, stride: 1, stepNm, gap: 0, monolayers: false }
  return { ...rest, medium: { ...a.medium, widths }, count: 1 }
}

function strainedTo(material: string | null, lead: MediumChoice | 'hard wall'): MediumChoice | null {
  if (material === 'none') return null
  if (material !== null) return { kind: 'material', material, x: null }
  return lead === 'hard wall' || lead.kind !== 'material' ? null : lead
}

import type { GrowthSpec, LayerSpec, MediumOption, Override } from '../job/index.js'
import { needsX } from '../media/index.js'
import { type MediumChoice, type ResolvedMedium, resolveMedium, type Situation } from '../model/index.js'
import { DesignError } from './DesignError.js'
import { mediumKey } from './mediumIdentity.js'
import type { Place } from './types.js'
import { countsOf, type Widths, widthsOf } from './widthsOf.js'

/** A medium that a layer may be of. */
export interface Candidate {
  readonly choice: MediumChoice
  /** Equal for equal media, whatever their names. */
  readonly key: string
  /** The key of an alloy that counts against growth.compositions; null for binaries and numbers. */
  readonly alloy: string | null
  /** At the first condition. */
  readonly resolved: ResolvedMedium
  readonly widths: Widths
  /** Number of the option and of the value in each list of `parameters`. */
  readonly digits: readonly number[]
}

/** A layer with everything chosen. */
export interface Cell {
  readonly medium: Candidate
  readonly count: number
}

/** The numbers that a medium may be free in, in the order of their places. */
export const parameters = ['x', 'potential', 'mass', 'alpha', 'index', 'extinction'] as const

/**
 * The choices of one described layer. Its places stand together from `offset` on: the list of materials, the parameters, the
 * width; each only where there is something to choose. The media are a table over all but the last, filled as it is used, for it
 * can be large. A parameter's place has as many choices as the longest list among the options; the choices beyond a shorter list
 * are not feasible.
 */
export class LayerLattice {
  readonly places: readonly Omit<Place, 'family'>[]
  readonly options: readonly MediumOption[]
  /** Place of the option, of each parameter and of the width; -1 where nothing is to choose. */
  readonly placeOf: Int32Array
  private readonly longest: readonly number[]
  private readonly table = new Map<number, Candidate>()
  /** Least count over all media. */
  private least: number
  private stride: number
  /** The layer whose width this one follows, so many times; null: its own. */
  private widthOf: { readonly layer: LayerLattice; readonly times: number } | null = null

  constructor(
    readonly spec: LayerSpec,
    readonly offset: number,
    private readonly situation: Situation,
    private readonly growth: Pick<GrowthSpec, 'stepNm' | 'thinnestNm'>,
  ) {
    this.options = spec.media!
    this.longest = parameters.map((_, p) => Math.max(...this.options.map((option) => valuesOf(option, p).length)))
    const places: Omit<Place, 'family'>[] = []
    const add = (what: string, choices: number, ordered: boolean): number =>
      choices > 1 ? offset + places.push({ name: `${spec.id}.${what}`, choices, ordered }) - 1 : -1
    const digits = [
      add('material', this.options.length, false),
      ...parameters.map((name, p) => (p === 0 && spec.xLike !== undefined ? -1 : add(name, this.longest[p], true))),
    ]
    const [first, last, stride] = spec.widthLike ? [0, 0, 1] : this.countRange()
    this.least = first
    this.stride = stride
    const width = spec.widthLike || this.widthIsFixed ? -1 : add('width', (last - first) / stride + 1, true)
    this.placeOf = Int32Array.from([...digits, width])
    this.places = places
  }

  /** From one count to the next. */
  get strideOfCounts(): number {
    return this.stride
  }

  get leastCount(): number {
    return this.least
  }

  /** Whether what this layer is hangs on places of another one. */
  get tied(): boolean {
    return this.spec.widthLike !== undefined || this.spec.xLike !== undefined
  }

  /** Ties to other layers, once all are there: this layer reads their places. */
  follow(layerOf: (id: string) => LayerLattice): void {
    const { widthLike, xLike } = this.spec
    if (xLike !== undefined) this.placeOf[1] = layerOf(xLike).placeOf[1]
    if (!widthLike) return
    const layer = layerOf(widthLike.like)
    this.widthOf = { layer, times: widthLike.times }
    this.placeOf[widthRole] = layer.placeOf[widthRole]
    const scale = this.counted ? widthLike.times : 1
    this.least = scale * layer.least
    this.stride = scale * layer.stride
    this.table.clear()
    if (!Number.isInteger(this.least) || !Number.isInteger(this.stride)) {
      throw new DesignError(
        `Layer ${this.spec.id}: ${widthLike.times} times the width of ${widthLike.like} are not whole monolayers. Write a whole number of times.`,
      )
    }
  }

  /** Whether widths count monolayers, in which a tied one is that of the other times its factor; else the steps are as much longer. */
  private get counted(): boolean {
    const [medium] = this.widthMedia(0)
    return medium.widths.monolayers
  }

  /** The widths of a medium that follow those of another layer. */
  private followed(resolved: ResolvedMedium): Widths {
    const { layer, times } = this.widthOf!
    const { monolayers, stepNm, gap } = widthsOf(layer.spec.width!, resolved, this.growth)
    const place = layer.placeOf[widthRole]
    const scale = monolayers ? times : 1
    const first = scale * layer.least
    const last = place < 0 ? first : first + scale * layer.stride * (layer.places[layer.places.length - 1].choices - 1)
    return {
      first,
      last,
      stride: scale * layer.stride,
      stepNm: monolayers ? stepNm : times * stepNm,
      gap: scale * gap,
      monolayers,
    }
  }

  private get widthIsFixed(): boolean {
    return this.spec.width!.from === this.spec.width!.to
  }

  /** The layer's medium and count; null where this medium has no such value or width. */
  cell(assignment: Int32Array): Cell | null {
    const medium = this.medium(assignment)
    if (medium === null) return null
    const { first, last, gap } = medium.widths
    const count = this.freeCount(assignment) ?? first
    return count >= first && count <= last && (count === 0 || count >= gap) ? { medium, count } : null
  }

  /** The count that the width's place says, allowed or not; null where the width is fixed. */
  freeCount(assignment: Int32Array): number | null {
    const place = this.placeOf[widthRole]
    return place < 0 ? null : this.countAt(assignment[place])
  }

  /** The count that a choice of the width's place means. */
  countAt(choice: number): number {
    return this.leastCount + this.stride * choice
  }

  medium(assignment: Int32Array): Candidate | null {
    const { placeOf } = this
    const option = placeOf[0] < 0 ? 0 : assignment[placeOf[0]]
    let code = option
    for (let p = 0; p < parameters.length; p++) {
      const place = placeOf[p + 1]
      const digit = place < 0 ? 0 : assignment[place]
      if (place >= 0 && digit >= valuesOf(this.options[option], p).length) return null
      code = code * this.longest[p] + digit
    }
    return this.table.get(code) ?? this.fill(code)
  }

  /** Writes the choices of a medium; the width stays. */
  writeMedium(medium: Candidate, assignment: Int32Array): void {
    medium.digits.forEach((digit, role) => {
      if (this.placeOf[role] >= 0) assignment[this.placeOf[role]] = digit
    })
  }

  /** Writes the choice of the medium's width that is nearest to `count`. */
  writeCount({ widths }: Candidate, count: number, assignment: Int32Array): void {
    const place = this.placeOf[widthRole]
    if (place < 0) return
    const { first, last, gap } = widths
    const nearest = Math.round((count - first) / this.stride)
    const most = Math.floor((last - first) / this.stride)
    let steps = Math.min(Math.max(nearest, 0), most)
    // Thinner than can be made: not there, or as thin as can be.
    const thin = first + steps * this.stride
    if (thin > 0 && thin < gap) steps = 2 * count < gap ? 0 : Math.ceil((gap - first) / this.stride)
    assignment[place] = (first - this.leastCount) / this.stride + steps
  }

  /** Every medium that an option gives, in the order of the places; those without a width too. */
  *media(option: number): Iterable<Candidate> {
    const sizes = parameters.map((_, p) => valuesOf(this.options[option], p).length)
    const total = sizes.reduce((product, size) => product * size, 1)
    for (let n = 0; n < total; n++) {
      let rest = n
      let code = option
      let stride = total
      for (let p = 0; p < parameters.length; p++) {
        stride /= sizes[p]
        const digit = Math.floor(rest / stride)
        rest -= digit * stride
        code = code * this.longest[p] + digit
      }
      yield this.table.get(code) ?? this.fill(code)
    }
  }

  /** Media whose widths stand for all of an option's: numbers have no monolayer, so that theirs are all the same. */
  *widthMedia(option: number): Iterable<Candidate> {
    for (const medium of this.media(option)) {
      yield medium
      if (this.options[option].kind === 'numbers') return
    }
  }

  /** This layer's own candidate for a medium that another layer has; the steps must agree, so that counts may be compared. */
  equalOf({ choice, widths }: Candidate): Candidate | null {
    for (let option = 0; option < this.options.length; option++) {
      const digits = digitsOfChoice(this.options[option], choice)
      if (digits === null) continue
      const code = digits.reduce((sum, digit, p) => sum * this.longest[p] + digit, option)
      const own = this.table.get(code) ?? this.fill(code)
      if (own.widths.stepNm === widths.stepNm) return own
    }
    return null
  }

  /** Whether a count is among the widths of a medium of this layer. */
  allows({ widths }: Candidate, count: number): boolean {
    const { first, last, stride, gap } = widths
    return count >= first && count <= last && (count === 0 || count >= gap) && (count - first) % stride === 0
  }

  private fill(code: number): Candidate {
    const digits = this.digitsOf(code)
    const choice = choiceOf(this.options[digits[0]], digits.slice(1))
    const resolved = resolveMedium(choice, this.situation)
    const widths = this.widthOf ? this.followed(resolved) : widthsOf(this.spec.width!, resolved, this.growth)
    const medium = { choice, key: mediumKey(choice), alloy: alloyOf(choice), resolved, widths, digits }
    this.table.set(code, medium)
    return medium
  }

  private digitsOf(code: number): number[] {
    const digits = new Array<number>(1 + parameters.length)
    for (let p = parameters.length - 1; p >= 0; p--) {
      digits[p + 1] = code % this.longest[p]
      code = (code - digits[p + 1]) / this.longest[p]
    }
    digits[0] = code
    return digits
  }

  /** Least and greatest count over all media, and the stride, which they share. */
  private countRange(): [first: number, last: number, stride: number] {
    let range: [number, number, number] | null = null
    for (let option = 0; option < this.options.length; option++) {
      for (const { widths } of this.widthMedia(option)) {
        const count = countsOf(widths)
        if (count === 0) continue
        const { first, last, stride } = widths
        const end = first + stride * Math.floor((last - first) / stride)
        range = range ? [Math.min(range[0], first), Math.max(range[1], end), stride] : [first, end, stride]
      }
    }
    if (range) return range
    const { from, to, unit } = this.spec.width!
    const { thinnestNm } = this.growth
    const thin = thinnestNm === null ? '' : `, or thinner than ${thinnestNm} nm, growth.thinnest`
    throw new DesignError(
      `Layer ${this.spec.id}: ${from}..${to} ${unit} holds no whole step of any of its media${thin}. Widen the range, or give a finer step.`,
    )
  }
}

/** Index of the width in `placeOf`, behind the option and the parameters. */
export const widthRole = 1 + parameters.length

/** The values that an option leaves open for parameter `p`; a single one where it has none. */
export function valuesOf(option: MediumOption, p: number): readonly number[] {
  return listsOf(option)[p] ?? none
}

/** In the order of `parameters`; absent where the option has none. */
export function listsOf(option: MediumOption): readonly (readonly number[] | undefined)[] {
  switch (option.kind) {
    case 'material':
      return option.x === null ? [] : [option.x]
    case 'numbers':
      return [undefined, option.potentialEv, option.massRel, option.alphaPerEv]
    case 'index':
      return [undefined, undefined, undefined, undefined, option.index, option.extinction]
    case 'table':
      return []
  }
}

const none: readonly number[] = [Number.NaN]

/** The ends of an alloy are binaries. */
export function alloyOf(choice: MediumChoice): string | null {
  if (choice.kind !== 'material' || choice.x === null || choice.x === 0 || choice.x === 1) return null
  return needsX(choice.material) ? mediumKey(choice) : null
}

function choiceOf(option: MediumOption, digits: readonly number[]): MediumChoice {
  if (option.kind === 'material') {
    const { material, x, own } = option
    return { kind: 'material', material, x: x === null ? null : x[digits[0]], ...(own ? { own } : {}) }
  }
  if (option.kind === 'table') return option
  if (option.kind === 'index') {
    const { name, index, extinction } = option
    return { kind: 'index', name, index: index[digits[4]], extinction: extinction[digits[5]] }
  }
  const { name, potentialEv, massRel, alphaPerEv } = option
  return {
    kind: 'numbers',
    name,
    potentialEv: potentialEv[digits[1]],
    massRel: massRel[digits[2]],
    alphaPerEv: alphaPerEv[digits[3]],
  }
}

/** Number of the value in each list, or null where the option does not give this medium. */
function digitsOfChoice(option: MediumOption, choice: MediumChoice): number[] | null {
  if (option.kind === 'material' && !(choice.kind === 'material' && sameMaterial(option, choice))) return null
  if (option.kind === 'table' && mediumKey(option) !== mediumKey(choice)) return null
  if (option.kind !== choice.kind) return null
  const values = valuesOfChoice(choice)
  const digits = parameters.map((_, p) => {
    const list = listsOf(option)[p]
    return list === undefined ? 0 : list.indexOf(values[p]!)
  })
  return digits.includes(-1) ? null : digits
}

type Named = { readonly material: string; readonly own?: Override }

function sameMaterial(a: Named, b: Named): boolean {
  const bare = ({ material, own }: Named) => mediumKey({ kind: 'material', material, x: null, ...(own ? { own } : {}) })
  return bare(a) === bare(b)
}

/** In the order of `parameters`. */
function valuesOfChoice(choice: MediumChoice): readonly (number | undefined)[] {
  switch (choice.kind) {
    case 'material':
      return [choice.x ?? undefined]
    case 'numbers':
      return [undefined, choice.potentialEv, choice.massRel, choice.alphaPerEv]
    case 'index':
      return [undefined, undefined, undefined, undefined, choice.index, choice.extinction]
    case 'table':
      return []
  }
}

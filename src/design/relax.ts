import {
  buildSystem,
  type ElectronSituation,
  type MediumChoice,
  regionDerivative,
  resolveMedium,
  resolveRegion,
  type Situation,
} from '../model/index.js'
import type { WaveSystem } from '../wave/index.js'
import type { Lattice } from './Lattice.js'
import { type Cell, type LayerLattice, parameters, valuesOf } from './LayerLattice.js'
import { repaired } from './repair.js'
import type { Relaxed } from './types.js'
import { countsOf } from './widthsOf.js'

/**
 * Everything ordered around an assignment as continuous variables, the materials of lists held. A width varies in steps (so that an
 * alloy's monolayer, which grows with x through strain, takes the width along), scaled to one nm; x in tenths, potentials in 50 meV,
 * masses in a fifth of their mean, alpha in 1/eV, indices in tenths; films are scaled to ten nm. An extinction stays as it is. A layer that stands several times adds up in none of these: each slot is a row of its
 * own, and the variable moves them all.
 */
export function relaxed(lattice: Lattice, assignment: Int32Array): Relaxed {
  return new RelaxedStack(lattice, Int32Array.from(assignment))
}

interface Variable {
  readonly layer: number
  /** Index of a parameter, or `parameters.length` for the width. */
  readonly what: number
  /** Value = variable * unit. */
  readonly unit: number
  readonly start: number
  readonly lower: number
  readonly upper: number
}

/** A described layer at continuous values. */
interface FreeLayer {
  readonly choice: MediumChoice
  readonly count: number
  readonly stepNm: number
}

const width = parameters.length

class RelaxedStack implements Relaxed {
  readonly start: Float64Array
  readonly lower: Float64Array
  readonly upper: Float64Array
  readonly place: Int32Array
  private readonly cells: readonly Cell[]
  private readonly variables: readonly Variable[]
  /** What each variable moves beside its own layer. */
  private readonly followers: readonly (readonly Follower[])[]

  constructor(
    private readonly lattice: Lattice,
    private readonly origin: Int32Array,
  ) {
    this.cells = lattice.cells(origin)
    this.variables = lattice.layers.flatMap((layer, i) => variablesOf(layer, i, this.cells[i]))
    this.followers = this.variables.map((variable) => followersOf(lattice, variable))
    this.start = Float64Array.from(this.variables, ({ start }) => start)
    this.lower = Float64Array.from(this.variables, ({ lower }) => lower)
    this.upper = Float64Array.from(this.variables, ({ upper }) => upper)
    this.place = Int32Array.from(this.variables, ({ layer, what }) => lattice.layers[layer].placeOf[what + 1])
  }

  valueOf(variable: number, choice: number): number {
    const { layer, what, unit } = this.variables[variable]
    const { medium } = this.cells[layer]
    const lattice = this.lattice.layers[layer]
    if (what !== width) return (valuesOf(lattice.options[medium.digits[0]], what)[choice] ?? Number.NaN) / unit
    const count = lattice.countAt(choice)
    return lattice.allows(medium, count) ? count / unit : Number.NaN
  }

  systems(values: Float64Array): WaveSystem[] {
    const layers = this.layersAt(values).map(({ choice, count, stepNm }) => ({ choice, widthNm: count * stepNm }))
    const rows = this.lattice
      .slots(this.origin)
      .map(({ layer, slices, biased }) => ({ ...layers[layer], slices, biased }))
    return this.lattice.situations.map((situation) => buildSystem(situation, rows))
  }

  directions(values: Float64Array): Float64Array[] {
    const layers = this.layersAt(values)
    return this.lattice.situations.map((situation) => this.directionsAt(layers, situation))
  }

  private directionsAt(layers: readonly FreeLayer[], situation: Situation): Float64Array {
    const slots = this.lattice.slots(this.origin)
    const stride = strideOf(situation)
    const row = slots.length * stride
    const out = new Float64Array(this.variables.length * row)
    this.variables.forEach((variable, v) => {
      for (const { layer: moved, factor } of [{ layer: variable.layer, factor: 1 }, ...this.followers[v]]) {
        const change = this.changeOf(
          { ...variable, layer: moved, unit: variable.unit * factor },
          layers[moved],
          situation,
        )
        slots.forEach(({ layer }, slot) => {
          if (layer === moved) out.set(change, v * row + slot * stride)
        })
      }
    })
    return out
  }

  snap(values: Float64Array): Int32Array {
    const { lattice, cells } = this
    const out = Int32Array.from(this.origin)
    const layers = this.layersAt(values)
    this.variables.forEach(({ layer: i, what, unit }, v) => {
      if (what === width) return
      const { options, placeOf } = lattice.layers[i]
      out[placeOf[what + 1]] = nearestIndex(valuesOf(options[cells[i].medium.digits[0]], what), values[v] * unit)
    })
    for (const { layer: i, what } of this.variables) {
      if (what !== width) continue
      const { count, stepNm } = layers[i]
      const medium = lattice.layers[i].medium(out)!
      if (countsOf(medium.widths) > 0)
        lattice.layers[i].writeCount(medium, (count * stepNm) / medium.widths.stepNm, out)
    }
    const snapped = repaired(lattice, out)
    return lattice.feasible(snapped) ? snapped : Int32Array.from(this.origin)
  }

  /** The described layers at the variables' values. */
  private layersAt(values: Float64Array): FreeLayer[] {
    const numbers = this.cells.map(() => new Map<number, number>())
    this.variables.forEach(({ layer, what, unit }, v) => {
      numbers[layer].set(what, values[v] * unit)
      for (const { layer: moved, factor } of this.followers[v]) numbers[moved].set(what, values[v] * unit * factor)
    })
    return this.cells.map(({ medium, count }, i) => {
      const free = numbers[i]
      const moved = [...free.keys()].some((what) => what !== width)
      const choice = moved ? movedChoice(medium.choice, free) : medium.choice
      const { widths } = medium
      const stepNm =
        moved && widths.monolayers ? resolveMedium(choice, this.lattice.situations[0]).monolayerNm! : widths.stepNm
      return { choice, count: free.get(width) ?? count, stepNm }
    })
  }

  /** d[width, potential, mass, alpha]/d(variable) of a layer. */
  private changeOf({ what, unit, layer }: Variable, at: FreeLayer, situation: Situation): Float64Array {
    const change = new Float64Array(strideOf(situation))
    if (what === width) change[0] = at.stepNm * unit
    else if (situation.kind === 'light') change[1] = unit
    else if (what > 0) change[what] = unit
    else {
      const { potentialEv, massRel, alphaPerEv } = regionDerivative(at.choice, situation)
      const step = this.cells[layer].medium.widths.monolayers ? monolayerDerivative(at.choice, situation) : 0
      change.set([at.count * step * unit, potentialEv * unit, massRel * unit, alphaPerEv * unit])
    }
    return change
  }
}

/** Width, then potential, mass, alpha; or width and index. */
function strideOf({ kind }: Situation): number {
  return kind === 'electron' ? 4 : 2
}

/** A layer that a variable moves beside its own, so many times as far. */
interface Follower {
  readonly layer: number
  readonly factor: number
}

function followersOf({ layers }: Lattice, { layer, what }: Variable): Follower[] {
  const { id } = layers[layer].spec
  return layers.flatMap(({ spec, strideOfCounts }, i) => {
    if (what === 0) return spec.xLike === id ? { layer: i, factor: 1 } : []
    if (what !== width || spec.widthLike?.like !== id) return []
    return { layer: i, factor: strideOfCounts / layers[layer].strideOfCounts }
  })
}

function variablesOf(layer: LayerLattice, number: number, { medium, count }: Cell): Variable[] {
  const variables: Variable[] = []
  parameters.forEach((name, what) => {
    if (name === 'x' && layer.spec.xLike !== undefined) return
    const values = valuesOf(layer.options[medium.digits[0]], what)
    if (values.length < 2 || name === 'extinction') return
    const [first, last] = [values[0], values[values.length - 1]]
    const unit = name === 'mass' ? (first + last) / 10 : units[name]
    const start = values[medium.digits[what + 1]] / unit
    variables.push({ layer: number, what, unit, start, lower: first / unit, upper: last / unit })
  })
  const { first, last, stride: by, stepNm } = medium.widths
  const choices = countsOf(medium.widths)
  if (choices > 1 && !layer.spec.widthLike) {
    const unit = (medium.resolved.kind === 'light' ? filmNm : 1) / stepNm
    const most = first + by * Math.floor((last - first) / by)
    const [start, lower, upper] = [count, first, most].map((n) => n / unit)
    variables.push({ layer: number, what: width, unit, start, lower, upper })
  }
  return variables
}

/** What changes a transmission by about as much as one nm does. */
const units = { x: 0.1, potential: 0.05, alpha: 1, index: 0.1 }
const filmNm = 10

function movedChoice(choice: MediumChoice, to: ReadonlyMap<number, number>): MediumChoice {
  if (choice.kind === 'material') return { ...choice, x: to.get(0) ?? choice.x }
  if (choice.kind === 'table') return choice
  if (choice.kind === 'index') return { ...choice, index: to.get(4) ?? choice.index }
  const [potentialEv, massRel, alphaPerEv] = [1, 2, 3].map((what) => to.get(what))
  return {
    ...choice,
    potentialEv: potentialEv ?? choice.potentialEv,
    massRel: massRel ?? choice.massRel,
    alphaPerEv: alphaPerEv ?? choice.alphaPerEv,
  }
}

/** d(nm per monolayer)/dx; the central difference is good to 1e-8, for the monolayer is nearly straight in x. */
function monolayerDerivative(choice: MediumChoice, situation: ElectronSituation): number {
  if (choice.kind !== 'material') return 0
  const at = (shift: number) => resolveRegion({ ...choice, x: choice.x! + shift }, situation).monolayerNm!
  return (at(1e-3) - at(-1e-3)) / 2e-3
}

function nearestIndex(values: readonly number[], to: number): number {
  let best = 0
  for (let i = 1; i < values.length; i++) {
    if (Math.abs(values[i] - to) < Math.abs(values[best] - to)) best = i
  }
  return best
}

import type { WaveMedia, WaveStack, WaveSystem } from '../wave/index.js'
import { lightMedia } from './lightMedia.js'
import { resolveOptics } from './resolveOptics.js'
import type { LightSituation, Medium, MediumChoice, ModelLayer, OfWavelength } from './types.js'

/**
 * Layers of a job of light as the wave core reads them. Half s, half p is a system with the other one beside it. The media of a situation
 * are made once, so that equal lists of them are one object and what is known of it at some energies stays known.
 */
export function opticalSystem(situation: LightSituation, layers: readonly ModelLayer[]): WaveSystem {
  const list = new MediaList(situation)
  const stack: WaveStack = {
    entry: list.numberOf(situation.entry),
    exit: list.numberOf(situation.exit),
    medium: Int32Array.from(layers, ({ choice, indexShift = 0 }) => list.numberOf(choice, indexShift)),
    width: Float64Array.from(layers, ({ widthNm }) => widthNm),
  }
  const behind = situation.back === null ? {} : { behind: list.numberOf(situation.back) }
  const { polarisation } = situation
  if (polarisation !== 'mean') return { media: list.media(polarisation, stack.entry), stack, ...behind }
  const beside: WaveSystem = { media: list.media('p', stack.entry), stack, ...behind }
  return { media: list.media('s', stack.entry), stack, ...behind, beside }
}

/** Of lists without shifted indices, which each trial has of its own. */
const known = new WeakMap<LightSituation, Map<string, WaveMedia>>()
const mostKnown = 64

class MediaList {
  private readonly media_: Medium[] = []
  private readonly numbers = new Map<string, number>()
  private shifted = false

  constructor(private readonly situation: LightSituation) {}

  numberOf(choice: MediumChoice, shift = 0): number {
    const key = `${opticsKey(choice)} ${shift}`
    const number = this.numbers.get(key)
    if (number !== undefined) return number
    if (shift !== 0) this.shifted = true
    const { index, extinction } = resolveOptics(choice, this.situation).medium
    this.numbers.set(key, this.media_.length)
    return this.media_.push({ index: moved(index, shift), extinction }) - 1
  }

  media(polarisation: 's' | 'p', entry: number): WaveMedia {
    const made = () => lightMedia(this.media_, { medium: entry, angleDeg: this.situation.angleDeg, polarisation })
    if (this.shifted) return made()
    let mine = known.get(this.situation)
    if (!mine || mine.size >= mostKnown) {
      mine = new Map()
      known.set(this.situation, mine)
    }
    const key = [polarisation, ...this.numbers.keys()].join('|')
    const found = mine.get(key) ?? made()
    mine.set(key, found)
    return found
  }
}

function moved(index: OfWavelength, shift: number): OfWavelength {
  if (shift === 0) return index
  return typeof index === 'number' ? index + shift : (nm) => index(nm) + shift
}

const tableNumbers = new WeakMap<object, number>()
let tables = 0

function opticsKey(choice: MediumChoice): string {
  if (choice.kind === 'material') return `${choice.material} ${choice.own?.index ?? ''} ${choice.own?.extinction ?? ''}`
  if (choice.kind === 'index') return `[${choice.index} ${choice.extinction}]`
  if (choice.kind === 'numbers') return ''
  const number = tableNumbers.get(choice.rows) ?? ++tables
  tableNumbers.set(choice.rows, number)
  return `table ${number}`
}

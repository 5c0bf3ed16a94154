import type { GrownLayer } from '../design/index.js'
import type { GrowthSpec } from '../job/index.js'
import type { MediumChoice } from '../model/index.js'
import { type Feed, feedsOf } from './feeds.js'

/** Which independent errors a stack has and which layers each of them moves (design 2). Layers from entry to exit. */
export class ErrorModel {
  /** Cells of each layer. */
  readonly feeds: readonly (readonly Feed[])[]
  /** Distinct sources: one rate error each, a fraction. */
  readonly sources: readonly string[]
  /** Distinct alloys, as `AlGaAs 0.35`: one error of x each. */
  readonly alloys: readonly string[]
  /** The alloy of each layer by its number in `alloys`, -1 for none. */
  readonly alloyOf: readonly number[]
  /** Distinct films, by the names of their sources: one error of the index each; none for electrons. */
  readonly films: readonly string[]
  /** Place of each layer, counted from the substrate, from 1: one error of its width each. */
  readonly places: readonly number[]
  /** One standard deviation of each layer's own width. */
  readonly layerSdNm: readonly number[]

  constructor(
    readonly layers: readonly GrownLayer[],
    growth: Pick<GrowthSpec, 'startsAt' | 'sources' | 'spread'>,
  ) {
    this.feeds = layers.map(({ choice, resolved }) => feedsOf(choice, resolved.kind, growth.sources))
    this.sources = [...new Set(this.feeds.flat().map(({ source }) => source))]
    this.films = layers.some(({ resolved }) => resolved.kind === 'light') && growth.spread.index > 0 ? this.sources : []
    const alloys = layers.map(({ choice }) => alloyName(choice))
    this.alloys = [...new Set(alloys.filter((name) => name !== null))]
    this.alloyOf = alloys.map((name) => (name === null ? -1 : this.alloys.indexOf(name)))
    this.places = layers.map((_, i) => (growth.startsAt === 'exit' ? layers.length - i : i + 1))
    const { value, unit } = growth.spread.layer
    this.layerSdNm = layers.map(
      ({ resolved, stepNm }) => value * (unit === 'ML' ? (resolved.monolayerNm ?? stepNm) : 1),
    )
  }
}

function alloyName(choice: MediumChoice): string | null {
  return choice.kind === 'material' && choice.x !== null ? `${choice.material} ${choice.x}` : null
}

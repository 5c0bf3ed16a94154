import type { GrownLayer } from '../design/index.js'
import type { GrowthSpec } from '../job/index.js'
import type { MediumChoice, ModelLayer } from '../model/index.js'
import { ErrorModel } from './ErrorModel.js'
import { type RandomStream, randomStream } from './random.js'

/** A layer as a trial grew it. */
export type TrialLayer = ModelLayer

/**
 * One stack grown on paper again and again. Trial number k draws the same numbers for the same source name, place from the
 * substrate and alloy in every stack of a seed. The errors are exact, not first order: a layer fed by cells with shares s and
 * rate errors f has the width w sum s (1 + f) plus its own error, at least 0, and x (1 + f)/sum s (1 + f) of the first-named
 * element plus the alloy's error, within 0 and 1; a film has the listed index plus that of its source.
 */
export class Trials {
  private readonly model: ErrorModel
  private readonly rates: readonly RandomStream[]
  private readonly widths: readonly RandomStream[]
  private readonly alloys: readonly RandomStream[]
  private readonly films: readonly RandomStream[]

  constructor(
    layers: readonly GrownLayer[],
    private readonly growth: Pick<GrowthSpec, 'startsAt' | 'sources' | 'spread'>,
    seed: Uint32Array | string,
  ) {
    this.model = new ErrorModel(layers, growth)
    this.rates = this.model.sources.map((source) => randomStream(seed, 'rate', source))
    this.widths = this.model.places.map((place) => randomStream(seed, 'layer', place))
    this.alloys = this.model.alloys.map((alloy) => randomStream(seed, 'x', alloy))
    this.films = this.model.films.map((film) => randomStream(seed, 'index', film))
  }

  /** The next trial. */
  next(): TrialLayer[] {
    const { model, growth } = this
    const rate = new Map(model.sources.map((source, i) => [source, growth.spread.rate * this.rates[i].normal()]))
    const x = this.alloys.map((stream) => growth.spread.x * stream.normal())
    const index = new Map(model.films.map((film, i) => [film, growth.spread.index * this.films[i].normal()]))
    return model.layers.map(({ choice, widthNm, slices, biased }, j) => {
      const parts = model.feeds[j].map(({ source, share }) => share * (1 + rate.get(source)!))
      const grown = parts.reduce((sum, part) => sum + part, 0)
      const width = Math.max(0, widthNm * grown + model.layerSdNm[j] * this.widths[j].normal())
      const alloy = model.alloyOf[j]
      if (alloy < 0) {
        const indexShift = index.get(model.feeds[j][0].source)
        return { choice, widthNm: width, slices, biased, ...(indexShift === undefined ? {} : { indexShift }) }
      }
      const share = Math.min(1, Math.max(0, parts[0] / grown + x[alloy]))
      return { choice: { ...choice, x: share } as MediumChoice, widthNm: width, slices, biased }
    })
  }
}

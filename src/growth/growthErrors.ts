import type { GrownLayer } from '../design/index.js'
import type { GrowthSpec } from '../job/index.js'
import { regionDerivative, type Situation } from '../model/index.js'
import { ErrorModel } from './ErrorModel.js'
import type { GrowthError } from './types.js'

/**
 * The independent errors of growth to first order: one of the rate for each source (it scales that source's share of every layer
 * that it feeds, and moves x: dx = x (1 - x) of the first-named element's cell, the opposite of the other's), one of the width
 * for each layer, one of x for each alloy, which changes the material and not the width; for light one of the index of each film.
 */
export function growthErrors(
  layers: readonly GrownLayer[],
  situation: Situation,
  growth: Pick<GrowthSpec, 'startsAt' | 'sources' | 'spread'>,
): GrowthError[] {
  const model = new ErrorModel(layers, growth)
  const { spread } = growth
  // Width, then potential, mass, alpha; or width and index.
  const perLayer = situation.kind === 'electron' ? 4 : 2
  const slopes = layers.map(({ choice }) => {
    if (situation.kind === 'light') return []
    const { potentialEv, massRel, alphaPerEv } = regionDerivative(choice, situation)
    return [potentialEv, massRel, alphaPerEv]
  })
  const rates = model.sources.map((source) => {
    const direction = empty()
    layers.forEach(({ choice, widthNm }, j) => {
      model.feeds[j].forEach((feed, i) => {
        if (feed.source !== source) return
        direction[perLayer * j] += feed.share * widthNm
        if (choice.kind !== 'material' || choice.x === null) return
        addX(direction, j, (i === 0 ? 1 : -1) * choice.x * (1 - choice.x))
      })
    })
    return { name: `rate of ${source}`, sd: spread.rate, direction }
  })
  const widths = layers.map((_, j) => {
    const direction = empty()
    direction[perLayer * j] = 1
    return { name: `layer ${model.places[j]}`, sd: model.layerSdNm[j], direction }
  })
  const alloys = model.alloys.map((name, alloy) => {
    const direction = empty()
    model.alloyOf.forEach((of, j) => {
      if (of === alloy) addX(direction, j, 1)
    })
    return { name: `x of ${name}`, sd: spread.x, direction }
  })
  const indices = model.films.map((film) => {
    const direction = empty()
    model.feeds.forEach(([{ source }], j) => {
      if (source === film) direction[perLayer * j + 1] = 1
    })
    return { name: `index of ${film}`, sd: spread.index, direction }
  })
  return [...rates, ...widths, ...alloys, ...indices]

  function empty(): Float64Array {
    return new Float64Array(perLayer * layers.length)
  }

  function addX(direction: Float64Array, j: number, dx: number): void {
    slopes[j].forEach((slope, p) => {
      direction[perLayer * j + 1 + p] += slope * dx
    })
  }
}

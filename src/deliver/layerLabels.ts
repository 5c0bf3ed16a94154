import type { Box } from './frame.js'
import { fitted, label, textWidth } from './label.js'
import { mediumText, widthText } from './layerText.js'
import { palette } from './palette.js'
import { pushApart } from './pushApart.js'
import { element, fixed } from './svg.js'
import type { LayerReport } from './types.js'

const size = 11
const pitch = 15
const longest = 150

/** Names of layers above a plot of the stack. */
export interface LayerLabels {
  /** Room that they take above the plot. */
  readonly height: number
  /** @param x z in nm to pixels */
  draw(box: Box, x: (zNm: number) => number): string[]
}

/**
 * `AlGaAs 0.35` over `12 ML` in two level lines where neighbours leave room for that, else upright and led to their layers. A stack of
 * more layers than the picture has room for names none of them: layers.csv does.
 *
 * @param layers from entry to exit, the first at z = 0
 * @param scale pixels per nm
 */
export function layerLabels(layers: readonly LayerReport[], scale: number, width: number): LayerLabels {
  const names = layers.map((layer) => [mediumText(layer.choice), widthText(layer)] as const)
  const middles = middlesNm(layers)
  const rooms = names.map((lines) => Math.max(...lines.map((line) => textWidth(line, size))) + 8)
  const level = rooms.every((room, i) => i === 0 || (rooms[i - 1] + room) / 2 <= (middles[i] - middles[i - 1]) * scale)
  if (level) {
    return {
      height: 34,
      draw: ({ top }, x) =>
        names.flatMap((lines, i) =>
          lines.map((line, row) => label(x(middles[i]), top - 21 + 14 * row, line, { size, anchor: 'middle' })),
        ),
    }
  }
  if (layers.length * pitch > width) {
    const text = `${layers.length} layers, named in layers.csv`
    return { height: 20, draw: ({ left, top }) => [label(left, top - 7, text, { size, fill: palette.quiet })] }
  }
  const texts = names.map((lines) => fitted(lines.join(', '), longest, size))
  return {
    height: 22 + Math.max(0, ...texts.map((text) => textWidth(text, size))),
    draw: (box, x) => {
      const wishes = middles.map(x)
      const places =
        pushApart(
          wishes,
          texts.map(() => pitch),
          box.left,
          box.left + box.width,
        ) ?? wishes
      return texts.flatMap((text, i) => [
        label(places[i] + 4, box.top - 18, text, { size, upright: true }),
        element('polyline', {
          points: [places[i], box.top - 14, wishes[i], box.top - 3].map(fixed).join(' '),
          ...{ fill: 'none', stroke: palette.border },
        }),
      ])
    },
  }
}

function middlesNm(layers: readonly LayerReport[]): number[] {
  let from = 0
  return layers.map(({ widthNm }) => {
    from += widthNm
    return from - widthNm / 2
  })
}

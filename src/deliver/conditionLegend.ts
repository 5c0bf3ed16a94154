import type { Box } from './frame.js'
import { fitted, label, textWidth } from './label.js'
import { palette } from './palette.js'
import { element } from './svg.js'
import type { SpectrumReport } from './types.js'

const rowHeight = 16

/** The conditions by name, colour and dash, in rows below a plot; a job with one condition needs no legend. */
export function conditionLegend(
  spectra: readonly SpectrumReport[],
  { left, width }: Box,
  top: number,
): { height: number; parts: string[] } {
  if (spectra.length < 2) return { height: 0, parts: [] }
  let x = left
  let row = 0
  const parts = spectra.flatMap(({ condition }, i) => {
    const { stroke, dash } = palette.curves[i % palette.curves.length]
    const text = fitted(condition, 200, 11)
    const room = 32 + textWidth(text, 11)
    if (x > left && x + room > left + width) {
      x = left
      row++
    }
    const at = x
    const y = top + row * rowHeight
    x += room + 18
    return [
      element('line', {
        x1: at,
        x2: at + 27,
        y1: y - 4,
        y2: y - 4,
        stroke,
        'stroke-width': 2,
        'stroke-dasharray': dash,
      }),
      label(at + 32, y, text, { size: 11 }),
    ]
  })
  return { height: (row + 1) * rowHeight, parts }
}

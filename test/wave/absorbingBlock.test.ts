import fc from 'fast-check'
import { expect, test } from 'vitest'
import { lightMedia } from '../../src/model/index.js'
import { mediaTable, spectrumInto } from '../../src/wave/index.js'
import { poisoned } from './regionSystem.js'

/** T and R in blocks against the sweep point by point, which the 60-digit reference holds. */

const number = (min: number, max: number) => fc.double({ min, max, noNaN: true })
const film = fc.record({ index: number(0.05, 4), extinction: fc.oneof(fc.constant(0), number(0, 8)) })

test('T and R of absorbing stacks, thin and thick, s and p, from either side', () => {
  fc.assert(
    fc.property(
      fc.array(film, { minLength: 1, maxLength: 4 }),
      fc.record({ index: number(1, 3), extinction: fc.oneof(fc.constant(0), number(0, 8)) }),
      fc.array(fc.tuple(fc.nat(), fc.oneof(number(0, 400), number(0, 40_000))), { maxLength: 9 }),
      fc.record({ angleDeg: number(0, 89), polarisation: fc.constantFrom('s' as const, 'p' as const) }),
      fc.boolean(),
      (films, exit, layers, incidence, backwards) => {
        const from = backwards && exit.extinction === 0 ? 'exit' : 'entry'
        const media = lightMedia([{ index: 1.5 }, exit, ...films], { medium: from === 'entry' ? 0 : 1, ...incidence })
        const points = 131
        const energies = Float64Array.from({ length: points }, (_, e) => 0.8 + 0.03 * e)
        const table = {
          ...mediaTable(media, points),
          qIm: new Float64Array(media.count * points),
          muIm: new Float64Array(media.count * points),
        }
        media.fill(energies, table)
        const stack = {
          entry: 0,
          exit: 1,
          medium: Int32Array.from(layers, ([m]) => 2 + (m % films.length)),
          width: Float64Array.from(layers, ([, w]) => w),
        }
        const rows = () => ({ T: poisoned(points), R: poisoned(points), log10T: poisoned(points) })
        const [whole, block] = [{ ...rows(), A: poisoned(points) }, rows()]
        spectrumInto(table, stack, whole, from)
        spectrumInto(table, stack, block, from)
        for (let e = 0; e < points; e++) {
          expect(Math.abs(block.R[e] - whole.R[e])).toBeLessThan(1e-10)
          if (whole.log10T[e] > Number.NEGATIVE_INFINITY) {
            expect(Math.abs(block.log10T[e] - whole.log10T[e])).toBeLessThan(1e-9 + 1e-12 * Math.abs(whole.log10T[e]))
          } else expect(block.log10T[e]).toBe(whole.log10T[e])
        }
      },
    ),
    { seed: 5, numRuns: 300 },
  )
})

import { describe, expect, test } from 'vitest'
import { randomStream } from '../../src/growth/index.js'
import { systemOf } from '../../src/model/index.js'
import { compileTarget } from '../../src/target/index.js'
import { spectrumInto, type WaveSystem } from '../../src/wave/index.js'
import { block, evenly, spec } from './coldCollector.js'

const range = [0.02, 0.18] as const
const grid = Float64Array.from(evenly(...range, 40_001))

function gridT({ media, stack }: WaveSystem): Float64Array {
  const size = media.count * grid.length
  const table = { count: media.count, points: grid.length, q: new Float64Array(size), mu: new Float64Array(size) }
  media.fill(grid, table)
  const T = new Float64Array(grid.length)
  spectrumInto(table, stack, { T, R: new Float64Array(grid.length) })
  return T
}

/** Two to four barriers of 1 to 5 nm and 0.2 to 0.4 eV, wells of 3 to 12 nm, unequal leads. */
function anyStack(number: number): WaveSystem {
  const random = randomStream('extremes', number)
  const between = (from: number, to: number) => from + (to - from) * random.uniform()
  const barriers = 2 + random.integer(3)
  const layers = Array.from({ length: 2 * barriers - 1 }, (_, j) =>
    j % 2 === 0
      ? { potentialEv: between(0.2, 0.4), massRel: between(0.08, 0.1), alphaPerEv: 0.5, widthNm: between(1, 5) }
      : { potentialEv: 0, massRel: 0.067, alphaPerEv: 0.6, widthNm: between(3, 12) },
  )
  const lead = { potentialEv: 0, massRel: 0.067, alphaPerEv: 0.6 }
  const exit = { ...lead, potentialEv: between(-0.1, 0.015) }
  return systemOf({ kind: 'electron', entry: lead, layers, exit })
}

describe('the extremes of a closed range', () => {
  const target = compileTarget({
    ...spec,
    kind: 'electron',
    resolutionEv: null,
    demands: [
      { ...block('b', 1, ...range, 1e-3), pointsEv: evenly(...range, 64) },
      {
        kind: 'pass',
        accept: null,
        at: null,
        quantity: 'T',
        id: 'p',
        weight: 1,
        above: 0.9,
        pointsEv: evenly(...range, 64),
      },
    ],
  })

  test('hold every T of 40 001 energies between them, and are met by T itself', () => {
    for (let number = 0; number < 40; number++) {
      const system = anyStack(number)
      const T = gridT(system)
      const [greatest, least] = target.evaluate([system]).demands
      const most = T.reduce((a, b) => Math.max(a, b))
      const fewest = T.reduce((a, b) => Math.min(a, b))
      expect(greatest.reached! / most, `stack ${number}`).toBeGreaterThan(1 - 1e-9)
      expect(fewest / least.reached!, `stack ${number}`).toBeGreaterThan(1 - 1e-9)
      // Needles hide between the points of a grid, minima do not.
      expect(fewest / least.reached!, `stack ${number}`).toBeLessThan(1 + 1e-4)
      for (const { reached, extremeEv } of [greatest, least]) {
        const at = compileTarget({
          ...spec,
          demands: [
            {
              kind: 'curve',
              accept: null,
              at: null,
              quantity: 'T',
              mostRms: null,
              id: 'c',
              weight: 1,
              file: '',
              rows: [row(extremeEv!)],
            },
          ],
        })
        expect(at.evaluate([system]).demands[0].reached! / reached!, `stack ${number}`).toBeCloseTo(1, 9)
      }
    }
  })
})

/** A row whose violation is T. */
function row(energyEv: number) {
  return { energyEv, T: 0, sense: 'equal', scale: 'linear', tolerance: 1, weight: 1 } as const
}

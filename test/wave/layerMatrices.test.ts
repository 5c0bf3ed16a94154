import { describe, expect, it } from 'vitest'
import { electronMedia } from '../../src/model/electronMedia.js'
import { layerMatrices, spectrumInto } from '../../src/wave/index.js'

const regions = [
  { potentialEv: 0, massRel: 0.067 },
  { potentialEv: 0.3, massRel: 0.09 },
  { potentialEv: -0.05, massRel: 0.06, alphaPerEv: 1 },
]
const energies = Float64Array.of(0.02, 0.1, 0.25, 0.3, 0.31, 0.7)
const widths = [3, 5.5, 0, 2.2, 7]
const stack = { entry: 0, exit: 2, medium: Int32Array.of(1, 2, 1, 1, 0), width: Float64Array.from(widths) }
const system = { media: electronMedia(regions), stack }
const layers = widths.length
const out = () => ({ same: new Float64Array(30), down: new Float64Array(30), up: new Float64Array(30) })

describe('layerMatrices', () => {
  const matrices = out()
  const ends = layerMatrices(system, energies, matrices)!

  it('have determinant 1, and carry nothing through no width', () => {
    for (let i = 0; i < 30; i++) {
      const { same, down, up } = matrices
      expect(same[i] * same[i] - down[i] * up[i]).toBeCloseTo(1, 10)
      if (i % layers === 2) expect([same[i], Math.abs(down[i]), Math.abs(up[i])]).toEqual([1, 0, 0])
    }
  })

  it('multiply to T as the spectrum has it', () => {
    const table = { count: 3, points: 6, q: new Float64Array(18), mu: new Float64Array(18) }
    system.media.fill(energies, table)
    const spectrum = { T: new Float64Array(6), R: new Float64Array(6) }
    spectrumInto(table, stack, spectrum)
    energies.forEach((_, e) => {
      let [u, v, x, y] = [1, 0, 0, ends.exitY[e]]
      for (let j = layers - 1; j >= 0; j--) {
        const [c, down, up] = [matrices.same, matrices.down, matrices.up].map((values) => values[e * layers + j])
        ;[u, v, x, y] = [c * u + down * v, up * u + c * v, c * x + down * y, up * x + c * y]
      }
      // u = A + B, v = iY(A - B) with (u, v) = (u + ix, v + iy).
      const Y = ends.entryY[e]
      const a = ((u + y / Y) ** 2 + (x - v / Y) ** 2) / 4
      expect(ends.exitY[e] / Y / a / spectrum.T[e]).toBeCloseTo(1, 12)
    })
  })

  it('tell the greatest arguments, and refuse what no double can hold', () => {
    // kappa = sqrt(2 m (V - E))/hbar, with hbar²/2m0 = 0.03809982111 eV nm² (CODATA 2022).
    const kappa = Math.sqrt((0.09 * 0.28) / 0.03809982111)
    expect(ends.exponent[0]).toBeCloseTo(3 * kappa, 9)
    expect(ends.exponent[4]).toBe(0)
    expect(ends.angle[0]).toBeGreaterThanOrEqual(3 * kappa)
    const thick = { ...system, stack: { ...stack, width: Float64Array.of(400, 1, 1, 1, 1) } }
    expect(layerMatrices(thick, energies, out())).toBeNull()
  })
})

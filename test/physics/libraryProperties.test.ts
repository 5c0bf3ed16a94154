import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { type ElectronStack, type Region, spectrum } from '../../src/index.js'

const region = fc.record({
  potentialEv: fc.double({ min: -0.1, max: 0.5, noNaN: true }),
  massRel: fc.double({ min: 0.03, max: 0.2, noNaN: true }),
  alphaPerEv: fc.double({ min: 0, max: 1, noNaN: true }),
})
const stacks: fc.Arbitrary<ElectronStack> = fc.record({
  kind: fc.constant('electron' as const),
  entry: region.map((lead) => ({ ...lead, potentialEv: 0 })),
  layers: fc.array(
    fc.tuple(region, fc.double({ min: 0.1, max: 6, noNaN: true })).map(([of, widthNm]) => ({ ...of, widthNm })),
    { minLength: 1, maxLength: 7 },
  ),
  exit: region.map((lead) => ({ ...lead, potentialEv: lead.potentialEv / 10 })),
  inPlaneKPerNm: fc.double({ min: 0, max: 0.05, noNaN: true }),
})

/** Above every lead's edge, in-plane motion counted. */
const energies = Float64Array.from({ length: 40 }, (_, i) => 0.11 + 0.013 * i)

function compare(
  a: ElectronStack,
  b: ElectronStack,
  points: Float64Array = energies,
  from: 'entry' | 'exit' = 'entry',
): void {
  const [one, other] = [spectrum(a, energies), spectrum(b, points, { from })]
  // A stack near a sharp line feels the rounding of its inputs by the line's sharpness; 1e-8 leaves that room.
  for (let i = 0; i < energies.length; i++) {
    expect(Math.abs(one.log10T[i] - other.log10T[i])).toBeLessThan(1e-8)
    expect(Math.abs(one.R[i] - other.R[i])).toBeLessThan(1e-8)
  }
}

function check(property: (stack: ElectronStack) => void): void {
  fc.assert(fc.property(stacks, property), { numRuns: 100, seed: 11 })
}

describe('whatever the stack of electrons', () => {
  test('T + R = 1', () => {
    check((stack) => {
      const { T, R, fluxError } = spectrum(stack, energies)
      expect(fluxError).toBeLessThan(1e-12)
      T.forEach((t, i) => void expect(Math.abs(t + R[i] - 1)).toBeLessThanOrEqual(fluxError))
    })
  })

  test('T is the same from both sides', () => {
    check((stack) => compare(stack, stack, energies, 'exit'))
  })

  test('the reversed stack, from its other side, is the same one', () => {
    check((stack) => {
      const reversed = { ...stack, entry: stack.exit as Region, layers: stack.layers.toReversed(), exit: stack.entry }
      compare(stack, reversed, energies, 'exit')
    })
  })

  test('a layer cut in two and a layer of no width change nothing', () => {
    check((stack) => {
      const layers = stack.layers.flatMap((layer) => [
        { ...layer, widthNm: layer.widthNm * 0.3 },
        { potentialEv: 0.2, massRel: 0.1, widthNm: 0 },
        { ...layer, widthNm: layer.widthNm * 0.7 },
      ])
      compare(stack, { ...stack, layers })
    })
  })

  test('all energies moved by the same change nothing', () => {
    const up = <R extends Region>(of: R): R => ({ ...of, potentialEv: of.potentialEv + 1.5 })
    check((stack) => {
      const moved = { ...stack, entry: up(stack.entry), layers: stack.layers.map(up), exit: up(stack.exit as Region) }
      compare(
        stack,
        moved,
        energies.map((energy) => energy + 1.5),
      )
    })
  })

  test('lengths times s, energies over s², in-plane wave number over s and alpha times s² change nothing', () => {
    const s = 1.7
    const scaled = <R extends Region>(of: R): R => ({
      ...of,
      potentialEv: of.potentialEv / (s * s),
      alphaPerEv: (of.alphaPerEv ?? 0) * s * s,
    })
    check((stack) => {
      const wider: ElectronStack = {
        ...stack,
        entry: scaled(stack.entry),
        layers: stack.layers.map((layer) => ({ ...scaled(layer), widthNm: layer.widthNm * s })),
        exit: scaled(stack.exit as Region),
        inPlaneKPerNm: stack.inPlaneKPerNm! / s,
      }
      compare(
        stack,
        wider,
        energies.map((energy) => energy / (s * s)),
      )
    })
  })
})

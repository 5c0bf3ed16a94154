import { describe, expect, it } from 'vitest'
import { electronSystem } from '../../src/model/electronSystem.js'
import { extrema, spectrumInto, type WaveSystem } from '../../src/wave/index.js'
import { seeded } from './seeded.js'

function transmission({ media, stack }: WaveSystem, energies: Float64Array): Float64Array {
  const points = energies.length
  const table = {
    count: media.count,
    points,
    q: new Float64Array(media.count * points),
    mu: new Float64Array(media.count * points),
  }
  media.fill(energies, table)
  const T = new Float64Array(points)
  spectrumInto(table, stack, { T, R: new Float64Array(points) })
  return T
}

function randomSystem(random: () => number): WaveSystem {
  const region = (potentialEv: number) => ({
    ...{ potentialEv, massRel: 0.04 + 0.08 * random(), alphaPerEv: random() < 0.5 ? 0 : 0.9 * random() },
  })
  const barriers = 1 + Math.floor(5 * random())
  const layers = Array.from({ length: 2 * barriers - 1 }, (_, j) =>
    j % 2 === 0
      ? { ...region(0.15 + 0.4 * random()), widthNm: 0.6 + 3 * random() }
      : { ...region(-0.05 + 0.1 * random()), widthNm: 2 + 8 * random() },
  )
  const exit = random() < 0.3 ? region(-0.1 * random()) : region(0.05 * random())
  return electronSystem({ entry: { ...region(0), potentialEv: 0 }, layers, exit })
}

describe('the extrema of T', () => {
  it('are all that a grid of 40 000 energies shows, at its places, for random stacks', () => {
    const random = seeded(5)
    const from = 0.06
    const to = 0.5
    const points = 40_001
    const energies = Float64Array.from({ length: points }, (_, i) => from + ((to - from) * i) / (points - 1))
    const spacing = energies[1] - energies[0]
    let seen = 0
    for (let n = 0; n < 60; n++) {
      const system = randomSystem(random)
      const T = transmission(system, energies)
      const found = extrema(system, [from, to])
      for (let i = 1; i + 1 < points; i++) {
        const [before, after] = [T[i] - T[i - 1], T[i + 1] - T[i]]
        // What rounding shows at the foot of a flat stretch is no turn.
        if (before * after >= 0 || Math.min(Math.abs(before), Math.abs(after)) < 1e-13 * T[i]) continue
        seen++
        const kind = before > 0 ? 'maximum' : 'minimum'
        const near = found.filter((one) => one.kind === kind && Math.abs(one.energyEv - energies[i]) < 1.01 * spacing)
        expect(near, `${kind} near ${energies[i]} eV in stack ${n}`).toHaveLength(1)
        if (kind === 'maximum') expect(near[0].T).toBeGreaterThanOrEqual(T[i] * (1 - 1e-12))
        else expect(near[0].T).toBeLessThanOrEqual(T[i] * (1 + 1e-12))
      }
    }
    expect(seen).toBeGreaterThan(300)
  })

  it('alternate, and are the same over a part of the range', () => {
    const random = seeded(6)
    for (let n = 0; n < 40; n++) {
      const system = randomSystem(random)
      const whole = extrema(system, [0.06, 0.5])
      whole.forEach(({ kind }, i) => void (i > 0 && expect(kind).not.toBe(whole[i - 1].kind)))
      const part = extrema(system, [0.13, 0.41])
      const inside = whole.filter(({ energyEv }) => energyEv > 0.13 && energyEv < 0.41)
      expect(part.map(({ kind }) => kind)).toEqual(inside.map(({ kind }) => kind))
      part.forEach(({ energyEv }, i) => void expect(Math.abs(energyEv - inside[i].energyEv)).toBeLessThan(1e-8))
    }
  })

  it('are none where nothing reflects, and none of their own at an edge where T only rises', () => {
    const lead = { potentialEv: 0, massRel: 0.067 }
    expect(extrema(electronSystem({ entry: lead, layers: [{ ...lead, widthNm: 5 }], exit: lead }), [0, 0.4])).toEqual(
      [],
    )
    const thin = [{ potentialEv: 0.3, massRel: 0.067, widthNm: 1 }]
    expect(extrema(electronSystem({ entry: lead, layers: thin, exit: lead }), [0, 0.4])).toEqual([])
  })
})

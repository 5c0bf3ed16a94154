import { Decimal } from 'decimal.js'
import { describe, expect, it } from 'vitest'
import { atan2, cos, exp, log, log1p, log10, sin, sinCos } from '../../src/wave/index.js'
import { exact, ulps } from './exact.js'
import { seeded } from './seeded.js'

const D = Decimal.clone({ precision: 60 })

function worst(f: (x: number) => number, truth: (x: Decimal) => Decimal, argument: () => number): number {
  let most = 0
  for (let i = 0; i < 400; i++) {
    const x = argument()
    most = Math.max(most, ulps(f(x), truth(exact(x, D)), D))
  }
  return most
}

describe('elementary functions against 50 digits', () => {
  const random = seeded(11)

  it('exp is within 0.8 units in the last place over its whole range', () => {
    expect(
      worst(
        exp,
        (x) => x.exp(),
        () => 1400 * random() - 700,
      ),
    ).toBeLessThan(0.8)
    expect(
      worst(
        exp,
        (x) => x.exp(),
        () => 2 * random() - 1,
      ),
    ).toBeLessThan(0.8)
    expect(
      worst(
        exp,
        (x) => x.exp(),
        () => -708.4 - 36 * random(),
      ),
    ).toBeLessThan(0.8)
  })

  it('log is within 1.1 units, near 1 and from the least to the greatest double', () => {
    expect(
      worst(
        log,
        (x) => x.ln(),
        () => 0.5 + random(),
      ),
    ).toBeLessThan(1.1)
    expect(
      worst(
        log,
        (x) => x.ln(),
        () => 1 + 1e-6 * (random() - 0.5),
      ),
    ).toBeLessThan(1.1)
    expect(
      worst(
        log,
        (x) => x.ln(),
        () => Number(`${1 + random()}e${Math.floor(630 * random()) - 322}`),
      ),
    ).toBeLessThan(1.1)
  })

  it('log10 and log1p are within 2 units', () => {
    expect(
      worst(
        log10,
        (x) => x.log(10),
        () => 0.5 + random(),
      ),
    ).toBeLessThan(2)
    expect(
      worst(
        log10,
        (x) => x.log(10),
        () => Number(`${1 + random()}e${Math.floor(630 * random()) - 322}`),
      ),
    ).toBeLessThan(2)
    expect(
      worst(
        log1p,
        (x) => x.plus(1).ln(),
        () => (random() - 0.5) * Number(`1e${Math.floor(-20 * random())}`),
      ),
    ).toBeLessThan(2)
  })

  it('sine and cosine are within 0.8 units up to 1.6e6, also next to multiples of pi/2', () => {
    const wide = Decimal.clone({ precision: 60 })
    const halfPi = wide.acos(0)
    const near = () =>
      halfPi
        .times(Math.floor(1e6 * random()))
        .times(1 + 1e-9 * (random() - 0.5))
        .toNumber()
    for (const argument of [() => 2 * random() - 1, () => 200 * (random() - 0.5), () => 3e6 * (random() - 0.5), near]) {
      expect(worst(sin, (x) => new wide(x).sin(), argument)).toBeLessThan(0.8)
      expect(worst(cos, (x) => new wide(x).cos(), argument)).toBeLessThan(0.8)
    }
  })

  it('sinCos gives the same pair as sin and cos', () => {
    const out = new Float64Array(2).fill(Number.NaN)
    sinCos(2.5, out)
    expect([...out]).toEqual([sin(2.5), cos(2.5)])
  })

  it('atan2 is within 2 units in every quadrant', () => {
    let most = 0
    const pi = D.acos(-1)
    for (let i = 0; i < 400; i++) {
      const x = (random() - 0.5) * Number(`1e${Math.floor(6 * random()) - 3}`)
      const y = random() - 0.5
      const angle = exact(y, D).div(exact(x, D)).atan()
      const truth = x > 0 ? angle : y > 0 ? angle.plus(pi) : angle.minus(pi)
      most = Math.max(most, ulps(atan2(y, x), truth, D))
    }
    expect(most).toBeLessThan(2)
  })

  it('the ends of the ranges give what the standard library gives', () => {
    for (const x of [0, -0, 710, -746, Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY, Number.NaN]) {
      expect(exp(x)).toBe(Math.exp(x))
    }
    for (const x of [0, 1, -1, Number.POSITIVE_INFINITY, Number.NaN]) {
      expect(log(x)).toBe(Math.log(x))
      expect(log10(x)).toBe(Math.log10(x))
      expect(log1p(x)).toBe(Math.log1p(x))
    }
    for (const y of [0, -0, 1, -1, Number.POSITIVE_INFINITY]) {
      for (const x of [0, -0, 1, -1, Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY]) {
        expect(atan2(y, x)).toBe(Math.atan2(y, x))
      }
    }
  })
})

import { describe, expect, test } from 'vitest'
import { hcEvNm } from '../../src/media/index.js'
import { lightMedia, StackError } from '../../src/model/index.js'
import { atEnergy, tableOf } from './tables.js'

const glass = { index: 1.5 }
const gap = { index: 1 }
const metal = { index: 0.135, extinction: 3.99 }
const cauchy = { index: (nm: number) => 1.45 + 3500 / (nm * nm), extinction: (nm: number) => 2 / nm }
const energy = hcEvNm / 633

describe('lightMedia', () => {
  test('q = k0² (n² - n_from² sin²), mu = 1 for s and n² for p', () => {
    const k0 = (2 * Math.PI) / 633
    for (const polarisation of ['s', 'p'] as const) {
      const { q, mu } = tableOf(lightMedia([glass, gap], { medium: 0, angleDeg: 60, polarisation }), [energy])
      expect(q[0] / (k0 * k0)).toBeCloseTo(2.25 * 0.25, 13)
      expect(q[1] / (k0 * k0)).toBeCloseTo(1 - 2.25 * 0.75, 13)
      expect([...mu]).toEqual(polarisation === 's' ? [1, 1] : [2.25, 1])
    }
  })

  test('at normal incidence q does not know where the light comes from', () => {
    const both = [0, 1].map(
      (medium) => tableOf(lightMedia([glass, gap], { medium, angleDeg: 0, polarisation: 's' }), [energy]).q,
    )
    expect(both[0]).toEqual(both[1])
  })

  test('a grazing wave keeps its digits in its own medium', () => {
    const { q } = tableOf(lightMedia([glass], { medium: 0, angleDeg: 89.999, polarisation: 's' }), [energy])
    const cos = Math.sin((0.001 * Math.PI) / 180)
    expect((q[0] * 633 * 633) / (4 * Math.PI * Math.PI * 2.25) / (cos * cos)).toBeCloseTo(1, 10)
  })

  test('absorption gives (n + i kappa)², whose square root decays forward', () => {
    const media = lightMedia([gap, metal], { medium: 0, angleDeg: 0, polarisation: 'p' })
    expect(media.lossless).toBe(false)
    const { q, qIm, mu, muIm } = tableOf(media, [energy])
    const k2 = ((2 * Math.PI) / 633) * ((2 * Math.PI) / 633)
    expect(q[1] / k2).toBeCloseTo(0.135 * 0.135 - 3.99 * 3.99, 12)
    expect(qIm[1] / k2).toBeCloseTo(2 * 0.135 * 3.99, 12)
    expect(mu[1]).toBeCloseTo(0.135 * 0.135 - 3.99 * 3.99, 12)
    expect(muIm[1]).toBeCloseTo(2 * 0.135 * 3.99, 12)
    expect([qIm[0], muIm[0]]).toEqual([0, 0])
  })

  test.each([
    ['s', 10],
    ['p', 10],
    ['s', 70],
    ['p', 70],
  ] as const)(
    'the continuation and the slopes of %s light at %d degrees agree with differences of the table',
    (polarisation, angleDeg) => {
      const media = lightMedia([cauchy, glass, metal, gap], { medium: 1, angleDeg, polarisation })
      const here = tableOf(media, [energy])
      const at = atEnergy(media, energy, 0)
      const slope = tableOf(media, [energy], 'slope')
      const h = 1e-5
      const [up, down] = [tableOf(media, [energy + h]), tableOf(media, [energy - h])]
      for (let m = 0; m < 4; m++) {
        expect(at.qRe[m]).toBeCloseTo(here.q[m], 15)
        expect(at.qIm[m]).toBeCloseTo(here.qIm[m], 15)
        expect(at.muRe[m]).toBeCloseTo(here.mu[m], 15)
        expect(slope.q[m]).toBeCloseTo((up.q[m] - down.q[m]) / (2 * h), 9)
        expect(slope.qIm[m]).toBeCloseTo((up.qIm[m] - down.qIm[m]) / (2 * h), 9)
        expect(slope.mu[m]).toBeCloseTo((up.mu[m] - down.mu[m]) / (2 * h), 9)
        expect(slope.muIm[m]).toBeCloseTo((up.muIm[m] - down.muIm[m]) / (2 * h), 9)
        expect(at.dqRe[m]).toBeCloseTo(slope.q[m], 15)
        expect(at.dmuIm[m]).toBeCloseTo(slope.muIm[m], 15)
      }
    },
  )

  test('off the axis a function continues as n(E0) + (E - E0) dn/dE', () => {
    const im = -1e-3
    const media = lightMedia([cauchy, gap], { medium: 1, angleDeg: 30, polarisation: 'p' })
    const h = 1e-6
    const [up, down] = [cauchy.index(hcEvNm / (energy + h)), cauchy.index(hcEvNm / (energy - h))]
    const [lossUp, lossDown] = [cauchy.extinction(hcEvNm / (energy + h)), cauchy.extinction(hcEvNm / (energy - h))]
    const nRe = cauchy.index(633) - (im * (lossUp - lossDown)) / (2 * h)
    const nIm = cauchy.extinction(633) + (im * (up - down)) / (2 * h)
    const at = atEnergy(media, energy, im)
    expect(at.muRe[0]).toBeCloseTo(nRe * nRe - nIm * nIm, 9)
    expect(at.muIm[0]).toBeCloseTo(2 * nRe * nIm, 9)
  })

  test('constant media are analytic: the slope is that of any direction', () => {
    const media = lightMedia([glass, gap, metal], { medium: 0, angleDeg: 50, polarisation: 'p' })
    const [im, h] = [-0.02, 1e-5]
    const at = atEnergy(media, energy, im)
    const [above, below] = [atEnergy(media, energy, im + h), atEnergy(media, energy, im - h)]
    for (let m = 0; m < 3; m++) {
      expect((above.qRe[m] - below.qRe[m]) / (2 * h)).toBeCloseTo(-at.dqIm[m], 9)
      expect((above.qIm[m] - below.qIm[m]) / (2 * h)).toBeCloseTo(at.dqRe[m], 9)
    }
  })

  test('the partial in the index is the derivative of a layer beside the medium the light comes from', () => {
    const out = new Float64Array(2).fill(Number.NaN)
    const h = 1e-5
    for (const polarisation of ['s', 'p'] as const) {
      const of = (index: number) => lightMedia([glass, { index }], { medium: 0, angleDeg: 50, polarisation })
      of(2.1).partials(energy, 1, out)
      const [up, down] = [tableOf(of(2.1 + h), [energy]), tableOf(of(2.1 - h), [energy])]
      expect(out[0]).toBeCloseTo((up.q[1] - down.q[1]) / (2 * h), 9)
      expect(out[1]).toBeCloseTo((up.mu[1] - down.mu[1]) / (2 * h), 8)
    }
  })

  test('an index that is no number names the wavelength', () => {
    const media = lightMedia([{ index: () => Number.NaN }], { medium: 0, angleDeg: 0, polarisation: 's' })
    expect(() => tableOf(media, [hcEvNm / 500])).toThrow(StackError)
    expect(() => tableOf(media, [hcEvNm / 500])).toThrow('NaN at 500 nm')
  })
})

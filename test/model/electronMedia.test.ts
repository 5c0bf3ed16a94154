import { describe, expect, test } from 'vitest'
import { hbar2Over2m0 } from '../../src/media/index.js'
import { electronMedia, StackError } from '../../src/model/index.js'
import { atEnergy, tableOf } from './tables.js'

const regions = [
  { potentialEv: 0, massRel: 0.067, alphaPerEv: 0.66 },
  { potentialEv: 0.3, massRel: 0.092 },
]
const media = electronMedia(regions, 0.15)

describe('electronMedia', () => {
  test('q = m(E)(E - V)/C - k_par² and mu = m(E), a medium a row', () => {
    const { q, mu } = tableOf(media, [0.1, 0.25])
    const m = 0.067 * (1 + 0.66 * 0.25)
    expect(mu[1]).toBeCloseTo(m, 16)
    expect(q[1]).toBeCloseTo((m * 0.25) / hbar2Over2m0 - 0.0225, 14)
    expect(q[3]).toBeCloseTo((0.092 * -0.05) / hbar2Over2m0 - 0.0225, 14)
    expect(mu[3]).toBe(0.092)
  })

  test('on a band edge without in-plane motion q is exactly 0, one place above it is not', () => {
    const { q } = tableOf(electronMedia(regions), [0.3, 0.30000000000000004])
    expect(q[2]).toBe(0)
    expect(q[3]).toBeGreaterThan(0)
  })

  // Kane's dispersion, closed form: E (1 + E/Eg) = hbar² k²/2m with k = pi/6.4 nm, m = 0.026, Eg = 0.417 eV (InAs).
  test('the ground state of an infinite 6.4 nm InAs well: 0.353093226 eV parabolic, 0.228205994 eV two-band', () => {
    const k = Math.PI / 6.4
    const inAs = { potentialEv: 0, massRel: 0.026 }
    const parabolic = tableOf(electronMedia([inAs]), [0.353093226]).q[0]
    const twoBand = tableOf(electronMedia([{ ...inAs, alphaPerEv: 1 / 0.417 }]), [0.228205994]).q[0]
    expect(Math.abs(parabolic / (k * k) - 1)).toBeLessThan(5e-9)
    expect(Math.abs(twoBand / (k * k) - 1)).toBeLessThan(5e-9)
  })

  test('the complex continuation agrees with the real table on the real axis', () => {
    const { q, mu } = tableOf(media, [0.21])
    const at = atEnergy(media, 0.21, 0)
    for (const m of [0, 1]) {
      expect(at.qRe[m]).toBe(q[m])
      expect(at.muRe[m]).toBe(mu[m])
      expect(at.qIm[m]).toBe(0)
    }
  })

  test('slopes are the imaginary parts of a complex step', () => {
    const step = 1e-30
    const slope = tableOf(media, [0.21], 'slope')
    const at = atEnergy(media, 0.21, step)
    for (const m of [0, 1]) {
      expect(at.qIm[m] / step).toBeCloseTo(slope.q[m], 12)
      expect(at.muIm[m] / step).toBeCloseTo(slope.mu[m], 14)
      expect(at.dqRe[m]).toBeCloseTo(slope.q[m], 12)
      expect(at.dmuRe[m]).toBeCloseTo(slope.mu[m], 14)
    }
  })

  test('q and its slope satisfy the Cauchy-Riemann equations off the axis', () => {
    const [re, im, h] = [0.11, -0.04, 1e-5]
    const at = atEnergy(media, re, im)
    const [left, right] = [atEnergy(media, re - h, im), atEnergy(media, re + h, im)]
    const [below, above] = [atEnergy(media, re, im - h), atEnergy(media, re, im + h)]
    expect((right.qRe[0] - left.qRe[0]) / (2 * h)).toBeCloseTo(at.dqRe[0], 8)
    expect((right.qIm[0] - left.qIm[0]) / (2 * h)).toBeCloseTo(at.dqIm[0], 8)
    expect((above.qRe[0] - below.qRe[0]) / (2 * h)).toBeCloseTo(-at.dqIm[0], 8)
    expect((above.qIm[0] - below.qIm[0]) / (2 * h)).toBeCloseTo(at.dqRe[0], 8)
  })

  test('partials are the derivatives in potential, mass and alpha', () => {
    const base = { potentialEv: 0.3, massRel: 0.092, alphaPerEv: 0.55 }
    const out = new Float64Array(6).fill(Number.NaN)
    electronMedia([base], 0.15).partials(0.21, 0, out)
    ;(['potentialEv', 'massRel', 'alphaPerEv'] as const).forEach((key, p) => {
      const h = 1e-5
      const [up, down] = [h, -h].map((d) => tableOf(electronMedia([{ ...base, [key]: base[key] + d }], 0.15), [0.21]))
      expect(out[2 * p]).toBeCloseTo((up.q[0] - down.q[0]) / (2 * h), 8)
      expect(out[2 * p + 1]).toBeCloseTo((up.mu[0] - down.mu[0]) / (2 * h), 8)
    })
  })

  test('at the valence edge and below it the gap is broken, above it is not', () => {
    const inAs = electronMedia([{ potentialEv: 0.5, massRel: 0.026, alphaPerEv: 2 }])
    expect(() => tableOf(inAs, [0.01])).not.toThrow()
    expect(() => tableOf(inAs, [0.2, 0])).toThrow(StackError)
    expect(() => tableOf(inAs, [0])).toThrow(
      'Broken gap: at 0 eV the mass m(E) of a region with its edge at 0.5 eV is 0',
    )
    expect(() => tableOf(inAs, [-0.1], 'slope')).toThrow('Broken gap')
  })
})

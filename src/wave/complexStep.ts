import { Complex } from 'complex.js'
import { layerTrig } from './complexSweep.js'
import { hardWall, type MediaAtEnergy, type WaveSystem } from './types.js'

/** d ln T by the energy (1/eV) and by each layer's width (1/nm), q (nm²) and mu. */
export interface LogSlopes {
  readonly energy: number
  readonly width: Float64Array
  readonly q: Float64Array
  readonly mu: Float64Array
}

/** So small that its square is nothing beside 1; it costs no digits, for nothing is subtracted. */
const step = 1e-20

/**
 * Derivatives of ln T of a lossless stack by complex steps: the imaginary part of ln T at p + i h, over h (Squire and
 * Trapp, SIAM Rev. 40, 110, 1998, from memory). A check of `slopeInto` and `gradientInto` that shares no derivative with
 * them and costs a sweep for each number. Null where no wave leaves.
 *
 * T = 4 Y Y'/((Y u1 + v2)² + (Y u2 - v1)²) of the two real solutions (u, v) that leave the exit as (1, 0) and (0, Y'):
 * real for real parameters, and analytic in every one of them.
 */
export function complexStepSlopes(system: WaveSystem, energy: number): LogSlopes | null {
  const { media, stack } = system
  const layers = stack.medium.length
  const here = mediaAt(media, energy, 0)
  if (stack.exit === hardWall || !(here.qRe[stack.entry] > 0 && here.qRe[stack.exit] > 0)) return null
  const row = (which: 'q' | 'mu' | 'width') =>
    Float64Array.from({ length: layers }, (_, layer) => logSlope(system, here, layer, which))
  return {
    energy: logSlope(system, mediaAt(media, energy, step), -1, 'q'),
    width: row('width'),
    q: row('q'),
    mu: row('mu'),
  }
}

function mediaAt(media: WaveSystem['media'], re: number, im: number): MediaAtEnergy {
  const row = () => new Float64Array(media.count)
  const at = {
    ...{ qRe: row(), qIm: row(), muRe: row(), muIm: row() },
    ...{ dqRe: row(), dqIm: row(), dmuRe: row(), dmuIm: row() },
  }
  media.at(re, im, at)
  return at
}

function logSlope({ stack }: WaveSystem, at: MediaAtEnergy, layer: number, which: 'q' | 'mu' | 'width'): number {
  const { medium, width, entry, exit } = stack
  const Y = admittance(at, entry)
  const Yexit = admittance(at, exit)
  let u1 = new Complex(1, 0)
  let v1 = new Complex(0, 0)
  let u2 = new Complex(0, 0)
  let v2 = Yexit
  for (let j = medium.length - 1; j >= 0; j--) {
    const m = medium[j]
    const by = (what: string) => (j === layer && what === which ? step : 0)
    const q = new Complex(at.qRe[m], at.qIm[m] + by('q'))
    const mu = new Complex(at.muRe[m], at.muIm[m] + by('mu'))
    const { c, S } = layerFunctions(q, new Complex(width[j], by('width')))
    const across = mu.mul(S)
    const back = q.div(mu).mul(S)
    const next1 = c.mul(u1).sub(across.mul(v1))
    v1 = back.mul(u1).add(c.mul(v1))
    u1 = next1
    const next2 = c.mul(u2).sub(across.mul(v2))
    v2 = back.mul(u2).add(c.mul(v2))
    u2 = next2
    const size = Math.max(Math.abs(u1.re), Math.abs(v1.re), Math.abs(u2.re), Math.abs(v2.re))
    if (size > 1e100) [u1, v1, u2, v2] = [u1, v1, u2, v2].map((part) => part.mul(1 / size))
  }
  const x = Y.mul(u1).add(v2)
  const y = Y.mul(u2).sub(v1)
  const D = x.mul(x).add(y.mul(y))
  const lead = Y.im / Y.re + Yexit.im / Yexit.re
  return (lead - D.im / D.re) / step
}

const trig = new Float64Array(4)

/** cos(k w) and sin(k w)/k, both without a factor exp(Im k w) where that is large: a constant, which ln T's slope does not see. */
function layerFunctions(q: Complex, w: Complex): { c: Complex; S: Complex } {
  const size = Math.sqrt(q.re * q.re + q.im * q.im)
  const big = Math.sqrt(0.5 * (size + Math.abs(q.re)))
  const small = big > 0 ? (0.5 * q.im) / big : 0
  const k = q.re >= 0 ? new Complex(big, small) : new Complex(small, big)
  const angle = k.mul(w)
  const inverse = new Complex(1, 0).div(k)
  layerTrig(angle.re, angle.im, inverse.re, inverse.im, trig)
  return { c: new Complex(trig[0], trig[1]), S: new Complex(trig[2], trig[3]) }
}

function admittance(at: MediaAtEnergy, m: number): Complex {
  const k = Math.sqrt(at.qRe[m])
  return new Complex(k, (0.5 * at.qIm[m]) / k).div(new Complex(at.muRe[m], at.muIm[m]))
}

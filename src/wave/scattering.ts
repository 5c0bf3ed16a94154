import { Complex } from 'complex.js'
import { complexRoot, root } from './complexLayer.js'
import { exp, sinCos } from './elementary.js'
import { hardWall, type MediaTable, type WaveSystem } from './types.js'

/**
 * T at one energy (eV) by another path than the spectrum's, for the audit: each layer is turned into the amplitudes
 * that it reflects and lets through between gaps of no width with the entry's admittance, and these are joined from the
 * exit to the entry. Only waves that fall enter, so it is stable however opaque the stack. 0 where nothing leaves.
 * Throws RangeError where the entry is closed.
 */
export function scatteringT(system: WaveSystem, energy: number): number {
  const { stack, media } = system
  const table = singlePoint(system, energy)
  if (!(table.q[stack.entry] > 0)) {
    throw new RangeError(
      `q is ${table.q[stack.entry]} /nm² in the entry at ${energy} eV: take an energy above its edge.`,
    )
  }
  if (stack.exit === hardWall || !(table.q[stack.exit] > 0 || !media.lossless)) return 0
  const Y = Math.sqrt(table.q[stack.entry]) / table.mu[stack.entry]
  const exitMu = mu(table, stack.exit)
  const exitY = waveNumber(table, stack.exit).div(exitMu)
  const sum = exitY.add(Y)
  let reflected = new Complex(Y, 0).sub(exitY).div(sum)
  let passed = new Complex(2 * Y, 0).div(sum)
  for (let j = stack.medium.length - 1; j >= 0; j--) {
    const m = stack.medium[j]
    const layer = layerAmplitudes(table, m, stack.width[j], Y)
    const loop = new Complex(1, 0).sub(layer.r.mul(reflected))
    passed = layer.t.mul(passed).div(loop)
    reflected = layer.r.add(layer.t.mul(layer.t).mul(reflected).div(loop))
  }
  return (exitY.re / Y) * (passed.re * passed.re + passed.im * passed.im)
}

function singlePoint({ media }: WaveSystem, energy: number): MediaTable {
  const row = () => new Float64Array(media.count)
  const table = media.lossless
    ? { count: media.count, points: 1, q: row(), mu: row() }
    : { count: media.count, points: 1, q: row(), mu: row(), qIm: row(), muIm: row() }
  media.fill(Float64Array.of(energy), table)
  return table
}

function mu(table: MediaTable, m: number): Complex {
  return new Complex(table.mu[m], table.muIm ? table.muIm[m] : 0)
}

function waveNumber(table: MediaTable, m: number): Complex {
  complexRoot(table.q[m], table.qIm ? table.qIm[m] : 0)
  return new Complex(root.re, root.im)
}

const pair = new Float64Array(2)

// With e = e^(ikw), S = sin(kw)/k: t = 2/(2 cos kw - i(Y mu + q/(mu Y)) S), r = i t (q/(mu Y) - Y mu) S/2; above and below
// are multiplied by e, which leaves e² = e^(2ikw) as the only exponential, at most 1.
function layerAmplitudes(table: MediaTable, m: number, w: number, Y: number): { t: Complex; r: Complex } {
  const q = new Complex(table.q[m], table.qIm ? table.qIm[m] : 0)
  const k = waveNumber(table, m)
  const mass = mu(table, m)
  sinCos(k.re * w, pair)
  const fall = exp(-k.im * w)
  const e = new Complex(fall * pair[1], fall * pair[0])
  const square = e.mul(e)
  const z = q.mul(w * w)
  const small = z.re * z.re + z.im * z.im < 1e-4
  const cosine = square.add(1).mul(0.5)
  const sine = small ? series(z).mul(w).mul(e) : new Complex(1, 0).sub(square).mul(new Complex(0, 0.5)).div(k)
  const own = mass.mul(Y)
  const other = q.div(own)
  const below = cosine.mul(2).sub(own.add(other).mul(sine).mul(new Complex(0, 1)))
  const t = e.mul(2).div(below)
  const r = other.sub(own).mul(sine).mul(new Complex(0, 1)).div(below)
  return { t, r }
}

// sin(kw)/(kw) in powers of z = q w², |z| < 0.01.
function series(z: Complex): Complex {
  let sum = new Complex(1, 0)
  for (const d of [72, 42, 20, 6]) sum = new Complex(1, 0).sub(sum.mul(z).mul(1 / d))
  return sum
}

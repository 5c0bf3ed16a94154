import { powerOfTwo } from './bits.js'
import { complexLayer, layer } from './complexLayer.js'
import { exp } from './elementary.js'
import { integral, layerIntegrals } from './layerIntegrals.js'
import { admittance, Faces, lead, sweepPoint } from './pointSweep.js'
import { checkStack, refuseClosed } from './stackChecks.js'
import { hardWall, type MediaTable, type WaveSystem } from './types.js'

/** Where the wave is, and how long. */
export interface LayerShares {
  /** Integral of |u|² over each layer over the sum of all: adds up to 1. */
  readonly probability: Float64Array
  /** The dwell time in each layer over hbar, 1/eV: times hbar (0.6582 eV fs) a time. */
  readonly dwell: Float64Array
}

/**
 * |u|² at the places zNm (nm from the entry's face; below 0 in the entry, beyond the last face in the exit) for a wave
 * from the entry at one energy (eV), divided by its integral over all layers: 1/nm, unit integral over the layers. For
 * electrons the probability density, for s light that of the electric field, for p light of the magnetic one. Behind a
 * hard wall 0. Throws RangeError for a closed entry and for a stack without any width, which has no such integral.
 */
export function waveShape(system: WaveSystem, energy: number, zNm: Float64Array): Float64Array {
  const { stack } = system
  const { table, faces } = solve(system, energy)
  const layers = stack.medium.length
  const inverse = 1 / total(integrals(table, system, faces))
  const starts = new Float64Array(layers + 1)
  for (let j = 0; j < layers; j++) starts[j + 1] = starts[j] + stack.width[j]
  const density = new Float64Array(zNm.length)
  for (let i = 0; i < zNm.length; i++) {
    const z = zNm[i]
    let value = 0
    if (z < 0) value = densityBefore(table, stack.entry, 0, -z, faces)
    else if (z > starts[layers])
      value = stack.exit === hardWall ? 0 : densityBehind(table, stack.exit, z - starts[layers], faces, layers)
    else {
      let j = 0
      while (j < layers - 1 && z > starts[j + 1]) j++
      value = densityWithin(table, stack.medium[j], j, z - starts[j], starts[j + 1] - z, faces)
    }
    density[i] = value * inverse
  }
  return density
}

/**
 * Probability and dwell time in each layer for a wave from the entry at one energy (eV). The dwell time is what is
 * stored over the incident flux, hbar integral (d(q/mu)/dE |u|² + dmu/dE |v|²) dz/(2 Y |A|²): for a parabolic electron
 * the integral of |u|² over that of the incident wave times its velocity. Throws as `waveShape`.
 */
export function layerShares(system: WaveSystem, energy: number): LayerShares {
  const { media, stack } = system
  const { table, faces } = solve(system, energy)
  const found = integrals(table, system, faces)
  const sum = total(found)
  admittance(table, null, stack.entry)
  const Y = lead.re
  const aRe = 0.5 * (faces.vectors[0] + faces.vectors[3] / Y)
  const aIm = 0.5 * (faces.vectors[1] - faces.vectors[2] / Y)
  const flux = 2 * Y * (aRe * aRe + aIm * aIm)
  const slope = emptyTable(media.count, media.lossless)
  media.fillSlope(Float64Array.of(energy), slope)
  const layers = stack.medium.length
  const probability = new Float64Array(layers)
  const dwell = new Float64Array(layers)
  for (let j = 0; j < layers; j++) {
    const m = stack.medium[j]
    probability[j] = found.u[j] / sum
    dwell[j] = (slopeOfRatio(table, slope, m) * found.u[j] + slope.mu[m] * found.v[j]) / flux
  }
  return { probability, dwell }
}

function solve(system: WaveSystem, energy: number): { table: MediaTable; faces: Faces } {
  const { media, stack } = system
  checkStack(stack)
  const table = emptyTable(media.count, media.lossless)
  media.fill(Float64Array.of(energy), table)
  if (!(table.q[stack.entry] > 0) || (table.qIm && table.qIm[stack.entry] !== 0)) refuseClosed(table, 0, stack.entry)
  const faces = new Faces()
  faces.grow(stack.medium.length)
  sweepPoint(table, null, stack, 'entry', stack.exit, 0, faces)
  return { table, faces }
}

function emptyTable(count: number, lossless: boolean): MediaTable {
  const row = () => new Float64Array(count)
  const table = { count, points: 1, q: row(), mu: row() }
  return lossless ? table : { ...table, qIm: row(), muIm: row() }
}

// Both integrals of every layer, in units of 4^(exponent at the entry's face).
function integrals(table: MediaTable, { stack }: WaveSystem, faces: Faces): { u: Float64Array; v: Float64Array } {
  const layers = stack.medium.length
  const u = new Float64Array(layers)
  const v = new Float64Array(layers)
  for (let j = 0; j < layers; j++) {
    layerIntegrals(table, stack.medium[j], stack.width[j], faces, j, j + 1)
    const scale = relative(faces, j)
    u[j] = integral.u * scale * scale
    v[j] = integral.v * scale * scale
  }
  return { u, v }
}

function total({ u }: { u: Float64Array }): number {
  let sum = 0
  for (const part of u) sum += part
  if (!(sum > 0)) throw new RangeError(`The layers hold ${sum} of the wave: a stack without any width has no shape.`)
  return sum
}

// 2^(exponent of a face), relative to the entry's face.
function relative(faces: Faces, face: number): number {
  return powerOfTwo(Math.max(-1022, Math.min(1023, faces.exponents[face] - faces.exponents[0])))
}

// Re d(q/mu)/dE.
function slopeOfRatio(table: MediaTable, slope: MediaTable, m: number): number {
  const muRe = table.mu[m]
  const muIm = table.muIm ? table.muIm[m] : 0
  const size = muRe * muRe + muIm * muIm
  const qIm = table.qIm ? table.qIm[m] : 0
  const fRe = (table.q[m] * muRe + qIm * muIm) / size
  const fIm = (qIm * muRe - table.q[m] * muIm) / size
  const dmuIm = slope.muIm ? slope.muIm[m] : 0
  const dqIm = slope.qIm ? slope.qIm[m] : 0
  const re = slope.q[m] - (fRe * slope.mu[m] - fIm * dmuIm)
  const im = dqIm - (fRe * dmuIm + fIm * slope.mu[m])
  return (re * muRe + im * muIm) / size
}

// |u|² at `x` to the left of a face, from the vector there.
function densityBefore(table: MediaTable, m: number, face: number, x: number, faces: Faces): number {
  complexLayer(table.q[m], table.qIm ? table.qIm[m] : 0, x)
  const o = 4 * face
  const { vectors } = faces
  const muIm = table.muIm ? table.muIm[m] : 0
  const gRe = table.mu[m] * layer.aRe - muIm * layer.aIm
  const gIm = table.mu[m] * layer.aIm + muIm * layer.aRe
  const re = layer.cRe * vectors[o] - layer.cIm * vectors[o + 1] - (gRe * vectors[o + 2] - gIm * vectors[o + 3])
  const im = layer.cRe * vectors[o + 1] + layer.cIm * vectors[o] - (gRe * vectors[o + 3] + gIm * vectors[o + 2])
  const scale = relative(faces, face) * powerOfTwo(layer.n)
  return (re * re + im * im) * scale * scale
}

// The outgoing or decaying wave behind the last face.
function densityBehind(table: MediaTable, m: number, x: number, faces: Faces, layers: number): number {
  complexLayer(table.q[m], table.qIm ? table.qIm[m] : 0, x)
  const fall = exp(-layer.kIm * x)
  const u = faces.vectors[4 * layers] * fall
  const v = faces.vectors[4 * layers + 1] * fall
  const scale = relative(faces, layers)
  return (u * u + v * v) * scale * scale
}

// Within a layer `left` from its near face and `right` from its far one: from both faces where the wave can decay.
function densityWithin(table: MediaTable, m: number, j: number, left: number, right: number, faces: Faces): number {
  const qIm = table.qIm ? table.qIm[m] : 0
  complexLayer(table.q[m], qIm, left + right)
  if (!(layer.kIm * (left + right) > 1)) return densityBefore(table, m, j + 1, right, faces)
  const { vectors } = faces
  const whole = { re: layer.aRe, im: layer.aIm, n: layer.n }
  let re = 0
  let im = 0
  for (const [face, x] of [
    [j, right],
    [j + 1, left],
  ]) {
    complexLayer(table.q[m], qIm, x)
    const size = whole.re * whole.re + whole.im * whole.im
    const share = powerOfTwo(Math.max(-1022, layer.n - whole.n)) * relative(faces, face)
    const wRe = ((layer.aRe * whole.re + layer.aIm * whole.im) / size) * share
    const wIm = ((layer.aIm * whole.re - layer.aRe * whole.im) / size) * share
    re += wRe * vectors[4 * face] - wIm * vectors[4 * face + 1]
    im += wRe * vectors[4 * face + 1] + wIm * vectors[4 * face]
  }
  return re * re + im * im
}

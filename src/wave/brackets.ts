import { exp, sinCos } from './elementary.js'
import { hardWall, type MediaTable, type WaveSystem } from './types.js'

/**
 * States of the closed structure by Sturm's oscillation theorem: the real solution that starts at the exit as a closed
 * exit would have it (u = 0 at an open exit or a hard wall, decaying into a closed one) has as many nodes inside as
 * there are states below E of the same structure with u = 0 at the entry's face. In a layer with q > 0 the wave turns by
 * k w, floor(k w/pi) half turns and at most one node more; with q < 0 it has at most one node. So the count is exact at
 * any energy, however narrow the states are.
 */
export class NodeCount {
  private readonly energies = new Float64Array(1)
  private readonly table: MediaTable
  private readonly trig = new Float64Array(2)

  constructor(private readonly system: WaveSystem) {
    const n = system.media.count
    const q = new Float64Array(n)
    const mu = new Float64Array(n)
    this.table = system.media.lossless
      ? { count: n, points: 1, q, mu }
      : { count: n, points: 1, q, mu, qIm: new Float64Array(n), muIm: new Float64Array(n) }
  }

  at(energy: number): number {
    const { system, energies, table, trig } = this
    const { q, mu } = table
    const { medium, width, exit } = system.stack
    energies[0] = energy
    system.media.fill(energies, table)
    let u = 0
    let v = 1
    if (exit !== hardWall && q[exit] < 0) {
      u = 1
      v = -Math.sqrt(-q[exit]) / mu[exit]
    }
    // Sign of u just left of the face: where u = 0 it is that of -mu v.
    let positive = u > 0
    let nodes = 0
    for (let n = medium.length - 1; n >= 0; n--) {
      const m = medium[n]
      const w = width[n]
      const qm = q[m]
      const mm = mu[m]
      let c = 1
      let s = w
      let half = 0
      if (qm > 0) {
        const k = Math.sqrt(qm)
        const angle = k * w
        sinCos(angle, trig)
        c = trig[1]
        s = trig[0] / k
        half = Math.floor(angle * (1 / Math.PI))
      } else if (qm < 0) {
        const kappa = Math.sqrt(-qm)
        const y = kappa * w
        // without the factor exp(y)/2
        const e = exp(-2 * y)
        c = 1 + e
        s = y < 1e-5 ? 2 * w : (1 - e) / kappa
      }
      const next = c * u - mm * s * v
      v = (qm / mm) * s * u + c * v
      u = next
      nodes += half
      const flipped = half % 2 === 1 ? !positive : positive
      const sign = u > 0
      if (sign !== flipped) nodes++
      positive = sign
      const size = Math.abs(u) + Math.abs(v)
      if (size > 1e100 || size < 1e-100) {
        u /= size
        v /= size
      }
    }
    return nodes
  }
}

/**
 * Appends to `starts` an energy for each state that the count sees between a and b: the middles of brackets that hold
 * one state each and are at most `widest` wide. States closer than the spacing of doubles share a bracket.
 */
export function bracketStates(nodes: NodeCount, a: number, b: number, widest: number, starts: number[]): void {
  split(nodes, a, nodes.at(a), b, nodes.at(b), widest, starts)
}

function split(n: NodeCount, a: number, na: number, b: number, nb: number, widest: number, starts: number[]): void {
  if (nb <= na) return
  const middle = 0.5 * (a + b)
  if ((nb - na === 1 && b - a <= widest) || b - a < 1e-13 * b) {
    for (let i = na; i < nb; i++) starts.push(middle)
    return
  }
  const nm = n.at(middle)
  split(n, a, na, middle, nm, widest, starts)
  split(n, middle, nm, b, nb, widest, starts)
}

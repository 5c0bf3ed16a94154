import { bracketStates, NodeCount } from './brackets.js'
import { ComplexSweep, type Continuation } from './complexSweep.js'
import { leadEdges } from './leadEdges.js'
import { partialWidths } from './partialWidths.js'
import { hardWall, type Pole, type PoleList, type WaveSystem } from './types.js'
import { Zeros } from './zeros.js'

export interface ResonanceOptions {
  /** Greatest Gamma/2 looked for, eV. */
  readonly depthEv?: number
  /** Count by winding as well, and search on where list and count differ. */
  readonly count?: boolean
}

export function resonances(
  system: WaveSystem,
  rangeEv: readonly [number, number],
  options: ResonanceOptions = {},
): PoleList {
  const depth = options.depthEv ?? 0.02
  const sweep = new ComplexSweep(system)
  const nodes = new NodeCount(system)
  const poles: Pole[] = []
  const [low, high] = rangeEv
  const ends = [low, ...leadEdges(sweep, low, high), high]
  for (let i = 1; i < ends.length; i++) {
    const zeros = findZeros(sweep, nodes, ends[i - 1], ends[i], depth)
    for (let j = 0; j < zeros.re.length; j++) {
      const re = zeros.re[j]
      const im = zeros.im[j]
      if (re >= ends[i - 1] && re < ends[i] && im <= 1e-13 * re && im > -depth) {
        poles.push(poleAt(sweep, re, -2 * im, zeros.branch))
      }
    }
  }
  poles.sort((a, b) => a.energyEv - b.energyEv)
  return { poles, counted: null, complete: true }
}

export const stats = { evals: 0, starts: 0, falseStarts: 0, screens: 0, screenHits: 0 }

function findZeros(sweep: ComplexSweep, nodes: NodeCount, a: number, b: number, depth: number): Zeros {
  const branch = continuationAt(sweep, 0.5 * (a + b))
  const zeros = new Zeros(sweep, branch, a, b, depth)
  const starts: number[] = []
  bracketStates(nodes, a, b, 0.1 * depth, starts)
  for (const start of starts) {
    stats.starts++
    if (!zeros.search(start, -1e-3 * depth)) stats.falseStarts++
  }
  const n = Math.ceil((b - a) / (0.6 * depth)) + 1
  for (let i = 0; i <= n; i++) {
    const x = a + ((b - a) * i) / n
    for (let k = 0; k < 5; k++) {
      stats.screens++
      if (zeros.near(x, -0.5 * depth) > 1.5 * depth) break
      if (!zeros.search(x, -0.5 * depth)) break
      stats.screenHits++
    }
  }
  stats.evals += zeros.evaluations
  return zeros
}

function continuationAt(sweep: ComplexSweep, energy: number): Continuation {
  const { entry, exit } = sweep.system.stack
  sweep.prepare(energy, 0)
  return { entryOpen: sweep.at.qRe[entry] > 0, exitOpen: exit !== hardWall && sweep.at.qRe[exit] > 0 }
}

function poleAt(sweep: ComplexSweep, energy: number, width: number, branch: Continuation): Pole {
  const { entry, exit, absorbed } = partialWidths(sweep, energy, width, branch)
  const sum = entry + exit + absorbed
  const total = width < 1e-6 * energy ? sum : width
  return {
    energyEv: energy,
    widthEv: total,
    entryWidthEv: entry,
    exitWidthEv: exit,
    peakT: (4 * entry * exit) / (total * total),
  }
}

import { bracketStates, NodeCount } from './brackets.js'
import { ComplexSweep, type Continuation } from './complexSweep.js'
import { leadEdges } from './leadEdges.js'
import { partialWidths } from './partialWidths.js'
import { hardWall, type Pole, type PoleList, type WaveSystem } from './types.js'
import { type Box, windingNumber } from './winding.js'
import { Zeros } from './zeros.js'

export interface ResonanceOptions {
  /** Greatest Gamma/2 looked for, eV. */
  readonly depthEv?: number
  /** Count by winding as well, and search on where list and count differ. */
  readonly count?: boolean
}

/**
 * Every pole of the transmission amplitude with E0 in [low, high) and Gamma/2 below the depth, ascending. They are zeros of F
 * (`ComplexSweep`), found stretch by stretch between the leads' edges: each state that the node count brackets is a start for Newton's
 * method on F without the zeros known, and a row of points halfway down finds the wide ones above the barriers. With `count` the
 * argument principle counts them apart, around the box from the depth to half of it above the real axis, where no pole can be; where
 * more are counted than listed, ever smaller boxes are searched. `complete` says whether both agree in the end.
 */
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
  let counted: number | null = options.count ? 0 : null
  for (let i = 1; i < ends.length; i++) {
    const box: Box = { left: ends[i - 1], right: ends[i], bottom: -depth, top: 0.5 * depth }
    const zeros = findZeros(sweep, nodes, box.left, box.right, depth)
    if (options.count) {
      const count = windingNumber(sweep, zeros.branch, box)
      counted = count === null || counted === null ? null : counted + count
      if (count !== null) searchBox(zeros, box, count, 0)
    }
    for (let j = 0; j < zeros.re.length; j++) {
      if (isInside(box, zeros.re[j], zeros.im[j]))
        poles.push(poleAt(sweep, zeros.re[j], -2 * zeros.im[j], zeros.branch))
    }
  }
  poles.sort((a, b) => a.energyEv - b.energyEv)
  return { poles, counted, complete: !options.count || counted === poles.length }
}

/** Finds what a count says is missing in a box: Newton from its middle, then its halves. */
function searchBox(zeros: Zeros, box: Box, count: number, level: number): void {
  const { left, right, bottom, top } = box
  const missing = () => count - zeros.re.filter((re, j) => isInside(box, re, zeros.im[j])).length
  while (missing() > 0) {
    const before = zeros.re.length
    zeros.search(0.5 * (left + right), 0.5 * (bottom + top))
    if (zeros.re.length === before) break
  }
  if (missing() <= 0 || level === mostHalvings) return
  const wide = right - left > top - bottom
  const middle = wide ? 0.5 * (left + right) : 0.5 * (bottom + top)
  const halves = wide
    ? [
        { ...box, right: middle },
        { ...box, left: middle },
      ]
    : [
        { ...box, top: middle },
        { ...box, bottom: middle },
      ]
  for (const half of halves) {
    const inside = windingNumber(zeros.sweep, zeros.branch, half)
    if (inside !== null) searchBox(zeros, half, inside, level + 1)
  }
}

const mostHalvings = 14

function isInside({ left, right, bottom, top }: Box, re: number, im: number): boolean {
  return re >= left && re < right && im > bottom && im <= top
}

function findZeros(sweep: ComplexSweep, nodes: NodeCount, a: number, b: number, depth: number): Zeros {
  const zeros = new Zeros(sweep, continuationAt(sweep, 0.5 * (a + b)), a, b, depth)
  const starts: number[] = []
  bracketStates(nodes, a, b, 0.1 * depth, starts)
  for (const start of starts) zeros.search(start, -1e-3 * depth)
  const n = Math.ceil((b - a) / (0.6 * depth)) + 1
  for (let i = 0; i <= n; i++) {
    const x = a + ((b - a) * i) / n
    for (let k = 0; k < 5; k++) {
      if (zeros.near(x, -0.5 * depth) > 1.5 * depth) break
      if (!zeros.search(x, -0.5 * depth)) break
    }
  }
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

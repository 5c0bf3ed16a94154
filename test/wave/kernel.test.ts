import { execFileSync } from 'node:child_process'
import { readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { hardWall, type Side } from '../../src/wave/index.js'
import { wasmAvailable } from '../../src/wave/kernel/instance.js'
import { wasmGradient } from '../../src/wave/kernel/wasmGradient.js'
import { wasmSpectrum } from '../../src/wave/kernel/wasmSpectrum.js'
import { plainGradient } from '../../src/wave/plainGradient.js'
import { plainSpectrum } from '../../src/wave/plainSpectrum.js'
import { poisoned } from './regionSystem.js'
import { seeded } from './seeded.js'

const ulp = 2 ** -53

/** Media and a stack with everything that takes a path of its own: edges, thick layers, no width, closed exits, walls. */
function anyProblem(random: () => number) {
  const pick = (n: number) => Math.floor(n * random())
  const points = 1 + pick(random() < 0.3 ? 9 : 700)
  const count = 2 + pick(12)
  const layers = pick(random() < 0.2 ? 3 : 60)
  const table = { count, points, q: new Float64Array(count * points), mu: new Float64Array(count * points) }
  for (let m = 0; m < count; m++) {
    const edge = random()
    const slope = m === 0 || random() < 0.7 ? 1 + random() : -1 - random()
    const mass = 0.02 + 0.3 * random()
    for (let e = 0; e < points; e++) {
      const energy = e / points
      const near = [0, -0, ulp, -ulp, 1e-205, -1e-205][pick(6)]
      const q = pick(100) === 0 ? near : slope * (energy - edge)
      table.q[m * points + e] = m === 0 ? 0.001 + energy : q
      table.mu[m * points + e] = pick(200) === 0 ? -mass : mass * (1 + 0.3 * energy)
    }
  }
  for (let e = 0; e < points; e++) {
    table.mu[e] = Math.abs(table.mu[e])
    table.mu[points + e] = Math.abs(table.mu[points + e])
  }
  const medium = Int32Array.from({ length: layers }, () => pick(count))
  const width = Float64Array.from({ length: layers }, () => {
    const kind = random()
    return kind < 0.02 ? 0 : kind < 0.04 ? 2000 * random() : kind < 0.05 ? 1e5 * random() : 10 * random()
  })
  const exit = pick(8) === 0 ? hardWall : pick(2) === 0 ? 1 : 0
  return { table, stack: { entry: 0, exit, medium, width }, points }
}

describe.skipIf(!wasmAvailable)('the WebAssembly kernel and its plain twin', () => {
  it('give the same bits on a million points', () => {
    const random = seeded(2026)
    let compared = 0
    let refused = 0
    while (compared < 1_000_000) {
      const { table, stack, points } = anyProblem(random)
      const from: Side = stack.exit !== hardWall && random() < 0.3 ? 'exit' : 'entry'
      const near = from === 'entry' ? stack.entry : stack.exit
      const far = from === 'entry' ? stack.exit : stack.entry
      const rows = () => ({ T: poisoned(points), R: poisoned(points), log10T: poisoned(points) })
      const plain = rows()
      const wasm = rows()
      const worst = wasmSpectrum(table, stack, wasm, from, near, far)
      if (!(worst < Infinity)) {
        refused++
        expect(() => plainSpectrum(table, stack, plain, from, near, far)).toThrow(RangeError)
        continue
      }
      expect(plainSpectrum(table, stack, plain, from, near, far)).toBe(worst)
      for (const row of ['T', 'R', 'log10T'] as const) expectSameBits(row, plain[row], wasm[row])
      compared += points
    }
    expect(refused).toBeGreaterThan(10)
  })

  it('give the same bits of half a million derivatives of each kind', () => {
    const random = seeded(4711)
    let compared = 0
    while (compared < 500_000) {
      const { table, stack, points } = anyProblem(random)
      const size = points * stack.medium.length
      const rows = () => ({
        T: poisoned(points),
        dTdWidth: poisoned(size),
        dTdQ: poisoned(size),
        dTdMu: poisoned(size),
      })
      const plain = rows()
      const wasm = rows()
      if (!wasmGradient(table, stack, wasm)) {
        expect(() => plainGradient(table, stack, plain)).toThrow(RangeError)
        continue
      }
      plainGradient(table, stack, plain)
      for (const row of ['T', 'dTdWidth', 'dTdQ', 'dTdMu'] as const) expectSameBits(row, plain[row], wasm[row])
      compared += size
    }
  })

  it('leave log10 T alone when it is not asked for', () => {
    const { table, stack, points } = anyProblem(seeded(5))
    const out = { T: poisoned(points), R: poisoned(points) }
    wasmSpectrum(table, stack, out, 'entry', 0, stack.exit)
    expect(out.T.some(Number.isNaN) || out.R.some(Number.isNaN)).toBe(false)
  })
})

describe('the bytes of the kernel', () => {
  it('are what its source compiles to', () => {
    const file = new URL('../../src/wave/kernel/bytes.ts', import.meta.url)
    const before = readFileSync(file, 'utf8')
    const script = new URL('../../src/wave/kernel/build.js', import.meta.url).pathname
    const compiled = execFileSync(process.execPath, [script, '--print'], { encoding: 'utf8' })
    expect(compiled).toBe(before)
  })
})

function expectSameBits(name: string, plain: Float64Array, wasm: Float64Array): void {
  const a = new BigInt64Array(plain.buffer)
  const b = new BigInt64Array(wasm.buffer)
  for (let i = 0; i < a.length; i++) {
    if (a[i] !== b[i]) throw new Error(`${name} ${i}: ${plain[i]} plain, ${wasm[i]} wasm`)
  }
}

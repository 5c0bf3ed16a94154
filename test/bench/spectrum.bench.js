/**
 * What a spectrum costs: ns per layer and energy, of the built library. Run by `npm run bench`, after `npm run build`.
 * Seeded, warmed; every number is the best of several rounds, kernels taking turns; ratios are within this run.
 */
import { spawnSync } from 'node:child_process'
import { mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'

const dist = new URL(process.env.BENCH_DIST ?? '../../dist/', import.meta.url)
const wave = await import(new URL('wave/index.js', dist))
const { plainSpectrum } = await import(new URL('wave/plainSpectrum.js', dist))
const { wasmSpectrum } = await import(new URL('wave/kernel/wasmSpectrum.js', dist))

const rounds = 9
let sink = 0

function seeded(seed) {
  let state = seed
  return () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0
    return state / 4294967296
  }
}

/** Barriers and wells of electrons, 5 to 400 meV: `distinct`, or of three media. */
function problem(layers, points, distinct) {
  const random = seeded(7)
  const C = 0.0380998211096858
  const count = distinct ? layers + 2 : 4
  const V = [0, 0]
  const m = [0.067, 0.067]
  const table = { count, points, q: new Float64Array(count * points), mu: new Float64Array(count * points) }
  for (let i = 2; i < count; i++) {
    V[i] = i % 2 === 0 ? 0.2 + 0.2 * random() : 0.02 * random()
    m[i] = 0.06 + 0.04 * random()
  }
  for (let i = 0; i < count; i++) {
    for (let e = 0; e < points; e++) {
      const E = 0.005 + (0.395 * e) / points
      table.q[i * points + e] = (m[i] / C) * (E - V[i])
      table.mu[i * points + e] = m[i]
    }
  }
  const medium = Int32Array.from({ length: layers }, (_, j) => (distinct ? j + 2 : 2 + (j % 2)))
  const width = Float64Array.from({ length: layers }, (_, j) => (j % 2 === 0 ? 1.5 + 2 * random() : 3 + 4 * random()))
  return { table, stack: { entry: 0, exit: 1, medium, width }, layers, points }
}

/** Best time of one call in ns per layer and energy, each way in turn. */
function measure({ layers, points }, ways) {
  const repeat = Math.max(1, Math.round(1e6 / (layers * points)))
  const best = ways.map(() => Infinity)
  for (const way of ways) for (let i = 0; i < repeat; i++) way()
  for (let round = 0; round < rounds; round++) {
    ways.forEach((way, i) => {
      const start = process.hrtime.bigint()
      for (let k = 0; k < repeat; k++) way()
      const spent = Number(process.hrtime.bigint() - start) / (repeat * layers * points)
      best[i] = Math.min(best[i], spent)
    })
  }
  return best
}

function spectrumWays({ table, stack, points }) {
  const out = { T: new Float64Array(points), R: new Float64Array(points) }
  const keep = () => {
    sink += out.T[points >> 1]
  }
  const plain = () => {
    plainSpectrum(table, stack, out, 'entry', 0, 1)
    keep()
  }
  const wasm = () => {
    wasmSpectrum(table, stack, out, 'entry', 0, 1)
    keep()
  }
  return { plain, wasm }
}

function gradientWay({ table, stack, layers, points }) {
  const rows = () => new Float64Array(layers * points)
  const out = { T: new Float64Array(points), dTdWidth: rows(), dTdQ: rows(), dTdMu: rows() }
  return () => {
    wave.gradientInto(table, stack, out)
    sink += out.dTdQ[points >> 1]
  }
}

/** ns of the same work by nativeSpectrum.c, few media and all distinct; null without a C compiler. */
function native() {
  const folder = mkdtempSync(join(tmpdir(), 'native-'))
  const program = join(folder, 'spectrum')
  const source = fileURLToPath(new URL('nativeSpectrum.c', import.meta.url))
  const built = spawnSync('cc', ['-O3', '-march=native', '-ffast-math', source, '-o', program, '-lm'])
  const ran = built.status === 0 ? spawnSync(program, { encoding: 'utf8' }) : null
  rmSync(folder, { recursive: true })
  return ran?.status === 0 ? ran.stdout.trim().split('\n').map(Number) : null
}

const show = (label, ...cells) => console.log(label.padEnd(44), ...cells.map((c) => String(c).padStart(12)))
const ns = (x) => `${x.toFixed(2)} ns`
const times = (x) => `${x.toFixed(1)} x`

console.log(`Spectrum (T and R, no log10 T), ns per layer and energy; kernel in use: ${wave.kernelName}\n`)
const numpy = spawnSync('python3', [fileURLToPath(new URL('numpySpectrum.py', import.meta.url))], { encoding: 'utf8' })
const numpyNs = numpy.status === 0 ? Number(numpy.stdout) : null
const nativeNs = native()
show('21 layers, 2048 energies', 'plain', 'wasm', 'numpy', 'numpy/wasm', 'native', 'wasm/native')
for (const distinct of [false, true]) {
  const p = problem(21, 2048, distinct)
  const { plain, wasm } = spectrumWays(p)
  const [a, b] = measure(p, [plain, wasm])
  const script = numpyNs === null ? ['no numpy', ''] : distinct ? ['', ''] : [ns(numpyNs), times(numpyNs / b)]
  const limit = nativeNs === null ? ['no compiler', ''] : [ns(nativeNs[distinct ? 1 : 0]), times(b / nativeNs[distinct ? 1 : 0])]
  show(distinct ? 'every layer its own medium' : 'three media', ns(a), ns(b), ...script, ...limit)
}

console.log('')
show('all derivatives against one spectrum', 'gradient', 'spectrum', 'ratio')
for (const layers of [10, 50, 200, 1000]) {
  const p = problem(layers, 1024, false)
  const [gradient, spectrum] = measure(p, [gradientWay(p), spectrumWays(p).wasm])
  show(`${layers} layers, three media`, ns(gradient), ns(spectrum), times(gradient / spectrum))
}

console.log('')
show('linear in layers and energies', 'three media', 'distinct')
for (const [layers, points] of [
  [10, 2048],
  [100, 2048],
  [1000, 2048],
  [100, 128],
  [100, 20000],
]) {
  const cells = [false, true].map((distinct) => {
    const p = problem(layers, points, distinct)
    return ns(measure(p, [spectrumWays(p).wasm])[0])
  })
  show(`${layers} layers, ${points} energies`, ...cells)
}
if (!Number.isFinite(sink)) process.exitCode = 1

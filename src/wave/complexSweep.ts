import { exp, sinCos } from './elementary.js'
import { hardWall, type MediaAtEnergy, type WaveStack, type WaveSystem } from './types.js'

/** Which continuation of a lead's square root is meant: outgoing where it is open, decaying where it is closed. */
export interface Continuation {
  readonly entryOpen: boolean
  readonly exitOpen: boolean
}

/**
 * The outgoing condition F(E) = v + i Y u at the entry's face for a wave that leaves through the exit, at complex
 * energy, and dF/dE in forward mode. F = 2 i Y_entry A, so the zeros of F are the poles of t; unlike A it is finite at
 * the entry's edge. Every layer is applied without its growing exponential and the vector is kept near one by powers of
 * two: F and its derivative share an arbitrary positive factor, which no ratio and no argument sees.
 *
 * With S = sin(k w)/k and f = q/mu a layer carries (u, v) from right to left by [[c, -mu S], [f S, c]], and
 *   c' = -(w/2) S q',   S' = (w c - S)/(2 q) q' = w³ (-1/6 + z/60 - ...) q' with z = q w².
 *
 * `out` after `evaluate`: [Re F, Im F, Re F', Im F'].
 */
export class ComplexSweep {
  readonly out = new Float64Array(4)
  readonly at: MediaAtEnergy
  /** k = sqrt(q) of every medium, principal. */
  readonly kRe: Float64Array
  readonly kIm: Float64Array
  /** f = q/mu, f' and 1/k. */
  readonly fRe: Float64Array
  readonly fIm: Float64Array
  readonly dfRe: Float64Array
  readonly dfIm: Float64Array
  readonly jRe: Float64Array
  readonly jIm: Float64Array
  /** Media that the layers use, each once. */
  private readonly used: Int32Array
  /** Layers of one medium and width are one cell: its number for each layer, a layer of each, and what they do. */
  private readonly cells: Int32Array
  private readonly representative: Int32Array
  private readonly numbers: Float64Array
  private readonly lead = new Float64Array(4)
  private readonly trig = new Float64Array(4)

  constructor(readonly system: WaveSystem) {
    const { media, stack } = system
    const n = media.count
    const block = new Float64Array(16 * n)
    const row = (i: number) => block.subarray(i * n, (i + 1) * n)
    this.at = {
      qRe: row(0),
      qIm: row(1),
      muRe: row(2),
      muIm: row(3),
      dqRe: row(4),
      dqIm: row(5),
      dmuRe: row(6),
      dmuIm: row(7),
    }
    this.kRe = row(8)
    this.kIm = row(9)
    this.fRe = row(10)
    this.fIm = row(11)
    this.dfRe = row(12)
    this.dfIm = row(13)
    this.jRe = row(14)
    this.jIm = row(15)
    this.used = distinct(stack.medium, n)
    const { cells, representative } = cellsOf(stack)
    this.cells = cells
    this.representative = representative
    this.numbers = new Float64Array(perCell * representative.length)
  }

  /** Media of the layers at E = re + i im, before a sweep. */
  prepare(re: number, im: number): void {
    const { at, kRe, kIm, fRe, fIm, dfRe, dfIm, jRe, jIm, used } = this
    this.system.media.at(re, im, at)
    for (let i = 0; i < used.length; i++) {
      const m = used[i]
      const qr = at.qRe[m]
      const qi = at.qIm[m]
      const size = Math.sqrt(qr * qr + qi * qi)
      const big = Math.sqrt(0.5 * (size + Math.abs(qr)))
      const small = big > 0 ? (0.5 * qi) / big : 0
      const kr = qr >= 0 ? big : Math.abs(small)
      const ki = qr >= 0 ? small : qi < 0 ? -big : big
      kRe[m] = kr
      kIm[m] = ki
      const inv = size > 0 ? 1 / size : 0
      jRe[m] = kr * inv
      jIm[m] = -ki * inv
      const mr = at.muRe[m]
      const mi = at.muIm[m]
      const mm = 1 / (mr * mr + mi * mi)
      const fr = (qr * mr + qi * mi) * mm
      const fi = (qi * mr - qr * mi) * mm
      fRe[m] = fr
      fIm[m] = fi
      const dr = at.dqRe[m] - (fr * at.dmuRe[m] - fi * at.dmuIm[m])
      const di = at.dqIm[m] - (fr * at.dmuIm[m] + fi * at.dmuRe[m])
      dfRe[m] = (dr * mr + di * mi) * mm
      dfIm[m] = (di * mr - dr * mi) * mm
    }
  }

  /** What every different layer does to (u, v) and to its slope, twelve numbers each. */
  private crossings(): void {
    const { at, kRe, kIm, fRe, fIm, dfRe, dfIm, jRe, jIm, trig, representative, numbers } = this
    const { medium, width } = this.system.stack
    for (let cell = 0; cell < representative.length; cell++) {
      const m = medium[representative[cell]]
      const w = width[representative[cell]]
      const qr = at.qRe[m]
      const qi = at.qIm[m]
      const dqr = at.dqRe[m]
      const dqi = at.dqIm[m]
      const small = layerTrig(kRe[m] * w, kIm[m] * w, jRe[m], jIm[m], trig)
      const cr = trig[0]
      const ci = trig[1]
      let Sr = trig[2]
      let Si = trig[3]
      // S' = g q', g = (w c - S)/(2 q)
      let gr = 0
      let gi = 0
      const ww = w * w
      const zr = qr * ww
      const zi = qi * ww
      if (small && zr * zr + zi * zi < 1e-3) {
        // both in powers of z: the quotients lose their digits towards z = 0
        let ar = 1 - zr / 110
        let ai = -zi / 110
        let tr = 1 - (zr * ar - zi * ai) / 72
        let ti = -(zr * ai + zi * ar) / 72
        ar = 1 - (zr * tr - zi * ti) / 42
        ai = -(zr * ti + zi * tr) / 42
        tr = 1 - (zr * ar - zi * ai) / 20
        ti = -(zr * ai + zi * ar) / 20
        Sr = w * (1 - (zr * tr - zi * ti) / 6)
        Si = (-w * (zr * ti + zi * tr)) / 6
        ar = 1 - zr / 88
        ai = -zi / 88
        tr = 1 - (zr * ar - zi * ai) / 54
        ti = -(zr * ai + zi * ar) / 54
        ar = 1 - (zr * tr - zi * ti) / 28
        ai = -(zr * ti + zi * tr) / 28
        tr = 1 - (zr * ar - zi * ai) / 10
        ti = -(zr * ai + zi * ar) / 10
        const w3 = (-w * ww) / 6
        gr = w3 * tr
        gi = w3 * ti
      } else {
        const h = 0.5 / (qr * qr + qi * qi)
        const br = (w * cr - Sr) * h
        const bi = (w * ci - Si) * h
        gr = br * qr + bi * qi
        gi = bi * qr - br * qi
      }
      const dSr = gr * dqr - gi * dqi
      const dSi = gr * dqi + gi * dqr
      const hw = -0.5 * w
      const dcr = hw * (Sr * dqr - Si * dqi)
      const dci = hw * (Sr * dqi + Si * dqr)
      const mr = at.muRe[m]
      const mi = at.muIm[m]
      const fr = fRe[m]
      const fi = fIm[m]
      const downRe = mr * Sr - mi * Si
      const downIm = mr * Si + mi * Sr
      const er = fr * Sr - fi * Si
      const ei = fr * Si + fi * Sr
      const dmr = at.dmuRe[m]
      const dmi = at.dmuIm[m]
      const dbr = mr * dSr - mi * dSi + dmr * Sr - dmi * Si
      const dbi = mr * dSi + mi * dSr + dmr * Si + dmi * Sr
      const dfr = dfRe[m]
      const dfi = dfIm[m]
      const der = fr * dSr - fi * dSi + dfr * Sr - dfi * Si
      const dei = fr * dSi + fi * dSr + dfr * Si + dfi * Sr
      const o = perCell * cell
      numbers[o] = cr
      numbers[o + 1] = ci
      numbers[o + 2] = downRe
      numbers[o + 3] = downIm
      numbers[o + 4] = er
      numbers[o + 5] = ei
      numbers[o + 6] = dcr
      numbers[o + 7] = dci
      numbers[o + 8] = dbr
      numbers[o + 9] = dbi
      numbers[o + 10] = der
      numbers[o + 11] = dei
    }
  }

  /** F and F' at E = re + i im. */
  evaluate(re: number, im: number, branch: Continuation): void {
    this.prepare(re, im)
    const { at, lead, out } = this
    const { medium, entry, exit } = this.system.stack
    let ur = 1
    let ui = 0
    let vr = 0
    let vi = 0
    let dur = 0
    let dui = 0
    let dvr = 0
    let dvi = 0
    if (exit === hardWall) {
      ur = 0
      vr = 1
    } else {
      admittance(at, exit, branch.exitOpen, lead)
      vr = -lead[1]
      vi = lead[0]
      dvr = -lead[3]
      dvi = lead[2]
    }
    this.crossings()
    const { cells, numbers } = this
    for (let n = medium.length - 1; n >= 0; n--) {
      const o = perCell * cells[n]
      const cr = numbers[o]
      const ci = numbers[o + 1]
      const br = numbers[o + 2]
      const bi = numbers[o + 3]
      const er = numbers[o + 4]
      const ei = numbers[o + 5]
      const dcr = numbers[o + 6]
      const dci = numbers[o + 7]
      const dbr = numbers[o + 8]
      const dbi = numbers[o + 9]
      const der = numbers[o + 10]
      const dei = numbers[o + 11]
      const nur = cr * ur - ci * ui - br * vr + bi * vi
      const nui = cr * ui + ci * ur - br * vi - bi * vr
      const nvr = er * ur - ei * ui + cr * vr - ci * vi
      const nvi = er * ui + ei * ur + cr * vi + ci * vr
      const ndur = cr * dur - ci * dui - br * dvr + bi * dvi + dcr * ur - dci * ui - dbr * vr + dbi * vi
      const ndui = cr * dui + ci * dur - br * dvi - bi * dvr + dcr * ui + dci * ur - dbr * vi - dbi * vr
      const ndvr = er * dur - ei * dui + cr * dvr - ci * dvi + der * ur - dei * ui + dcr * vr - dci * vi
      const ndvi = er * dui + ei * dur + cr * dvi + ci * dvr + der * ui + dei * ur + dcr * vi + dci * vr
      ur = nur
      ui = nui
      vr = nvr
      vi = nvi
      dur = ndur
      dui = ndui
      dvr = ndvr
      dvi = ndvi
      const size = Math.abs(ur) + Math.abs(ui) + Math.abs(vr) + Math.abs(vi)
      if (size > 1e60 || size < 1e-60) {
        const scale = size > 1e60 ? shrink : grow
        ur *= scale
        ui *= scale
        vr *= scale
        vi *= scale
        dur *= scale
        dui *= scale
        dvr *= scale
        dvi *= scale
      }
    }
    admittance(at, entry, branch.entryOpen, lead)
    const yr = lead[0]
    const yi = lead[1]
    out[0] = vr - yr * ui - yi * ur
    out[1] = vi + yr * ur - yi * ui
    out[2] = dvr - yr * dui - yi * dur - lead[2] * ui - lead[3] * ur
    out[3] = dvi + yr * dur - yi * dui + lead[2] * ur - lead[3] * ui
  }
}

/**
 * cos(x + i y) and sin(x + i y) (jRe + i jIm) into `out`, both without their factor exp(|y|) where |y| >= 0.35; says
 * whether that factor was left in. Below, sinh comes from its series, so that a small imaginary part keeps its digits.
 */
export function layerTrig(x: number, y: number, jRe: number, jIm: number, out: Float64Array): boolean {
  sinCos(x, out)
  const small = y < 0.35 && y > -0.35
  let ch = 0
  let sh = 0
  if (small) {
    const yy = y * y
    sh = y * (1 + (yy / 6) * (1 + (yy / 20) * (1 + (yy / 42) * (1 + yy / 72))))
    ch = Math.sqrt(1 + sh * sh)
  } else {
    const e = exp(-2 * Math.abs(y))
    ch = 0.5 * (1 + e)
    sh = y < 0 ? -0.5 * (1 - e) : 0.5 * (1 - e)
  }
  const sine = out[0]
  const cosine = out[1]
  const sr = sine * ch
  const si = cosine * sh
  out[0] = cosine * ch
  out[1] = -sine * sh
  out[2] = sr * jRe - si * jIm
  out[3] = sr * jIm + si * jRe
  return small
}

/** Y = k/mu and dY/dE of a lead into `out` (Re Y, Im Y, Re Y', Im Y'); closed: k = i sqrt(-q), decaying. */
export function admittance(at: MediaAtEnergy, m: number, open: boolean, out: Float64Array): void {
  const sign = open ? 1 : -1
  const qr = sign * at.qRe[m]
  const qi = sign * at.qIm[m]
  const size = Math.sqrt(qr * qr + qi * qi)
  const big = Math.sqrt(0.5 * (size + Math.abs(qr)))
  const small = big > 0 ? (0.5 * qi) / big : 0
  let kr = qr >= 0 ? big : Math.abs(small)
  let ki = qr >= 0 ? small : qi < 0 ? -big : big
  if (!open) {
    const turned = kr
    kr = -ki
    ki = turned
  }
  // k' = q'/(2 k); at k = 0 the slope is infinite and left out
  const kk = kr * kr + ki * ki
  const h = kk > 0 ? 0.5 / kk : 0
  const dkr = (at.dqRe[m] * kr + at.dqIm[m] * ki) * h
  const dki = (at.dqIm[m] * kr - at.dqRe[m] * ki) * h
  const mr = at.muRe[m]
  const mi = at.muIm[m]
  const mm = 1 / (mr * mr + mi * mi)
  const yr = (kr * mr + ki * mi) * mm
  const yi = (ki * mr - kr * mi) * mm
  const nr = dkr - (yr * at.dmuRe[m] - yi * at.dmuIm[m])
  const ni = dki - (yr * at.dmuIm[m] + yi * at.dmuRe[m])
  out[0] = yr
  out[1] = yi
  out[2] = (nr * mr + ni * mi) * mm
  out[3] = (ni * mr - nr * mi) * mm
}

/** Powers of two, so that no digit changes. */
const shrink = 6.223015277861142e-61
const grow = 1.6069380442589903e60

const perCell = 12

function cellsOf({ medium, width }: WaveStack): { cells: Int32Array; representative: Int32Array } {
  const cells = new Int32Array(medium.length)
  const known = new Map<number, Map<number, number>>()
  const representative: number[] = []
  for (let j = 0; j < medium.length; j++) {
    let widths = known.get(medium[j])
    if (widths === undefined) {
      widths = new Map()
      known.set(medium[j], widths)
    }
    let cell = widths.get(width[j])
    if (cell === undefined) {
      cell = representative.push(j) - 1
      widths.set(width[j], cell)
    }
    cells[j] = cell
  }
  return { cells, representative: Int32Array.from(representative) }
}

function distinct(medium: Int32Array, count: number): Int32Array {
  const seen = new Uint8Array(count)
  let n = 0
  for (let i = 0; i < medium.length; i++) {
    if (seen[medium[i]] === 0) {
      seen[medium[i]] = 1
      n++
    }
  }
  const used = new Int32Array(n)
  n = 0
  for (let m = 0; m < count; m++) if (seen[m] === 1) used[n++] = m
  return used
}

import { describe, expect, it } from 'vitest'
import type { Candidate } from '../../src/deliver/index.js'
import { profilePlot, transmissionPlot } from '../../src/deliver/index.js'
import type { Demand, Job } from '../../src/job/index.js'
import { collisions, readSvg, strays } from './readSvg.js'
import {
  demands,
  evenly,
  layer,
  peak,
  sampleCandidate,
  sampleJob,
  sampleLayers,
  sampleProfile,
  sampleSpectrum,
} from './sampleNight.js'

/** Nights that have gone wrong in a plot before, or well could. */
const nights: Record<string, [Job, Candidate]> = {
  plain: [sampleJob(), sampleCandidate()],
  'no peak at all': [sampleJob(), withoutPeak()],
  'a hard wall': [sampleJob({ stack: { ...sampleJob().stack, exit: 'hard wall' } }), hardWall()],
  'T down to 1e-300': [sampleJob(), deep(-300)],
  'a peak of 1e-12 meV': [sampleJob(), narrow(1e-15)],
  'a peak of 20 neV': [sampleJob(), narrow(2e-8)],
  'a peak that reaches 1e-7': [sampleJob(), low(1e-7)],
  'two conditions': [sampleJob(), twoConditions()],
  'forty layers': [sampleJob(), superlattice(40)],
  'a hundred layers': [sampleJob(), superlattice(100)],
  'names that are long, strange or hostile': hostile(),
  'a pass range and no peak demand': [sampleJob({ demands: [passDemand()] }), sampleCandidate()],
  'a curve as the goal': [sampleJob({ demands: [curveDemand()] }), sampleCandidate()],
  'thirty demands': [sampleJob({ demands: thirty() }), sampleCandidate()],
  'a peak outside of the scan': [sampleJob({ scanEv: [0.1, 0.2] }), sampleCandidate()],
  'a flat T of 1': [sampleJob(), flat()],
  'ten thousand points': [sampleJob(), sampleCandidate({ spectra: [sampleSpectrum([[0.08, 1e-6]], '', 10_000)] })],
  'growth from the entry': [
    sampleJob({ growth: { ...sampleJob().growth, startsAt: 'entry', assumed: true } }),
    sampleCandidate(),
  ],
}

describe.each(Object.entries(nights))('the pictures of %s', (_, [job, candidate]) => {
  it.each([
    ['transmission', transmissionPlot],
    ['profile', profilePlot],
  ])('%s: well-formed, the same bytes twice, no text on another or outside', (_name, plot) => {
    const source = plot(job, candidate)
    expect(plot(job, candidate) === source).toBe(true)
    expect(source.match(/NaN|Infinity|undefined|null/)).toBeNull()
    const svg = readSvg(source)
    expect(new Set(svg.ids).size).toBe(svg.ids.length)
    expect(strays(svg)).toEqual([])
    expect(collisions(svg)).toEqual([])
    expect(svg.texts.map(({ text }) => text).join(' ')).toContain('not a safety component')
  })
})

describe('transmissionPlot', () => {
  it('says in words, for those who do not see it, what was reached', () => {
    const { title, description } = readSvg(transmissionPlot(sampleJob(), sampleCandidate()))
    expect(title).toContain('cold-collector-80, candidate 1')
    expect(description).toContain('Peak at 79.87 meV, 1.448 meV wide')
    expect(description).toMatch(/d2 block 5\.\.60 meV: T = 0\.0006203, met/)
  })

  it('writes met and missed beside each demand', () => {
    const { evaluation } = sampleCandidate()
    const missed = evaluation.demands.map((demand) => (demand.id === 'd3' ? { ...demand, met: false, rms: 2 } : demand))
    const candidate = sampleCandidate({ evaluation: { ...evaluation, met: false, merit: 1, demands: missed } })
    const words = wordsOf(transmissionPlot(sampleJob(), candidate))
    expect(words.filter((word) => word === 'met')).toHaveLength(2)
    expect(words.filter((word) => word === 'missed')).toHaveLength(1)
  })

  it('says that nothing passes a hard wall', () => {
    const [job, candidate] = nights['a hard wall']
    expect(wordsOf(transmissionPlot(job, candidate))).toContain(
      'T = 0 at every energy of the scan: the exit is a hard wall, all is reflected.',
    )
  })

  it('says how far T goes down where the picture ends sooner', () => {
    const [job, candidate] = nights['T down to 1e-300']
    expect(wordsOf(transmissionPlot(job, candidate))).toContain('T goes down to 1e-300; the picture ends at 1e-12.')
  })

  it('loses no needle when it rolls the curve up: the top of the frame is reached', () => {
    const [job, candidate] = nights['ten thousand points']
    const curve = pathOf(transmissionPlot(job, candidate), '#12467f')
    expect(Math.min(...curve.map(([, y]) => y))).toBeLessThan(110)
    expect(curve.length).toBeLessThan(4 * 710 + 4)
  })

  it('gives two candidates of one page no id in common', () => {
    const one = readSvg(transmissionPlot(sampleJob(), sampleCandidate()))
    const two = readSvg(transmissionPlot(sampleJob(), sampleCandidate({ rank: 2, id: 'ffffffffffff' })))
    const profile = readSvg(profilePlot(sampleJob(), sampleCandidate()))
    const ids = [...one.ids, ...two.ids, ...profile.ids]
    expect(new Set(ids).size).toBe(ids.length)
  })
})

describe('profilePlot', () => {
  it('says which side the substrate is on, and turns the arrow with it', () => {
    const arrow = (svg: string) =>
      svg
        .match(/polygon points="(\S+) \S+ (\S+)/)
        ?.slice(1)
        .map(Number) ?? []
    const fromExit = profilePlot(sampleJob(), sampleCandidate())
    const fromEntry = profilePlot(...nights['growth from the entry'])
    const at = (svg: string, word: string) => readSvg(svg).texts.find(({ text }) => text === word)?.box[0] ?? Number.NaN
    expect(at(fromExit, 'substrate')).toBeGreaterThan(at(fromExit, 'exit: GaAs, the wave leaves here'))
    expect(at(fromEntry, 'substrate')).toBe(at(fromEntry, 'entry: GaAs, the wave comes in here'))
    expect(arrow(fromExit)[0]).toBeLessThan(arrow(fromExit)[1])
    expect(arrow(fromEntry)[0]).toBeGreaterThan(arrow(fromEntry)[1])
  })

  it('names every layer with its monolayers', () => {
    const words = wordsOf(profilePlot(sampleJob(), sampleCandidate()))
    expect(words.filter((word) => word === 'AlGaAs 0.35')).toHaveLength(2)
    expect(words.filter((word) => word === '18 ML')).toHaveLength(1)
  })
})

function wordsOf(svg: string): string[] {
  return readSvg(svg).texts.map(({ text }) => text)
}

/** Points of the first path in a colour. */
function pathOf(svg: string, stroke: string): [number, number][] {
  const d = svg.match(new RegExp(`<path d="([^"]*)" fill="none" stroke="${stroke}"`))?.[1] ?? ''
  return [...d.matchAll(/(-?[\d.]+),(-?[\d.]+)/g)].map(([, x, y]) => [Number(x), Number(y)])
}

function withoutPeak(): Candidate {
  const { evaluation, profile } = sampleCandidate()
  return sampleCandidate({
    ...{ margin: null, worstLayer: null, worstShiftEv: null, limitingDemand: null, yield: null, resonances: [] },
    evaluation: {
      ...{ merit: 10, met: false, peak: null },
      demands: evaluation.demands.map((demand) => ({ ...demand, peak: null, reached: null, met: false, rms: 10 })),
    },
    profile: { ...profile, densityPerNm: null },
  })
}

function hardWall(): Candidate {
  const base = withoutPeak()
  const energyEv = Float64Array.from(evenly(0.005, 0.2, 100))
  const nothing = {
    ...{ condition: '', energyEv, T: energyEv.map(() => 0), R: energyEv.map(() => 1) },
    log10T: energyEv.map(() => Number.NEGATIVE_INFINITY),
  }
  const inside = base.profile.zNm.filter((z) => z <= base.totalNm)
  const edge = base.profile.edge.slice(0, inside.length)
  return { ...base, spectra: [nothing], profile: { zNm: inside, edge, densityPerNm: null } }
}

function deep(decades: number): Candidate {
  const spectrum = sampleSpectrum([[0.08, 0.001]])
  const log10T = spectrum.log10T.map((value, i) => (spectrum.energyEv[i] < 0.06 ? decades + i / 1000 : value))
  return sampleCandidate({ spectra: [{ ...spectrum, log10T, T: log10T.map((value) => 10 ** value) }] })
}

function narrow(width: number): Candidate {
  const thin = { ...peak, fwhmEv: width, lowEv: peak.energyEv - width / 2, highEv: peak.energyEv + width / 2 }
  const base = sampleCandidate()
  return sampleCandidate({
    evaluation: { ...base.evaluation, peak: thin },
    spectra: [sampleSpectrum([[peak.energyEv, width]])],
    resonances: [
      { energyEv: peak.energyEv, widthEv: width, entryWidthEv: width / 2, exitWidthEv: width / 2, peakT: 1 },
    ],
  })
}

function low(height: number): Candidate {
  const base = sampleCandidate()
  const [spectrum] = base.spectra
  const T = spectrum.T.map((t) => t * height)
  const found = { ...peak, T: height }
  return sampleCandidate({
    evaluation: { ...base.evaluation, peak: found },
    spectra: [{ ...spectrum, T, log10T: T.map((t) => Math.log10(t)) }],
  })
}

function twoConditions(): Candidate {
  const rest = sampleSpectrum([[peak.energyEv, peak.fwhmEv]], 'rest')
  const on = sampleSpectrum([[0.06, 0.002]], 'switched-on-with-a-rather-long-name')
  return sampleCandidate({ spectra: [rest, on] })
}

function superlattice(count: number): Candidate {
  const [barrier, well] = sampleLayers()
  const layers = Array.from({ length: count }, (_, i) => {
    const { region } = (i % 2 === 0 ? barrier : well).resolved
    return layer(
      `L${i + 1}`,
      i % 2 === 0 ? 'AlGaAs' : 'GaAs',
      i % 2 === 0 ? 0.35 : null,
      6 + i,
      0.28,
      region,
      count - i,
    )
  })
  return sampleCandidate({
    layers,
    profile: sampleProfile(layers),
    totalNm: layers.reduce((sum, { widthNm }) => sum + widthNm, 0),
    stack: layers.map(({ count: ml }) => `AlGaAs(0.35) ${ml}`).join(' / '),
  })
}

function hostile(): [Job, Candidate] {
  const bad = '</text><script>alert("&")</script>\u0000\ud800'
  const job = sampleJob({
    name: `a-name-${'that-goes-on-'.repeat(12)}`,
    demands: demands.map((demand) => ({ ...demand, id: `${demand.id}${bad}` })),
  })
  return [
    job,
    sampleCandidate({ stack: bad.repeat(20), notes: [bad, `A long note. ${'It goes on and on. '.repeat(30)}`] }),
  ]
}

function passDemand(): Demand {
  return {
    id: 'band',
    weight: 1,
    kind: 'pass',
    accept: null,
    at: null,
    quantity: 'T',
    pointsEv: evenly(0.075, 0.085, 64),
    above: 0.5,
  }
}

function curveDemand(): Demand {
  const rows = evenly(0.01, 0.19, 400).map((energyEv, i) => ({
    ...({ energyEv, T: i % 7 === 0 ? 0 : 0.001, scale: 'decades', tolerance: 1, weight: 1 } as const),
    sense: (['equal', 'least', 'most'] as const)[i % 3],
  }))
  return {
    id: 'goal',
    weight: 1,
    kind: 'curve',
    accept: null,
    at: null,
    quantity: 'T',
    mostRms: null,
    file: 'goal.csv',
    rows,
  }
}

function thirty(): Demand[] {
  return evenly(0.01, 0.19, 30).map((from, i) => ({
    ...{
      id: `stopband-${i + 1}`,
      weight: 1,
      kind: 'block',
      accept: null,
      at: null,
      quantity: 'T',
      pointsEv: evenly(from, from + 0.004, 64),
      below: 1e-3,
    },
  }))
}

function flat(): Candidate {
  const energyEv = Float64Array.from(evenly(0.005, 0.2, 300))
  const one = energyEv.map(() => 1)
  const zero = energyEv.map(() => 0)
  return { ...withoutPeak(), spectra: [{ condition: '', energyEv, T: one, R: zero, A: null, log10T: zero }] }
}

import type { Candidate, JobResult, LayerReport, SpectrumReport } from '../../src/deliver/index.js'
import type { Demand, Job } from '../../src/job/index.js'
import type { PeakFigures } from '../../src/target/index.js'

/**
 * A night's result made by hand: the 80 meV filter with a Lorentzian for its T. The figures are plausible and mean nothing; what is tested
 * is that they reach the files as they are.
 */

export const peak: PeakFigures = {
  energyEv: 0.07986983015,
  T: 0.99999999999,
  lowEv: 0.0791456,
  highEv: 0.0805941,
  fwhmEv: 0.001448380097,
}

export const demands: Demand[] = [
  {
    id: 'd1',
    weight: 1,
    kind: 'peak',
    axis: 'eV',
    centre: 0.08,
    within: 0.005,
    fwhm: [0.001, 0.004],
    height: 0.8,
    alone: null,
    accept: null,
    at: null,
    quantity: 'T',
  },
  {
    id: 'd2',
    weight: 1,
    kind: 'block',
    accept: null,
    at: null,
    quantity: 'T',
    pointsEv: evenly(0.005, 0.06, 64),
    below: 0.02,
  },
  {
    id: 'd3',
    weight: 0.5,
    kind: 'block',
    accept: null,
    at: null,
    quantity: 'T',
    pointsEv: evenly(0.11, 0.2, 64),
    below: 0.02,
  },
]

export function sampleJob(changes: Partial<Job> = {}): Job {
  return {
    file: 'jobs/cold-collector-80.yaml',
    text: 'format: 1\r\nname: cold-collector-80 # \u00b5\n',
    files: {},
    format: 1,
    name: 'cold-collector-80',
    kind: 'electron',
    note: '',
    conditions: [{ name: '', temperatureK: 77, biasV: 0, inPlaneEv: 0, angleDeg: 0, polarisation: 's' }],
    stack: {
      entry: { kind: 'material', material: 'GaAs', x: null },
      exit: { kind: 'material', material: 'GaAs', x: null },
      layers: [],
      mirror: false,
      massModel: 'two-band',
      strainedTo: null,
      biasOver: null,
      rising: [],
      referenceNm: null,
      back: null,
    },
    scanEv: [0.005, 0.2],
    resolutionEv: 1e-5,
    demands,
    growth: {
      startsAt: 'exit',
      sources: [],
      compositions: 1,
      stepNm: null,
      thinnestNm: null,
      totalNm: null,
      strain: null,
      critical: false,
      tooling: {},
      spread: { rate: 0.01, layer: { value: 0.5, unit: 'ML' }, x: 0.005, index: 0 },
      assumed: false,
      trials: 2048,
    },
    search: { method: 'auto', effort: 'brief', seed: 11 },
    deliver: { candidates: 10 },
    notes: [],
    ...changes,
  }
}

export function sampleLayers(): LayerReport[] {
  const barrier = { potentialEv: 0.29, massRel: 0.0952, alphaPerEv: 0.51 }
  return [
    layer('outer', 'AlGaAs', 0.35, 12, 0.2828, barrier, 3),
    layer('well', 'GaAs', null, 18, 0.28266, { potentialEv: 0, massRel: 0.067, alphaPerEv: 0.663 }, 2),
    layer('L3', 'AlGaAs', 0.35, 12, 0.2828, barrier, 1),
  ]
}

export function layer(
  id: string,
  material: string,
  x: number | null,
  count: number,
  stepNm: number,
  region: Extract<LayerReport['resolved'], { kind: 'electron' }>['region'],
  fromSubstrate: number,
): LayerReport {
  return {
    ...{ id, choice: { kind: 'material', material, x }, count, stepNm, widthNm: count * stepNm, fromSubstrate },
    resolved: { kind: 'electron', region, monolayerNm: stepNm, strain: 0 },
    seconds: count / 0.7,
    toleranceNm: 0.1 + 0.2 * fromSubstrate,
    shiftEv: -0.00321,
  }
}

/** A Lorentzian at each of `lines` [energy, width] over the scan, with points set thickly around the lines. */
export function sampleSpectrum(
  lines: readonly (readonly [number, number])[],
  condition = '',
  points = 800,
): SpectrumReport {
  const near = lines.flatMap(([e0, gamma]) => evenly(e0 - 6 * gamma, e0 + 6 * gamma, 81))
  const energyEv = Float64Array.from(
    [...evenly(0.005, 0.2, points), ...near].filter((e) => e >= 0.005 && e <= 0.2),
  ).sort()
  const T = energyEv.map((e) =>
    Math.min(
      1,
      lines.reduce((sum, [e0, gamma]) => sum + (gamma * gamma) / 4 / ((e - e0) * (e - e0) + (gamma * gamma) / 4), 0),
    ),
  )
  return { condition, energyEv, T, R: T.map((t) => 1 - t), A: null, log10T: T.map((t) => Math.log10(t)) }
}

export function sampleCandidate(changes: Partial<Candidate> = {}): Candidate {
  const layers = sampleLayers()
  return {
    rank: 1,
    id: '0f3a9c81d2e4',
    listedAs: 'best',
    margin: 1.7082,
    totalNm: layers.reduce((sum, { widthNm }) => sum + widthNm, 0),
    compositions: 1,
    evaluation: {
      merit: 0,
      met: true,
      demands: [
        { id: 'd1', kind: 'peak', reached: peak.energyEv, rms: 0, met: true, extremeEv: null, peak },
        {
          id: 'd2',
          kind: 'block',
          accept: null,
          at: null,
          quantity: 'T',
          reached: 0.0006202906946,
          rms: 0,
          met: true,
          extremeEv: 0.06,
          peak: null,
        },
        {
          id: 'd3',
          kind: 'block',
          accept: null,
          at: null,
          quantity: 'T',
          reached: 0.005054526586,
          rms: 0,
          met: true,
          extremeEv: 0.11,
          peak: null,
        },
      ],
      peak,
    },
    yield: { trials: 2048, passed: 1800, pct: 87.890625, lowPct: 86.40598, highPct: 89.2332, failures: [240, 8, 1] },
    limitingDemand: 'd1',
    worstLayer: 'well',
    worstShiftEv: -0.0016,
    fluxError: 2.2e-16,
    pathError: 3.1e-14,
    stack: 'AlGaAs(0.35) 12 / GaAs 18 / AlGaAs(0.35) 12 ML',
    layers,
    spectra: [sampleSpectrum([[peak.energyEv, peak.fwhmEv]])],
    resonances: [
      { energyEv: 0.0798698, widthEv: 0.00144838, entryWidthEv: 0.00072419, exitWidthEv: 0.00072419, peakT: 1 },
    ],
    profile: sampleProfile(layers),
    notes: [],
    ...changes,
  }
}

/** The staircase, each interface twice, and a bump for the wave. */
export function sampleProfile(layers: readonly LayerReport[]): Candidate['profile'] {
  const total = layers.reduce((sum, { widthNm }) => sum + widthNm, 0)
  const zNm: number[] = []
  const edges: number[] = []
  const run = (from: number, to: number, edge: number) => {
    for (const z of evenly(from, to, 60)) {
      zNm.push(z)
      edges.push(edge)
    }
  }
  run(-5, 0, 0)
  let from = 0
  for (const { widthNm, resolved } of layers) {
    run(from, from + widthNm, resolved.region.potentialEv)
    from += widthNm
  }
  run(total, total + 5, 0)
  const density = zNm.map((z) => 0.2 + 3 * Math.exp((-(z - total / 2) * (z - total / 2)) / 6))
  return { zNm: Float64Array.from(zNm), edge: Float64Array.from(edges), densityPerNm: Float64Array.from(density) }
}

export function sampleResult(candidates: readonly Candidate[] = [sampleCandidate()]): JobResult {
  return {
    name: 'cold-collector-80',
    folder: 'results/cold-collector-80',
    candidates,
    record: {
      ...{ engine: '0.1.0', kernel: 'ts', job_hash: 'ab', resume_hash: 'cd', seed: 11, method: 'sampled', units: 64 },
      ...{
        starts_in_best: 40,
        unseen_share: 0.125,
        merit_after_tenths: [0.5, 0.1],
        non_dominated: [],
        stacks: 630,
        examined: 5000,
        cut: { points: 3000 },
        statement: 'sampled',
      },
      ...{ stopped_early: false, seconds: 1.5 },
    },
    notes: ['12.0 nm of well were rounded to 42 ML.'],
  }
}

export function evenly(from: number, to: number, count: number): number[] {
  return Array.from({ length: count }, (_, i) => from + ((to - from) * i) / (count - 1))
}

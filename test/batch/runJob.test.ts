import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import { parse } from 'csv-parse/sync'
import { describe, expect, it } from 'vitest'
import { readJob, readLayers, resonances, runJob, spectrum, stackOf } from '../../src/index.js'
import { emptyFolder, smallJob, unitsIn, withJob } from '../cli/commandLine.js'

type Row = Record<string, string>
const rows = (...path: string[]): Row[] => parse(readFileSync(join(...path)), { columns: true, bom: true })
const cell = (text: string) => Number(text)
/** A cell in meV moves the point of the eV number: moving it back gives the very double. */
const ev = (text: string) => Number(`${text}e-3`)

describe('what a run leaves', async () => {
  const job = await readJob(join(withJob(), 'job.yaml'))
  const { folder, candidates } = await runJob(job, { resultsDir: emptyFolder() })
  const list = rows(folder, 'candidates.csv')
  const places = list.map(({ rank }) => join(folder, `candidate-${rank.padStart(2, '0')}`))

  it('has spectra that are those of the stack that layers.csv rebuilds, number by number', async () => {
    expect(list.length).toBeGreaterThan(3)
    for (const place of places) {
      const stack = stackOf(job, await readLayers(join(place, 'layers.csv')))
      const table = rows(place, 'spectrum.csv')
      const { T, R, log10T } = spectrum(
        stack,
        table.map((row) => ev(row.energy_meV)),
      )
      expect(table.map((row) => cell(row.T))).toEqual([...T])
      expect(table.map((row) => cell(row.R))).toEqual([...R])
      expect(table.map((row) => cell(row.log10_T))).toEqual([...log10T])
    }
  })

  it('has the resonances of that stack, number by number', async () => {
    for (const place of places) {
      const stack = stackOf(job, await readLayers(join(place, 'layers.csv')))
      const table = rows(place, 'resonances.csv')
      const poles = resonances(stack, job.scanEv)
      expect(table.map((row) => ev(row.energy_meV))).toEqual(poles.map(({ energyEv }) => energyEv))
      expect(table.map((row) => ev(row.width_meV))).toEqual(poles.map(({ widthEv }) => widthEv))
      expect(table.map((row) => cell(row.peak_T))).toEqual(poles.map(({ peakT }) => peakT))
    }
  })

  it('has peaks where the library finds T greatest, at half height where it says', async () => {
    for (const [i, row] of list.entries()) {
      const stack = stackOf(job, await readLayers(join(places[i], 'layers.csv')))
      const at = ev(row.peak_meV)
      const near = Array.from({ length: 401 }, (_, k) => at + ((k - 200) / 200) * 0.1 * ev(row.fwhm_meV))
      const { T } = spectrum(stack, [at, ...near])
      expect(cell(row.peak_T)).toBeCloseTo(T[0], 12)
      for (const other of T) expect(other).toBeLessThanOrEqual(T[0] + 1e-12)
      const { lowEv, highEv } = candidates[i].evaluation.peak!
      expect(highEv - lowEv).toBeCloseTo(ev(row.fwhm_meV), 15)
      for (const half of spectrum(stack, [lowEv, highEv]).T) expect(half).toBeCloseTo(T[0] / 2, 9)
    }
  })

  it('has audits that are those of doubles, and widths that are whole monolayers', async () => {
    for (const [i, row] of list.entries()) {
      expect(cell(row.flux_error)).toBeLessThan(1e-12)
      expect(cell(row.path_error)).toBeLessThan(1e-10)
      const layers = await readLayers(join(places[i], 'layers.csv'))
      expect(layers.every(({ ml }) => Number.isInteger(ml))).toBe(true)
    }
  })

  it('integrates to one: abs(u)² over the layers', () => {
    for (const { profile, layers } of candidates) {
      const { zNm, densityPerNm } = profile
      const total = layers.reduce((sum, { widthNm }) => sum + widthNm, 0)
      let integral = 0
      for (let i = 1; i < zNm.length; i++) {
        if (zNm[i - 1] < -1e-9 || zNm[i] > total + 1e-9) continue
        integral += 0.5 * (densityPerNm![i] + densityPerNm![i - 1]) * (zNm[i] - zNm[i - 1])
      }
      // The trapezium rule over steps of 0.1 nm.
      expect(integral).toBeCloseTo(1, 3)
    }
  })
})

describe('a run that must be done by a time', () => {
  it('that is past covers the units that it has, lists what they found, and goes on later', async () => {
    const job = await readJob(join(withJob(), 'job.yaml'))
    const resultsDir = emptyFolder()
    const early = await runJob(job, { resultsDir, until: new Date(0) })
    expect(early.record.stopped_early).toBe(true)
    expect(early.record.units).toBeGreaterThan(0)
    expect(early.record.units).toBeLessThan(10)
    expect(early.candidates.length).toBeGreaterThan(0)
    const whole = await runJob(job, { resultsDir })
    expect(whole.record).toMatchObject({ stopped_early: false, units: 64 })
    expect(unitsIn(whole.folder)).toBe(64)
  })
})

describe('progress', () => {
  it('counts every unit and every stack grown, and names the best so far', async () => {
    const job = await readJob(join(withJob(smallJob.replace('trials: 64', 'trials: 8')), 'job.yaml'))
    const seen: string[] = []
    await runJob(job, {
      resultsDir: emptyFolder(),
      progress: ({ phase, done, total, bestMeets }) => seen.push(`${phase} ${done}/${total} ${bestMeets}`),
    })
    expect(seen[0]).toBe('search 0/64 false')
    expect(seen).toContain('search 64/64 true')
    expect(seen.filter((line) => line.startsWith('yield 36/36'))).toHaveLength(1)
    expect(seen.at(-1)).toMatch(/^results/)
  })
})

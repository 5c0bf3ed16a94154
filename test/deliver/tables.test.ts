import { parse } from 'csv-parse/sync'
import { describe, expect, it } from 'vitest'
import { candidatesCsv, layersCsv, profileCsv, resonancesCsv, spectrumCsv } from '../../src/deliver/index.js'
import { parseLayers } from '../../src/job/index.js'
import { demands, peak, sampleCandidate, sampleJob, sampleLayers, sampleSpectrum } from './sampleNight.js'

const ids = demands.map(({ id }) => id)

function rowsOf(text: string): Record<string, string>[] {
  return parse(text, { columns: true })
}

function headOf(text: string): string {
  return text.slice(0, text.indexOf('\r\n'))
}

describe('candidatesCsv', () => {
  it('has the columns of the contract, two for each demand', () => {
    expect(headOf(candidatesCsv([sampleCandidate()], ids, 'electron'))).toBe(
      'rank,id,listed_as,meets,merit,margin,yield_pct,yield_low_pct,yield_high_pct,trials,peak_meV,fwhm_meV,peak_T,' +
        'd1_reached,d1_residual,d2_reached,d2_residual,d3_reached,d3_residual,limiting_demand,total_nm,layers,compositions,' +
        'worst_layer,worst_shift_meV,flux_error,path_error,stack',
    )
  })

  it('has a header even when there is no candidate', () => {
    expect(candidatesCsv([], ids, 'electron')).toBe(
      `${headOf(candidatesCsv([sampleCandidate()], ids, 'electron'))}\r\n`,
    )
  })

  it('holds the figures to the last bit', () => {
    const candidate = sampleCandidate()
    const [row] = rowsOf(candidatesCsv([candidate], ids, 'electron'))
    expect(row).toMatchObject({ rank: '1', id: candidate.id, listed_as: 'best', meets: 'yes', limiting_demand: 'd1' })
    expect(row).toMatchObject({ layers: '3', compositions: '1', worst_layer: 'well', worst_shift_meV: '-1.6' })
    expect(Number(`${row.peak_meV}e-3`)).toBe(peak.energyEv)
    expect(Number(`${row.fwhm_meV}e-3`)).toBe(peak.fwhmEv)
    expect(Number(`${row.d1_reached}e-3`)).toBe(peak.energyEv)
    expect(Number(row.peak_T)).toBe(peak.T)
    expect(Number(row.d2_reached)).toBe(0.0006202906946)
    expect(Number(row.total_nm)).toBe(candidate.totalNm)
    expect(Number(row.flux_error)).toBe(candidate.fluxError)
    expect(row.stack).toBe(candidate.stack)
  })

  it('leaves empty what was not computed: no peak, no yield, no margin', () => {
    const bare = sampleCandidate({
      ...{ margin: null, yield: null, limitingDemand: null, worstLayer: null, worstShiftEv: null },
      evaluation: {
        merit: 10,
        met: false,
        demands: [{ id: 'd1', kind: 'peak', reached: null, rms: 10, met: false, extremeEv: null, peak: null }],
        peak: null,
      },
    })
    const [row] = rowsOf(candidatesCsv([bare], ids, 'electron'))
    expect(row.meets).toBe('no')
    for (const name of ['margin', 'yield_pct', 'trials', 'peak_meV', 'peak_T', 'd1_reached', 'worst_shift_meV']) {
      expect(row[name], name).toBe('')
    }
    expect(row.d1_residual).toBe('10')
  })
})

describe('layersCsv', () => {
  it('has the columns of the contract', () => {
    expect(headOf(layersCsv(sampleLayers(), sampleJob(), peak.energyEv))).toBe(
      'no,from_substrate,id,material,x,ml,width_nm,potential_eV,mass_rel,alpha_per_eV,seconds,total_nm,tolerance_nm,shift_meV',
    )
  })

  it('runs from the substrate up with a running total, and numbers the layers from the entry', () => {
    const layers = sampleLayers()
    const rows = rowsOf(layersCsv(layers, sampleJob(), peak.energyEv))
    expect(rows.map(({ from_substrate }) => from_substrate)).toEqual(['1', '2', '3'])
    expect(rows.map(({ no }) => no)).toEqual(['3', '2', '1'])
    expect(rows.map(({ id }) => id)).toEqual(['L3', 'well', 'outer'])
    expect(Number(rows[0].total_nm)).toBe(layers[2].widthNm)
    expect(Number(rows[2].total_nm)).toBeCloseTo(layers[0].widthNm + layers[1].widthNm + layers[2].widthNm, 12)
  })

  it('rebuilds material, composition, monolayers and the medium to the last bit', () => {
    const layers = sampleLayers()
    for (const row of rowsOf(layersCsv(layers, sampleJob(), peak.energyEv))) {
      const { choice, resolved, count, widthNm } = layers[Number(row.no) - 1]
      if (choice.kind !== 'material') throw new Error('The sample has materials only.')
      expect([row.material, row.x]).toEqual([choice.material, choice.x === null ? '' : String(choice.x)])
      expect([Number(row.ml), Number(row.width_nm)]).toEqual([count, widthNm])
      if (resolved.kind !== 'electron') throw new Error('The sample is of electrons.')
      const { potentialEv, massRel, alphaPerEv } = resolved.region
      expect([row.potential_eV, row.mass_rel, row.alpha_per_eV].map(Number)).toEqual([potentialEv, massRel, alphaPerEv])
    }
  })

  it('is read back from entry to exit, whatever the direction of growth', () => {
    const layers = sampleLayers()
    const fromEntry = layers.map((each, i) => ({ ...each, fromSubstrate: i + 1 }))
    for (const text of [
      layersCsv(layers, sampleJob(), peak.energyEv),
      layersCsv(fromEntry, sampleJob(), peak.energyEv),
    ]) {
      const rows = parseLayers(text, 'layers.csv')
      expect(rows.map(({ id }) => id)).toEqual(layers.map(({ id }) => id))
      expect(rows.map(({ ml, widthNm }) => [ml, widthNm])).toEqual(layers.map(({ count, widthNm }) => [count, widthNm]))
      expect(rows.map(({ medium }) => medium)).toEqual(layers.map(({ choice }) => choice))
    }
  })

  it('leaves ml empty for a medium by numbers and for a width that is no count of monolayers', () => {
    const [layer] = sampleLayers()
    const choice = { kind: 'numbers', name: 'low', potentialEv: 0.115, massRel: 0.0795, alphaPerEv: 0 } as const
    const byNumbers = { ...layer, choice, resolved: { ...layer.resolved, monolayerNm: null, strain: null } }
    const inNm = { ...layer, stepNm: 0.1, count: 31, widthNm: 3.1 }
    expect(rowsOf(layersCsv([byNumbers], sampleJob(), peak.energyEv))[0]).toMatchObject({
      material: 'low',
      x: '',
      ml: '',
    })
    expect(rowsOf(layersCsv([inNm], sampleJob(), peak.energyEv))[0]).toMatchObject({
      material: 'AlGaAs',
      x: '0.35',
      ml: '',
      width_nm: '3.1',
    })
  })
})

describe('spectrumCsv', () => {
  it('holds T, R and log10 T of every energy to the last bit', () => {
    const spectrum = sampleSpectrum([[0.08, 0.001]])
    const text = spectrumCsv([spectrum], 'electron')
    const rows = rowsOf(text)
    expect(headOf(text)).toBe('energy_meV,T,R,log10_T')
    expect(rows).toHaveLength(spectrum.T.length)
    rows.forEach((row, i) => {
      expect(Number(`${row.energy_meV}e-3`)).toBe(spectrum.energyEv[i])
      expect([row.T, row.R, row.log10_T].map(Number)).toEqual([spectrum.T[i], spectrum.R[i], spectrum.log10T[i]])
    })
  })

  it('names the condition only where there are several', () => {
    const rest = sampleSpectrum([[0.08, 0.001]], 'rest', 5)
    const on = sampleSpectrum([[0.07, 0.001]], 'on', 5)
    const text = spectrumCsv([rest, on], 'electron')
    expect(headOf(text)).toBe('condition,energy_meV,T,R,log10_T')
    expect(new Set(rowsOf(text).map(({ condition }) => condition))).toEqual(new Set(['rest', 'on']))
  })

  it('leaves log10 T empty where T is 0, and keeps it where T is too small for a double', () => {
    const spectrum = {
      condition: '',
      energyEv: Float64Array.of(0.01, 0.02),
      T: Float64Array.of(0, 0),
      R: Float64Array.of(1, 1),
      A: null,
      log10T: Float64Array.of(Number.NEGATIVE_INFINITY, -412.5),
    }
    expect(rowsOf(spectrumCsv([spectrum], 'electron')).map(({ log10_T }) => log10_T)).toEqual(['', '-412.5'])
  })
})

describe('resonancesCsv and profileCsv', () => {
  it('have the columns of the contract, also when there is no resonance', () => {
    expect(resonancesCsv([])).toBe('energy_meV,width_meV,entry_width_meV,exit_width_meV,peak_T\r\n')
    expect(headOf(profileCsv(sampleCandidate().profile, 'electron'))).toBe('z_nm,edge_meV,density_per_nm')
  })

  it('keep a width of 1e-13 meV apart from 0', () => {
    const pole = { energyEv: 0.08, widthEv: 1.25e-16, entryWidthEv: 1e-16, exitWidthEv: 2.5e-17, peakT: 0.64 }
    expect(resonancesCsv([pole]).split('\r\n')[1]).toBe('80,1.25e-13,1e-13,2.5e-14,0.64')
  })

  it('leave the density empty without a peak', () => {
    const profile = { ...sampleCandidate().profile, densityPerNm: null }
    expect(rowsOf(profileCsv(profile, 'electron')).every(({ density_per_nm }) => density_per_nm === '')).toBe(true)
  })
})

import { readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { electronSystem } from '../../src/model/electronSystem.js'
import { resonances } from '../../src/wave/index.js'

interface ReferenceRegion {
  V: number
  m: number
  alpha?: number
  hard_wall?: boolean
}

interface ReferenceCase {
  id: string
  kind: 'electron' | 'optical'
  left: ReferenceRegion
  layers: (ReferenceRegion & { d: number })[]
  right: ReferenceRegion
  k_par?: number
  pole_window: [number, number]
  pole_depth: number
  poles?: { E_r_eV: string; Gamma_eV: string }[]
}

const file = new URL('./reference-open.json', import.meta.url)
const cases: ReferenceCase[] = JSON.parse(readFileSync(file, 'utf8')).cases
const region = (r: ReferenceRegion) => ({ potentialEv: r.V, massRel: r.m, alphaPerEv: r.alpha ?? 0 })

describe('resonances against the reference poles (60 digits)', () => {
  for (const c of cases.filter((c) => c.poles && c.kind === 'electron')) {
    it(`finds the ${c.poles!.length} poles of ${c.id} and no other`, () => {
      const system = electronSystem({
        entry: region(c.left),
        layers: c.layers.map((l) => ({ ...region(l), widthNm: l.d })),
        exit: c.right.hard_wall ? 'hard wall' : region(c.right),
        inPlaneKPerNm: c.k_par,
      })
      const { poles } = resonances(system, c.pole_window, { depthEv: c.pole_depth })
      expect(poles).toHaveLength(c.poles!.length)
      poles.forEach((pole, i) => {
        const width = Number(c.poles![i].Gamma_eV)
        expect(Math.abs(pole.energyEv - Number(c.poles![i].E_r_eV))).toBeLessThan(1e-13)
        expect(Math.abs(pole.widthEv - width) / width).toBeLessThan(1e-10)
        expect(Math.abs(pole.entryWidthEv + pole.exitWidthEv - width) / width).toBeLessThan(1e-10)
      })
    })
  }
})

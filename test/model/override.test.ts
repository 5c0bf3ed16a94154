import { describe, expect, test } from 'vitest'
import { problemOf } from '../../src/batch/problem.js'
import { JobError, parseLayers, readJobText } from '../../src/job/index.js'
import { resolveRegion, spectrum, stackOf } from '../../src/model/index.js'

/** Single numbers of the user's own in place of listed ones. */

const job = (media: string, barrier: string, kind = 'electron') =>
  readJobText(
    `format: 1
name: any
kind: ${kind}
media: { ${media} }
stack:
  entry: GaAs
  layers: [{ id: b, material: ${barrier}, width: 4..6 ML }, { material: GaAs, width: 16 ML }, { like: b }]
  exit: GaAs
target: { scan: 20..300 meV, demands: [{ peak: 120 meV, within: 30 meV }] }`,
    'any.yaml',
  )

const listed = job('', 'AlAs')
const soft = job('soft: { material: AlAs, mass: 0.11, potential: 0.95 eV }', 'soft')

describe('a built-in material with numbers of the job', () => {
  test('has those, and everything else as listed', () => {
    const [a, b] = [listed, soft].map((one) => {
      const { design } = problemOf(one)
      const [{ choice, resolved, widthNm }] = design.layers(new Int32Array(design.places.length))
      const [situation] = design.situations
      if (situation.kind !== 'electron') throw new Error('electrons')
      return { region: resolveRegion(choice, situation).region, monolayerNm: resolved.monolayerNm, widthNm }
    })
    expect(b.region).toEqual({ ...a.region, massRel: 0.11, potentialEv: 0.95 })
    expect([b.monolayerNm, b.widthNm]).toEqual([a.monolayerNm, a.widthNm])
  })

  test('is another stack, under its own name', () => {
    const [a, b] = [listed, soft].map((one) => problemOf(one).design)
    const first = new Int32Array(a.places.length)
    expect(b.id(first)).not.toBe(a.id(first))
    expect(b.text(first)).toContain('soft 4 / GaAs 16 / soft 4 ML')
  })

  test('comes back from a sheet, monolayers and all', () => {
    const { design } = problemOf(soft)
    const first = new Int32Array(design.places.length)
    const [{ widthNm, resolved }] = design.layers(first)
    if (resolved.kind !== 'electron') throw new Error('electrons')
    const { massRel, alphaPerEv } = resolved.region
    const sheet = `material,ml,width_nm,potential_eV,mass_rel,alpha_per_eV\nsoft,4,${widthNm},0.95,${massRel},${alphaPerEv}\n`
    const [row] = parseLayers(sheet, 'layers.csv')
    expect(row).toMatchObject({
      widthNm,
      ml: null,
      medium: { kind: 'numbers', name: 'soft', potentialEv: 0.95, massRel: 0.11 },
    })
    const whole = stackOf(soft, [row])
    expect(spectrum(whole, [0.1]).T[0]).toBeGreaterThan(0)
  })

  test('of light keeps the dispersion that it does not replace', () => {
    const light = (medium: string) =>
      readJobText(
        `format: 1\nname: any\nkind: light\nmedia: { thin: { ${medium} } }\nstack: { entry: air, layers: [{ material: thin, width: 100 nm }], exit: N-BK7, reference: 633 nm }\ntarget: { scan: 600..700 nm, demands: [{ pass: 620..640 nm, above: 0.9 }] }`,
        'any.yaml',
      )
    const at = (one: ReturnType<typeof light>) => {
      const rows = problemOf(one)
        .design.layers(new Int32Array(0))
        .map(({ id, choice, widthNm }) => ({ where: '', id, medium: choice, ml: null, widthNm }))
      return spectrum(stackOf(one, rows as never), [633])
    }
    expect(at(light('material: Ag, index: 0.05')).A[0]).toBeLessThan(at(light('material: Ag, index: 0.1')).A[0])
    expect(at(light('material: SiO2, extinction: 0.01')).A[0]).toBeGreaterThan(0)
  })

  const wrong: Record<string, string> = {
    'soft: { material: AlAs }': 'soft is AlAs as it is listed',
    'soft: { material: AlGaAs, mass: 0.1 }': 'AlGaAs is an alloy and needs a composition',
    'soft: { material: AlAz, mass: 0.1 }': 'Unknown material "AlAz"',
    'soft: { material: AlAs, mass: 0.1..0.2 step 0.01 }': 'is a range, where one number is expected',
    'soft: { x: 0.3, potential: 0.2 eV, mass: 0.1 }': '"x" belongs to a material',
  }
  for (const [media, sentence] of Object.entries(wrong)) {
    test(`${media} is an error`, () => {
      expect(() => job(media, 'soft')).toThrow(JobError)
      expect(() => job(media, 'soft')).toThrow(sentence)
    })
  }
})

import { mkdtemp, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { describe, expect, test } from 'vitest'
import { LayersError, parseLayers, readLayers } from '../../src/job/index.js'

const sheet = `no,from_substrate,id,material,x,ml,width_nm,potential_eV,mass_rel,alpha_per_eV,seconds,total_nm,tolerance_nm,shift_meV
3,1,L3,AlGaAs,0.35,12,,0.31,0.09605,0.5,11.1,3.4,,
2,2,well,GaAs,,18,,0,0.067,0.66,25,8.5,,
1,3,outer,AlGaAs,0.35,12,,0.31,0.09605,0.5,11.1,11.9,,
`

function problems(text: string): readonly string[] {
  try {
    parseLayers(text, 'own.csv')
  } catch (error) {
    expect(error).toBeInstanceOf(LayersError)
    return (error as LayersError).problems
  }
  return []
}

describe('readLayers', () => {
  test('a sheet that runs from the substrate up comes back from entry to exit', () => {
    const rows = parseLayers(sheet, 'layers.csv')
    expect(rows.map(({ id }) => id)).toEqual(['outer', 'well', 'L3'])
    expect(rows[0]).toEqual({
      where: 'layers.csv:4',
      id: 'outer',
      medium: { kind: 'material', material: 'AlGaAs', x: 0.35 },
      ml: 12,
      widthNm: null,
    })
    expect(rows[1].medium).toEqual({ kind: 'material', material: 'GaAs', x: null })
  })

  test('without `no` rows run from entry to exit as they stand; counts need not be whole', () => {
    const rows = parseLayers('material,x,ml\nAlGaAs,0.3,11.7\nGaAs,,18\n', 'own.csv')
    expect(rows.map(({ ml, id }) => [ml, id])).toEqual([
      [11.7, null],
      [18, null],
    ])
  })

  test('numbers, with and without the name of the user’s own medium', () => {
    const rows = parseLayers('material,potential_eV,mass_rel,width_nm\nlow,0.115,0.0795,3.5\n,0,0.067,6\n', 'own.csv')
    expect(rows[0].medium).toEqual({ kind: 'numbers', name: 'low', potentialEv: 0.115, massRel: 0.0795, alphaPerEv: 0 })
    expect(rows[1].medium).toMatchObject({ name: null, massRel: 0.067 })
    expect(rows[0]).toMatchObject({ ml: null, widthNm: 3.5 })
  })

  test('byte order mark, CRLF, quotes, blank lines and spaces of a spreadsheet do no harm', () => {
    const rows = parseLayers('\uFEFFmaterial,x,ml\r\n"AlGaAs", 0.3 ,12\r\n\r\nGaAs,,18\r\n', 'own.csv')
    expect(rows).toHaveLength(2)
    expect(rows[1].where).toBe('own.csv:4')
  })

  test('reads a file', async () => {
    const folder = await mkdtemp(join(tmpdir(), 'layers-'))
    try {
      await writeFile(join(folder, 'layers.csv'), sheet)
      expect(await readLayers(join(folder, 'layers.csv'))).toHaveLength(3)
    } finally {
      await rm(folder, { recursive: true })
    }
  })

  test('a file that is not there is told by its name', async () => {
    await expect(readLayers('no-such.csv')).rejects.toThrow("no-such.csv  The file can't be read: ENOENT")
  })

  test.each([
    ['', 'own.csv:1  The file is empty'],
    ['material,x,ml\n', 'own.csv:1  There is a header and no layer'],
    ['material,x,width\nGaAs,,5\n', 'own.csv:1  There is no column ml or width_nm.'],
    ['x,ml\n0.3,5\n', 'own.csv:1  There is no column material, potential_eV or index.'],
    ['material,x,ml\nGaAlAs,0.3,5\n', 'own.csv:2  "GaAlAs" is no built-in material. Did you mean AlGaAs'],
    ['material,x,ml\nglass,,5\n', 'own.csv:2  "glass" is no built-in material. Built in: GaAs'],
    ['material,x,ml\nAlGaAs,,5\n', 'own.csv:2  x is empty. Give 0..1 (x is the share of Al'],
    ['material,x,ml\nAlGaAs,1.5,5\n', 'own.csv:2  x is "1.5". Give 0..1'],
    ['material,x,ml\nGaAs,0.3,5\n', 'own.csv:2  x is "0.3", but GaAs has a fixed composition'],
    ['material,x,ml\nGaAs,,-5\n', 'own.csv:2  ml is "-5". Give 0 or more monolayers'],
    ['material,width_nm\nGaAs,wide\n', 'own.csv:2  width_nm is "wide". Give 0 nm or more'],
    ['material,width_nm\nGaAs,Infinity\n', 'own.csv:2  width_nm is "Infinity"'],
    ['material,ml,width_nm\nGaAs,,\n', 'own.csv:2  ml and width_nm are both empty'],
    ['potential_eV,mass_rel,ml\n0.1,0.07,5\n', 'own.csv:2  ml is 5, but a medium given by numbers has no monolayer'],
    ['potential_eV,mass_rel,width_nm\n0.1,0,5\n', 'own.csv:2  mass_rel is "0". Give a number above 0'],
    ['potential_eV,mass_rel,width_nm\n0.1,,5\n', 'own.csv:2  mass_rel is empty'],
    ['no,material,ml\n1,GaAs,5\n1,GaAs,5\n', 'own.csv:3  no 1 is there twice'],
    ['no,material,ml\n,GaAs,5\n', 'own.csv:2  no is empty'],
    ['material,ml\n"GaAs,5\n', 'own.csv:'],
  ])('%j: %s', (text, message) => {
    const found = problems(text)
    expect(found).toHaveLength(1)
    expect(found[0]).toContain(message)
  })

  test('a misspelt column is told beside what is missing', () => {
    expect(problems('material,width_mm\nGaAs,5\n')[0]).toContain('"width_mm" may mean width_nm.')
  })

  test('all problems come together', () => {
    expect(
      problems('material,x,ml\nGaAlAs,0.3,5\nAlGaAs,,5\nGaAs,,-1\n').map((problem) => problem.slice(0, 9)),
    ).toEqual(['own.csv:2', 'own.csv:3', 'own.csv:4'])
  })
})

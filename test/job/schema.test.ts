import { describe, expect, test } from 'vitest'
import { JobError, jobReference, jobSchema, readJobText } from '../../src/job/index.js'

type Schema = {
  properties?: Record<string, Schema>
  additionalProperties?: Schema | boolean
  items?: Schema
  anyOf?: Schema[]
  $ref?: string
  $defs?: Record<string, Schema>
  description?: string
}

describe('the JSON Schema', () => {
  const schema = jobSchema() as Schema & { title: string }

  test('is plain JSON with a title and knows the keys of both kinds', () => {
    expect(JSON.parse(JSON.stringify(schema))).toEqual(schema)
    expect(schema.title).toBe('tunnelwright job')
    const keys = keysOf(schema, schema)
    for (const key of [
      ...['format', 'name', 'kind', 'note', 'temperature', 'stack', 'target', 'growth', 'search', 'deliver', 'media'],
      ...['conditions', 'bias', 'bias over', 'in-plane', 'angle', 'polarisation'],
      ...[
        'entry',
        'exit',
        'layers',
        'mirror',
        'rising',
        'mass',
        'strained to',
        'reference',
        'back',
        'thickness',
        'then',
      ],
      ...['id', 'material', 'x', 'width', 'like', 'times', 'pick', 'from', 'repeat', 'period', 'between', 'potential'],
      ...['alpha', 'index', 'extinction', 'table', 'scan', 'resolution', 'demands', 'weight', 'peak', 'band', 'within'],
      ...['fwhm', 'height', 'alone', 'top', 'ripple', 'pass', 'above', 'block', 'below', 'points', 'curve', 'at'],
      ...['quantity', 'accept', 'rms', 'starts at', 'sources', 'compositions', 'step', 'spread', 'rate', 'layer'],
      ...['trials', 'thinnest', 'total', 'method', 'effort', 'seed', 'candidates'],
    ]) {
      expect(keys, key).toContain(key)
    }
  })

  test('has a description and an example for every key, in the reference too', () => {
    const rows = jobReference()
      .split('\n')
      .filter((line) => line.startsWith('| `'))
    expect(rows.length).toBeGreaterThan(100)
    for (const row of rows) expect(row).toMatch(/^\| `[^`]+` \| [^|]{8,}.* \| `[^`]+: .+` \|$/)
  })

  test('describes every key of the top and of its sections', () => {
    for (const [name, section] of Object.entries(schema.properties ?? {})) {
      expect(section.description, name).toBeTruthy()
      for (const [key, inner] of Object.entries(section.properties ?? {})) {
        expect(inner.description ?? inner.$ref, `${name}.${key}`).toBeTruthy()
      }
    }
  })
})

describe('a key that electrons have not', () => {
  const text = `format: 1
name: halm-80
kind: electron
stack:
  entry: GaAs
  layers: [{ id: b, material: AlAs, width: 5 ML }]
  exit: GaAs
target:
  scan: 5..200 meV
  demands: [{ peak: 80 meV, within: 5 meV }]
`
  const ofLight: Record<string, string> = {
    angle: `${text}angle: 5 deg\n`,
    polarisation: `${text}polarisation: p\n`,
    table: `${text}media: { film: { table: film.csv } }\n`,
    index: text.replace('material: AlAs', 'index: 2.1'),
    reference: text.replace('exit:', 'reference: 633 nm\n  exit:'),
    back: text.replace('exit:', 'back: { thickness: 1 mm, then: GaAs }\n  exit:'),
    tooling: `${text}growth: { tooling: { AlAs: 1.05 } }\n`,
  }
  for (const [key, job] of Object.entries(ofLight)) {
    test(`${key} belongs to light`, () => {
      expect(errorOf(job).problems.map(({ rule }) => rule)).toContain(`"${key}" belongs to jobs with kind: light.`)
    })
  }
})

function keysOf(schema: Schema, root: Schema, seen = new Set<Schema>()): string[] {
  if (seen.has(schema)) return []
  seen.add(schema)
  const inner = [
    ...Object.values(schema.properties ?? {}),
    ...(schema.anyOf ?? []),
    ...(schema.items ? [schema.items] : []),
    ...(typeof schema.additionalProperties === 'object' ? [schema.additionalProperties] : []),
    ...(schema.$ref ? [root.$defs?.[schema.$ref.replace('#/$defs/', '')] ?? {}] : []),
  ]
  return [...Object.keys(schema.properties ?? {}), ...inner.flatMap((one) => keysOf(one, root, seen))]
}

function errorOf(text: string): JobError {
  try {
    readJobText(text, 'halm.yaml')
  } catch (error) {
    if (error instanceof JobError) return error
    throw error
  }
  throw new Error('The job was read.')
}

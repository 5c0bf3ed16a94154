import type { Problems } from './Problems.js'
import type { Path } from './YamlSource.js'

/**
 * Keys of the job format whose capability is not built yet. Each is reported with what to do instead, and taken out of the
 * value (in place), so that nothing else trips over it. When a capability comes, its line goes.
 */
const refused: Readonly<Record<Room, Readonly<Record<string, string>>>> = {
  job: {
    angle: 'Take it out: it belongs to jobs with kind: light.',
    polarisation: 'Take it out: it belongs to jobs with kind: light.',
  },
  medium: {
    table: 'Give the numbers themselves: { potential: 0.2 eV, mass: 0.09 }.',
    index: 'Electrons need { potential: 0.2 eV, mass: 0.09 } instead.',
    extinction: 'Electrons need { potential: 0.2 eV, mass: 0.09 } instead.',
  },
  stack: {
    reference: 'Take it out: it belongs to jobs with kind: light.',
    back: 'Take it out: it belongs to jobs with kind: light.',
  },
  item: {
    index: 'Electrons need potential and mass instead.',
    extinction: 'Electrons need potential and mass instead.',
  },
  demand: {
    quantity: 'Take it out: demands are on T. R is 1 - T here.',
  },
  growth: {
    thinnest: 'Take it out: it belongs to jobs with kind: light. Set the least width on the layers.',
    total: 'Take it out: it belongs to jobs with kind: light. Set the greatest width on the layers.',
    index: 'Take it out: it belongs to jobs with kind: light.',
  },
  spread: { index: 'Take it out: it belongs to jobs with kind: light.' },
}

type Room = 'job' | 'medium' | 'stack' | 'item' | 'demand' | 'growth' | 'spread'
type Map = Record<string, unknown>

export function refuse(job: unknown, problems: Problems): void {
  visit(job, 'job', [])
  const { conditions, media, stack, target, growth } = (job ?? {}) as Record<string, Map | undefined>
  for (const name of Object.keys(conditions ?? {})) visit(conditions?.[name], 'job', ['conditions', name])
  for (const name of Object.keys(media ?? {})) visit(media?.[name], 'medium', ['media', name])
  visit(stack, 'stack', ['stack'])
  for (const side of ['entry', 'exit']) visit(stack?.[side], 'medium', ['stack', side])
  items(stack?.layers, ['stack', 'layers'])
  list(target?.demands).forEach((demand, i) => {
    visit(demand, 'demand', ['target', 'demands', i])
  })
  visit(growth, 'growth', ['growth'])
  visit(growth?.spread, 'spread', ['growth', 'spread'])

  function items(layers: unknown, path: Path): void {
    list(layers).forEach((item, i) => {
      if (typeof item !== 'object' || item === null) return
      const map = item as Map
      const here = [...path, i]
      visit(map, 'item', here)
      const { width, x, repeat } = map
      if (isMap(width)) refusal(map, 'width', 'A width tied alone, "width: { like: ... }",', tied, here)
      if (typeof width === 'string' && /\bqw\b/.test(width))
        refusal(map, 'width', 'A width in qw', 'Write it in ML or nm.', here)
      if (isMap(x) && x.like !== undefined)
        refusal(map, 'x', 'A composition tied alone, "x: { like: ... }",', tied, here)
      if (isMap(repeat)) refusal(map, 'repeat', 'A tied count, "repeat: { like: ... }",', 'Write the number.', here)
      items(map.period, [...here, 'period'])
      items(map.between, [...here, 'between'])
    })
  }

  function visit(value: unknown, room: Room, path: Path): void {
    if (!isMap(value)) return
    for (const key of Object.keys(value)) {
      if (Object.hasOwn(refused[room], key)) refusal(value, key, `"${key}"`, refused[room][key], path)
    }
  }

  function refusal(map: Map, key: string, what: string, instead: string, path: Path, atKey = true): void {
    const rule = `${what} is part of the job format, but this version can't run it yet.`
    if (atKey) problems.addAtKey([...path, key], rule, instead)
    else problems.add([...path, key], rule, instead)
    delete map[key]
  }
}

const tied = 'Write "like: id" to tie material, composition and width together, or give it a range of its own.'

function isMap(value: unknown): value is Map {
  return typeof value === 'object' && value !== null && !Array.isArray(value)
}

function list(value: unknown): readonly unknown[] {
  return Array.isArray(value) ? value : []
}

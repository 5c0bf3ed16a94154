import type { Kind } from './job.js'
import type { Problems } from './Problems.js'
import type { Path } from './YamlSource.js'

/** Keys that belong to one kind of job, with what to do in the other. */
const ofLight: Keys = {
  job: { angle: 'Take it out.', polarisation: 'Take it out.' },
  medium: { table: byRegion(), index: byRegion(), extinction: byRegion() },
  stack: { reference: 'Take it out.', back: 'Take it out.' },
  item: {
    index: 'Electrons need potential and mass instead.',
    extinction: 'Electrons need potential and mass instead.',
  },
  growth: { index: 'Take it out.', tooling: 'Take it out.' },
}

const ofElectrons: Keys = {
  job: {
    temperature: 'Take it out: the listed indices are those of room temperature.',
    bias: 'Take it out.',
    'in-plane': 'Write "angle: 45 deg".',
    'bias over': 'Take it out.',
  },
  medium: {
    potential: byIndex(),
    mass: byIndex(),
    alpha: byIndex(),
    x: 'Take it out: media of light have no composition.',
  },
  stack: { mass: 'Take it out.', 'strained to': 'Take it out.' },
  item: {
    potential: byIndex(),
    mass: byIndex(),
    alpha: byIndex(),
    x: 'Take it out: media of light have no composition.',
  },
  growth: {
    compositions: 'Take it out: media of light have no composition.',
    strain: 'Take it out: films have no lattice.',
    critical: 'Take it out: films have no lattice.',
  },
  spread: { x: 'Write "growth: { index: 0.002 }" for the spread of an index.' },
}

function byRegion(): string {
  return 'Give the numbers of electrons: { potential: 0.2 eV, mass: 0.09 }.'
}

function byIndex(): string {
  return 'Light needs { index: 1.46, extinction: 0.001 } instead.'
}

type Room = 'job' | 'medium' | 'stack' | 'item' | 'growth' | 'spread'
type Keys = { readonly [room in Room]?: Readonly<Record<string, string>> }
type Map = Record<string, unknown>

/**
 * Reports keys that belong to the other kind of job, each with what to do instead, and takes them out of the value (in place), so that
 * nothing else trips over them.
 */
export function refuse(job: unknown, kind: Kind, problems: Problems): void {
  const keys = kind === 'electron' ? ofLight : ofElectrons
  const owner = kind === 'electron' ? 'light' : 'electron'
  visit(job, 'job', [])
  const { conditions, media, stack, growth } = (job ?? {}) as Record<string, Map | undefined>
  for (const name of Object.keys(conditions ?? {})) visit(conditions?.[name], 'job', ['conditions', name])
  for (const name of Object.keys(media ?? {})) visit(media?.[name], 'medium', ['media', name])
  visit(stack, 'stack', ['stack'])
  for (const side of ['entry', 'exit']) visit(stack?.[side], 'medium', ['stack', side])
  items(stack?.layers, ['stack', 'layers'])
  visit(growth, 'growth', ['growth'])
  visit(growth?.spread, 'spread', ['growth', 'spread'])

  function items(layers: unknown, path: Path): void {
    list(layers).forEach((item, i) => {
      if (typeof item !== 'object' || item === null) return
      const map = item as Map
      const here = [...path, i]
      visit(map, 'item', here)
      items(map.period, [...here, 'period'])
      items(map.between, [...here, 'between'])
    })
  }

  function visit(value: unknown, room: Room, path: Path): void {
    if (!isMap(value)) return
    for (const key of Object.keys(value)) {
      const remedy = keys[room] && Object.hasOwn(keys[room], key) ? keys[room][key] : null
      if (remedy === null) continue
      problems.addAtKey([...path, key], `"${key}" belongs to jobs with kind: ${owner}.`, remedy)
      delete value[key]
    }
  }
}

function isMap(value: unknown): value is Map {
  return typeof value === 'object' && value !== null && !Array.isArray(value)
}

function list(value: unknown): readonly unknown[] {
  return Array.isArray(value) ? value : []
}

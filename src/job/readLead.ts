import type { Loose } from './checkShape.js'
import type { MediumOption } from './job.js'
import type { Reader } from './Reader.js'
import { isAlloy, type KnownMedia, readComposition, readNamed, readNumbers } from './readMedia.js'
import type { JobAsWritten } from './schema.js'

type Lead = Loose<JobAsWritten['stack']['entry']>

/** A lead: a material, numbers, or (exit only) `hard wall`. Nothing about it may be left to the search. */
export function readLead(
  lead: Lead | undefined,
  side: 'back' | 'entry' | 'exit',
  media: KnownMedia,
  reader: Reader,
): MediumOption | 'hard wall' | null {
  const path = side === 'back' ? ['stack', 'back', 'then'] : ['stack', side]
  const { problems } = reader
  if (lead === undefined) return null
  if (typeof lead === 'string') {
    if (lead === 'hard wall') {
      if (media.kind === 'light') {
        problems.add(path, 'A hard wall is a lead of electrons.', 'Name a medium, like "air", or a metal, like "Ag".')
        return null
      }
      if (side === 'exit') return lead
      problems.add(
        path,
        "The entry can't be a hard wall: the wave comes from there.",
        'Make the hard wall the exit, or name a material.',
      )
      return null
    }
    if (isAlloy(lead, media)) {
      problems.add(
        path,
        `${lead} is an alloy and needs a composition.`,
        `Write "${side}: { material: ${lead}, x: 0.3 }".`,
      )
      return null
    }
    return fixed(readNamed(lead, path, null, media, reader))
  }
  const byNumbers = (['potential', 'mass', 'alpha', 'index', 'extinction'] as const).filter(
    (key) => lead[key] !== undefined,
  )
  if (lead.material === undefined) {
    if (problems.source.has([...path, 'material'])) return null
    if (problems.source.has([...path, 'x'])) {
      problems.addAtKey(
        [...path, 'x'],
        '"x" belongs to a material, and none is named.',
        'Add "material: AlGaAs", or take x out.',
      )
    }
    return fixed(readNumbers(lead, path, null, media.kind, reader))
  }
  for (const key of byNumbers) {
    problems.addAtKey(
      [...path, key],
      `"${key}" has no place beside "material".`,
      'Give a material or numbers, not both.',
    )
  }
  const name = lead.material
  const hasX = media.kind === 'electron' && problems.source.has([...path, 'x'])
  const x = readComposition(lead.x, [...path, 'x'], reader)
  const named = readNamed(name, [...path, 'material'], x, media, reader)
  if (isAlloy(name, media) && !hasX) {
    problems.add([...path, 'x'], `${name} is an alloy and needs a composition.`, 'Add "x: 0.3".')
    return null
  }
  if (named && !isAlloy(name, media) && hasX) {
    problems.addAtKey([...path, 'x'], `${name} has no composition to choose.`, 'Take x out.')
  }
  if (isAlloy(name, media) && x === null) return null
  return fixed(named)

  function fixed(option: MediumOption | null): MediumOption | null {
    if (option === null) return null
    if (side === 'entry' && option.kind === 'material' && option.own?.potentialEv !== undefined) {
      const rule = `${option.own.name} has an edge of its own, but every energy counts from the entry's edge.`
      problems.add(path, rule, 'Take "potential" out of it, or make another medium the entry.')
      return null
    }
    if (listsOf(option).every((list) => list.length === 1)) return option
    problems.add(
      path,
      `The ${side === 'back' ? 'medium behind the exit' : side} is a lead and has to be fixed; here it has several values.`,
      'Write single numbers.',
    )
    return null
  }
}

function listsOf(option: MediumOption): readonly (readonly number[])[] {
  switch (option.kind) {
    case 'material':
      return option.x === null ? [] : [option.x]
    case 'numbers':
      return [option.potentialEv, option.massRel, option.alphaPerEv]
    case 'index':
      return [option.index, option.extinction]
    case 'table':
      return []
  }
}

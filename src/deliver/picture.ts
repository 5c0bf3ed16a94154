import type { Job } from '../job/index.js'
import { cautions } from './cautions.js'
import { fitted, label, wrapped } from './label.js'
import { short } from './layerText.js'
import { palette } from './palette.js'
import { svgDocument } from './svg.js'
import type { Candidate } from './types.js'

export const pictureWidth = 800
const margin = 20
const textSpan = pictureWidth - 2 * margin
const lineHeight = 15

/** What stands between the head and the foot of a picture. */
export interface PictureBody {
  readonly height: number
  readonly defs: readonly string[]
  readonly parts: readonly string[]
}

/**
 * A picture of one candidate: whose it is at the top, what must be known of it and the cautions at the foot.
 *
 * @param what what it shows, for the title and `<title>`
 * @param description the picture in words, for those who can't see it
 * @param draw draws the body from `top` downwards; `key` goes in front of every id in it
 */
export function picture(
  job: Job,
  candidate: Candidate,
  what: string,
  description: string,
  draw: (top: number, key: string) => PictureBody,
): string {
  const key = `c${candidate.rank}-${candidate.id}-${what.replace(/[^a-z]/gi, '').toLowerCase()}`
  const stack = wrapped(`From entry to exit: ${candidate.stack}`, textSpan, 12, 2)
  const head = [
    label(margin, 30, fitted(`${job.name}, candidate ${candidate.rank}: ${what}`, textSpan, 17), {
      size: 17,
      bold: true,
    }),
    ...stack.map((line, i) => label(margin, 50 + i * lineHeight, line, { fill: palette.quiet })),
  ]
  const top = 50 + stack.length * lineHeight
  const body = draw(top, key)
  const lines = [
    ...candidate.notes.flatMap((note) => wrapped(`Note: ${note}`, textSpan, 11, 3)),
    ...cautions(job.kind).flatMap((line) => wrapped(line, textSpan, 11)),
    `Stack ${candidate.id}${operatingPoint(job)}.`,
  ]
  const footTop = top + body.height + 14
  const foot = lines.map((line, i) => label(margin, footTop + i * lineHeight, line, { size: 11, fill: palette.quiet }))
  const title = `${job.name}, candidate ${candidate.rank} (${candidate.id}): ${what}`
  return svgDocument(
    {
      width: pictureWidth,
      height: footTop + lines.length * lineHeight,
      title,
      description: [description, ...candidate.notes, ...cautions(job.kind)].join(' '),
      key,
    },
    body.defs,
    [...head, ...body.parts, ...foot],
  )
}

/** The temperature and bias of a job that has one condition; several are named in the picture itself. */
function operatingPoint({ kind, conditions }: Job): string {
  if (conditions.length !== 1) return ''
  const [{ temperatureK, biasV, angleDeg, polarisation }] = conditions
  if (kind === 'light') {
    const tilted = polarisation === 'mean' ? 'half s, half p' : `${polarisation}-polarised`
    return angleDeg === 0 ? ' at normal incidence' : ` at ${short(angleDeg)} degrees, ${tilted}`
  }
  return ` at ${short(temperatureK)} K${biasV === 0 ? '' : `, bias ${short(biasV * 1000)} mV`}`
}

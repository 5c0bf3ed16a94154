import { parse } from 'yaml'
import { z } from 'zod'
import { keyExamples } from './keyExamples.js'
import { type DimensionName, dimensions } from './quantities.js'

/**
 * Every key of the job format, with what an editor shows beside it. It holds the shape only: units, ranges and what the
 * parts say about one another are read by the files beside this one. Keys whose capability is not built are here too and
 * refused by name (refusals.ts), so that a job written for a later version gets a sentence and no riddle.
 */

const like = z.strictObject({
  like: z.string().describe('The id of the layer (or period) to follow.'),
  times: z.number().optional().describe('A factor on the width, counted in monolayers; 1 by default.'),
})

const lead = z
  .union([
    z.string().describe('A material, a name under `media`, or (exit only) `hard wall`.'),
    z.strictObject({
      material: z.string().optional().describe('A built-in material or a name under `media`.'),
      x: z
        .union([z.number(), z.string()])
        .optional()
        .describe('Composition of an alloy: the share of its first-named element.'),
      ...numbers('fixed'),
    }),
  ])
  .describe('A semi-infinite lead.')

const composition = z.union([
  quantity('plain', 'The share of the first-named element: fixed, or a range with a step.'),
  z.strictObject({ pick: z.array(z.union([z.number(), z.string()])).describe('The compositions to choose from.') }),
  z.strictObject({ from: z.literal('sources').describe('Whatever the cells under growth.sources can reach.') }),
  like,
])

const itemFields = {
  id: z.string().optional().describe('A name for `like`, and for the sheets: letters, digits, dashes.'),
  like: z
    .string()
    .optional()
    .describe('The id of another layer: the same material, composition and width, whatever they become.'),
  material: z
    .union([z.string(), z.strictObject({ pick: z.array(z.string()).describe('The materials to choose from.') })])
    .optional()
    .describe('A built-in material, a name under `media`, or { pick: [...] } of several.'),
  x: composition.optional().describe('Composition of an alloy: 0.3, "0.1..0.3 step 0.01" or { pick: [0.25, 0.35] }.'),
  ...numbers('range'),
  width: z
    .union([
      quantity(['width', 'filmWidth'], 'Fixed or a range: whole monolayers (ML), nm, or quarter waves (qw).'),
      like,
    ])
    .optional()
    .describe('Fixed or a range: "12 ML", "6..20 ML", "1..5 nm step 0.1 nm".'),
  repeat: z
    .union([
      z.number(),
      z.string(),
      z.strictObject({ like: z.string().describe('The id of the period whose count is followed.') }),
    ])
    .optional()
    .describe('How often the period is repeated.'),
  mirror: z.boolean().optional().describe('Reflect the period about its last layer, which must be a single one.'),
  alike: z
    .boolean()
    .optional()
    .describe('false: the layers of each repetition have widths and media of their own; true by default.'),
}

/** A layer or a period. One shape for all forms: which keys go together is readStack's business, with better sentences. */
export interface ItemAsWritten extends z.input<z.ZodObject<typeof itemFields>> {
  period?: ItemAsWritten[]
  between?: ItemAsWritten[]
}

const item: z.ZodType<ItemAsWritten, ItemAsWritten> = z.strictObject({
  ...itemFields,
  get period() {
    return z.array(item).optional().describe('The layers of one period, the same in every repetition.')
  },
  get between() {
    return z.array(item).optional().describe('Layers that stand between repetitions only.')
  },
})

const medium = z.strictObject({
  ...numbers('range'),
  table: z.string().optional().describe('A CSV beside the job: wavelength_nm, n, k.'),
  material: z
    .string()
    .optional()
    .describe('A built-in material of which single numbers are replaced: { material: AlAs, mass: 0.146 }.'),
  x: z.union([z.number(), z.string()]).optional().describe('Its composition, if it is an alloy.'),
})

const condition = {
  temperature: quantity('temperature', 'Temperature of the stack in operation.').optional(),
  bias: z
    .union([z.string(), z.number()])
    .optional()
    .describe('Voltage across the stack; positive lowers the edge of the exit.'),
  'in-plane': quantity('energy', 'Kinetic energy along the layers, in the entry.').optional(),
  angle: quantity('angle', 'Angle of incidence in the entry, below 90 degrees; light.').optional(),
  polarisation: z.enum(['s', 'p', 'mean']).optional().describe('Of the light; s by default, mean: half of each.'),
}

const yieldOnly = 'That of the demand, at least as loose, for the yield.'

const demand = z
  .strictObject({
    id: z.string().optional().describe('A name for the tables; d1, d2, ... by default.'),
    weight: z.number().optional().describe('Weight in the merit, above 0; 1 by default.'),
    peak: z
      .union([z.string(), z.number()])
      .optional()
      .describe('A maximum at this energy or wavelength; needs `within`.'),
    band: z
      .union([z.string(), z.number()])
      .optional()
      .describe('A flat top centred at this energy or wavelength; needs `within`.'),
    within: z.union([z.string(), z.number()]).optional().describe('How far the peak may lie from its energy.'),
    fwhm: z
      .union([z.string(), z.number()])
      .optional()
      .describe('Full width at half of its own height: "1..4 meV", "..4 meV" or "2..5 nm".'),
    height: z.number().optional().describe('Least height of the peak, 0..1.'),
    alone: z.union([z.number(), z.string()]).optional().describe('No other maximum in the scan above this.'),
    top: z.number().optional().describe('Least mean over the inner 80 % of a band.'),
    ripple: z.number().optional().describe('Greatest dip in the inner 80 % of a band.'),
    pass: z.union([z.string(), z.number()]).optional().describe('T at least `above` over this closed range.'),
    above: z.number().optional().describe('The least T of a pass, 0..1.'),
    block: z.union([z.string(), z.number()]).optional().describe('T at most `below` over this closed range.'),
    below: z
      .union([z.number(), z.string()])
      .optional()
      .describe('The greatest T of a block: 1e-4, "-40 dB" or "OD 4".'),
    points: z.number().optional().describe('Points evenly spaced over the range, both ends included; 64 by default.'),
    curve: z
      .string()
      .optional()
      .describe('A CSV beside the job: energy_meV or wavelength_nm, T, optional sense, scale, tolerance, weight.'),
    at: z.string().optional().describe('The condition at which it holds.'),
    quantity: z
      .enum(['T', 'R', 'A'])
      .optional()
      .describe('The share that is limited: transmitted, reflected or absorbed; T by default.'),
    accept: z
      .strictObject({
        within: z.union([z.string(), z.number()]).optional().describe(yieldOnly),
        fwhm: z.union([z.string(), z.number()]).optional().describe(yieldOnly),
        height: z.number().optional().describe(yieldOnly),
        alone: z.union([z.number(), z.string()]).optional().describe(yieldOnly),
        top: z.number().optional().describe(yieldOnly),
        ripple: z.number().optional().describe(yieldOnly),
        above: z.number().optional().describe(yieldOnly),
        below: z.union([z.number(), z.string()]).optional().describe(yieldOnly),
        rms: z.number().optional().describe('Of a curve, which without it has no part in the yield.'),
      })
      .optional()
      .describe('Looser limits for the yield only.'),
  })
  .meta({
    oneOf: [
      { required: ['peak', 'within'] },
      { required: ['band', 'within'] },
      { required: ['pass', 'above'] },
      { required: ['block', 'below'] },
      { required: ['curve'] },
    ],
  })

export const jobFormat = z
  .strictObject({
    format: z.literal(1).describe('Version of the job format.'),
    name: z.string().describe('Also the folder under results/: letters, digits, dashes.'),
    kind: z.enum(['electron', 'light']).describe('What passes the stack.'),
    note: z.string().optional().describe('For the reader.'),
    ...condition,
    'bias over': z
      .array(z.string())
      .optional()
      .describe('The ids of the first and last layer that the bias falls over.'),
    conditions: z.record(z.string(), z.strictObject(condition)).optional().describe('Named operating points.'),
    media: z.record(z.string(), medium).optional().describe('Media of your own, by name.'),
    stack: z
      .strictObject({
        entry: lead.describe('The lead from which the wave comes; energies count from its band edge.'),
        layers: z.array(item).describe('From entry to exit, as the wave meets them.'),
        exit: lead.describe('The lead behind the stack, or `hard wall`.'),
        mirror: z.boolean().optional().describe('Reflect the stack about its last layer, which must be a single one.'),
        rising: z.array(z.string()).optional().describe('Ids of layers whose widths may not fall in this order.'),
        mass: z
          .enum(['two-band', 'parabolic'])
          .optional()
          .describe('How the mass depends on energy; two-band by default.'),
        'strained to': z
          .string()
          .optional()
          .describe('A binary that fixes the lattice, or `none`; the lead at the substrate by default.'),
        reference: quantity(
          'wavelength',
          'Wavelength at which `qw` counts quarter waves; the middle of the scan by default.',
        ).optional(),
        back: z
          .strictObject({
            thickness: quantity('length', 'Of the plate, for the sheet; the spectrum does not depend on it.'),
            // biome-ignore lint/suspicious/noThenProperty: the job format calls it so, and a schema is never awaited.
            then: lead.describe('The medium behind the plate.'),
          })
          .optional()
          .describe(
            'The exit is a thick plate with this behind it: light that runs to and fro in it adds up by intensities.',
          ),
      })
      .describe('The layers and the leads.'),
    target: z
      .strictObject({
        scan: quantity(
          ['energy', 'wavelength'],
          'The range that is looked at: above the edge of the entry, or wavelengths.',
        ),
        resolution: z
          .union([quantity('energy', 'Lines narrower than this count less in a block.'), z.literal('none')])
          .optional()
          .describe('Energy resolution of a block; 0.01 meV by default.'),
        demands: z.array(demand).describe('What the transmission must look like.'),
      })
      .describe('What is wanted.'),
    growth: z
      .strictObject({
        'starts at': z.enum(['entry', 'exit']).optional().describe('The side of the substrate; exit by default.'),
        sources: z
          .record(z.string(), z.union([z.string(), z.number()]))
          .optional()
          .describe(
            'Rates of the binaries by element, or element and cell: { Ga: 0.70 ML/s, Al-1: 0.233 ML/s }; for light of each medium: { SiO2: 0.8 nm/s }.',
          ),
        compositions: z
          .number()
          .optional()
          .describe('At most so many different alloys in one stack; binaries and leads are free.'),
        step: quantity('length', 'Lattice step of widths in nm.').optional(),
        spread: z
          .strictObject({
            rate: quantity('percent', 'Of the rate of each source; 1 % by default, 0.5 % for light.').optional(),
            layer: quantity('layerError', 'Of each grown layer; 0.5 ML by default, 0.2 nm for light.').optional(),
            x: quantity('plain', 'Of each alloy; 0.005 by default.').optional(),
          })
          .optional()
          .describe('One standard deviation of each error of growth.'),
        trials: z.number().optional().describe('How often each candidate is grown on paper; 2048 by default.'),
        strain: quantity('percent', 'Greatest mean strain of a whole stack, of either sign; electrons.').optional(),
        critical: z
          .boolean()
          .optional()
          .describe(
            'true: no strained layer thicker than its critical thickness (Matthews and Blakeslee, a buried layer); electrons.',
          ),
        tooling: z
          .record(z.string(), z.number())
          .optional()
          .describe(
            'Thickness on the part over that on the monitor, by medium of light: { SiO2: 1.05 }; for the sheet.',
          ),
        thinnest: quantity('length', 'The thinnest layer that can be made.').optional(),
        total: quantity('length', 'Limits of the thickness of the whole stack, like "..6 um".').optional(),
        index: z
          .number()
          .optional()
          .describe('One standard deviation of the refractive index of each medium of light; 0 by default.'),
      })
      .optional()
      .describe('What the machine can grow, and how well.'),
    search: z
      .strictObject({
        method: z.enum(['auto', 'complete', 'sampled']).optional().describe('auto by default.'),
        effort: z
          .enum(['brief', 'standard', 'overnight'])
          .optional()
          .describe('64, 1024 or 16384 units of work; standard by default.'),
        seed: z.number().optional().describe('Another whole number gives other starts; 1 by default.'),
      })
      .optional()
      .describe('How hard to search.'),
    deliver: z
      .strictObject({
        candidates: z.number().optional().describe('How many of the best get a folder, 1..256; 10 by default.'),
      })
      .optional()
      .describe('What to write.'),
  })
  .describe('A tunnelwright job: one filter to be designed.')

/** A job as written, once its shape is right. */
export type JobAsWritten = z.input<typeof jobFormat>

/** The JSON Schema (draft 2020-12) of a job file, for editors. */
export function jobSchema(): Record<string, unknown> {
  const schema = z.toJSONSchema(jobFormat, {
    io: 'input',
    override: ({ jsonSchema }) => {
      // A bare number parses, so that its error can name the units; an editor need not offer it.
      if (jsonSchema.pattern === undefined || jsonSchema.anyOf === undefined) return
      delete jsonSchema.anyOf
      jsonSchema.type = 'string'
    },
  })
  withExamples(schema as Node, '')
  return { ...schema, title: 'tunnelwright job' }
}

/** The part of a JSON Schema that is read here. */
export interface Node {
  description?: string
  examples?: unknown[]
  properties?: Record<string, Node>
  additionalProperties?: Node | boolean
  items?: Node
  anyOf?: Node[]
  $ref?: string
  $defs?: Record<string, Node>
}

/** Gives every key an example that an editor can offer, ahead of those of its dimension. `inside`: the key that holds it. */
function withExamples(node: Node, inside: string): void {
  for (const [key, inner] of Object.entries(node.properties ?? {})) {
    const line = keyExamples[`${inside} ${key}`] ?? keyExamples[key]
    const others = (inner.examples ?? []).filter((one) => !line || one !== parse(line)[key])
    if (line) inner.examples = [parse(line)[key], ...others]
    withExamples(inner, key)
  }
  for (const inner of [...(node.anyOf ?? []), ...Object.values(node.$defs ?? {})]) withExamples(inner, inside)
  if (node.items) withExamples(node.items, inside)
  if (typeof node.additionalProperties === 'object') withExamples(node.additionalProperties, inside)
}

function numbers(form: 'fixed' | 'range') {
  const how = form === 'fixed' ? '' : ' Fixed, or a range with a step.'
  return {
    potential: quantity('energy', `Band edge, counted from that of the entry.${how}`).optional(),
    mass: quantity('plain', `Effective mass at the band edge over that of the free electron.${how}`).optional(),
    alpha: quantity('nonparabolicity', `Nonparabolicity: m(E) = m (1 + alpha (E - V)).${how}`).optional(),
    index: quantity('plain', `Refractive index.${how}`).optional(),
    extinction: quantity('plain', `Extinction coefficient, positive absorbs; 0 by default.${how}`).optional(),
  }
}

/** A quantity of one dimension, or, where electrons and light differ, of either. */
function quantity(name: DimensionName | readonly DimensionName[], text: string) {
  const either = (typeof name === 'string' ? [name] : name).map((one) => dimensions[one])
  const known = [...new Set(either.flatMap(({ units }) => Object.keys(units)))]
  const examples = either.flatMap(({ examples: { single, range } }) => [single, range])
  const meta = { description: text, examples: [...new Set(examples)] }
  const shape = z.union([z.string(), z.number()])
  if (known.length === 0) return shape.meta(meta)
  return shape.meta({ ...meta, pattern: `(${known.map((unit) => unit.replace('/', '\\/')).join('|')})$` })
}

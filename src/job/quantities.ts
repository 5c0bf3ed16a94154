import { nearest } from '../media/index.js'
import { shifted, tenTo } from './decimal.js'
import { shortened } from './problemAt.js'

/** A number or a range with its unit, in eV, nm, 1/eV, K, ML/s or plain; ML stay ML. */
export interface Quantity {
  /** Equal to `to` for a single number; 0 where a range is open at its start. */
  readonly from: number
  readonly to: number
  readonly step: number | null
  readonly range: boolean
  /** As written; '' for a plain number. */
  readonly unit: string
  /** The ends in the unit as written, and that unit's power of ten. */
  readonly written: readonly [number, number]
  readonly exponent: number
}

export interface Complaint {
  readonly rule: string
  readonly remedy: string
}

/** Units by their power of ten over the job's own unit. */
interface Dimension {
  readonly units: Readonly<Record<string, number>>
  readonly examples: { readonly single: string; readonly range: string }
}

/** Micro and angstrom each have two characters that look the same. */
const lengths = { nm: 0, um: 3, '\u00b5m': 3, '\u03bcm': 3, mm: 6, pm: -3, '\u00c5': -1, '\u212b': -1, angstrom: -1 }

export const dimensions = {
  energy: { units: { meV: -3, eV: 0 }, examples: { single: '80 meV', range: '5..200 meV' } },
  nonparabolicity: {
    units: { '/eV': 0, '1/eV': 0 },
    examples: { single: '1.2 /eV', range: '0.8..1.2 /eV step 0.1 /eV' },
  },
  width: { units: { ML: 0, ...lengths }, examples: { single: '12 ML', range: '6..20 ML' } },
  filmWidth: { units: { qw: 0, ...lengths }, examples: { single: '1 qw', range: '20..200 nm' } },
  wavelength: { units: lengths, examples: { single: '633 nm', range: '400..700 nm' } },
  angle: { units: { deg: 0, '\u00b0': 0 }, examples: { single: '45 deg', range: '45 deg' } },
  length: { units: lengths, examples: { single: '0.1 nm', range: '1..2 nm' } },
  layerError: { units: { ML: 0, ...lengths }, examples: { single: '0.5 ML', range: '0.5 ML' } },
  voltage: { units: { mV: -3, V: 0 }, examples: { single: '350 mV', range: '0..350 mV' } },
  temperature: { units: { K: 0 }, examples: { single: '77 K', range: '300 K' } },
  rate: { units: { 'ML/s': 0 }, examples: { single: '0.70 ML/s', range: '0.70 ML/s' } },
  filmRate: { units: { 'nm/s': 0, '\u00c5/s': -1 }, examples: { single: '0.5 nm/s', range: '0.5 nm/s' } },
  percent: { units: { '%': -2 }, examples: { single: '1 %', range: '1 %' } },
  plain: { units: {}, examples: { single: '0.25', range: '0.1..0.3 step 0.01' } },
} satisfies Record<string, Dimension>

export type DimensionName = keyof typeof dimensions

const number = '[+-]?\\d+(?:\\.\\d+)?(?:[eE][+-]?\\d+)?'
const unit = '1/eV|[^\\s\\d.,+-][^\\s]*'
const single = new RegExp(`^(${number})\\s*(${unit})?$`)
const range = new RegExp(
  `^(${number})?\\s*\\.\\.\\s*(${number})(?:\\s*(?!step\\b)(${unit}))?(?:\\s+step\\s+(${number})\\s*(${unit})?)?$`,
)

/** Longer than any quantity; what is longer is not looked at. */
const longest = 120

/** Reads "80 meV", "6..20 ML", "..4 meV", "0.2..0.4 eV step 5 meV". The label names the quantity in complaints. */
export function parseQuantity(label: string, raw: string | number, name: DimensionName): Quantity | Complaint {
  const text = String(raw).trim()
  const complain = (what: string, remedy: string): Complaint => ({
    rule: `${label} "${shortened(text)}" ${what}.`,
    remedy,
  })
  const { units, examples }: Dimension = dimensions[name]
  const accepted = Object.keys(units).filter((unit) => !aliases.has(unit))
  const like = `Write it like "${examples.single}" or "${examples.range}".`

  if (text.length > longest) return complain('is too long', like)
  const match = range.exec(text) ?? single.exec(text)
  if (!match) return complain(...misread(text, accepted, like))
  const isRange = text.includes('..')
  const [a, b, writtenUnit = '', step, stepUnit = ''] = isRange
    ? [match[1] ?? '0', ...match.slice(2)]
    : [match[1], match[1], match[2]]

  const exponent = exponentOf(writtenUnit, units)
  if (exponent === null) return complain(...wrongUnit(writtenUnit, text, name, accepted))
  if (isRange && step !== undefined && exponentOf(stepUnit, units) === null) {
    const remedy = `Write "${text.slice(0, text.indexOf('step'))}step ${step} ${writtenUnit}".`
    return complain(stepUnit ? `has a step in ${shortened(stepUnit)}` : 'has a step without a unit', remedy)
  }
  if (step !== undefined && countedIn(writtenUnit) !== countedIn(stepUnit)) {
    return complain(`mixes ${writtenUnit} and ${stepUnit}`, 'Write range and step in the same unit.')
  }
  const from = shifted(a, exponent)
  const to = shifted(b, exponent)
  const stepValue = step === undefined ? null : shifted(step, exponentOf(stepUnit, units)!)
  if (![from, to, stepValue ?? 0].every(Number.isFinite)) {
    return complain('is not a finite number', 'Write a number within 1e-300..1e300.')
  }
  if (from > to) {
    const end = step === undefined ? '' : ` step ${step} ${stepUnit}`
    const swapped = `${b}..${a} ${writtenUnit}${end}`.trim()
    return complain('runs downwards', `Write "${swapped}".`)
  }
  if (stepValue !== null && !(stepValue > 0)) return complain('has a step that is not above 0', like)
  return { from, to, step: stepValue, range: isRange, unit: writtenUnit, written: [Number(a), Number(b)], exponent }
}

/** A limit of transmission: 2e-2, "-40 dB", "OD 4". */
export function parseLevel(label: string, raw: string | number): number | Complaint {
  const text = String(raw).trim()
  const complain = (what: string): Complaint => ({
    rule: `${label} "${shortened(text)}" ${what}.`,
    remedy: 'Write a number above 0 and at most 1, like 1e-4, "-40 dB" or "OD 4".',
  })
  const decibel = text.length <= longest ? new RegExp(`^(${number})\\s*dB$`).exec(text) : null
  const density = text.length <= longest ? new RegExp(`^OD\\s*(${number})$`).exec(text) : null
  const plain = text.length <= longest ? new RegExp(`^${number}$`).exec(text) : null
  if (!decibel && !density && !plain) return complain('is no level of transmission')
  const level = decibel ? tenTo(shifted(decibel[1], -1)) : density ? tenTo(-Number(density[1])) : Number(text)
  return level > 0 && level <= 1 ? level : complain('is outside 0..1')
}

/** Points evenly spaced over a range in the unit that it is written in; the ends are exactly the ends. */
export function pointsOf(quantity: Quantity, count: number): number[] {
  const [a, b] = quantity.written
  return Array.from({ length: count }, (_, i) => {
    if (i === 0) return quantity.from
    if (i === count - 1) return quantity.to
    return scaled(a + ((b - a) * i) / (count - 1), quantity.exponent)
  })
}

/** Dividing by a whole power of ten rounds once, multiplying by its inverse twice. */
function scaled(value: number, exponent: number): number {
  return exponent < 0 ? value / Number(`1e${-exponent}`) : value * Number(`1e${exponent}`)
}

/** Units that no power of ten leads from one to another. */
function countedIn(unit: string): string {
  return unit === 'ML' || unit === 'qw' ? unit : ''
}

const aliases = new Set([
  '\u00b5m',
  '\u03bcm',
  'mm',
  'pm',
  '\u00c5',
  '\u212b',
  'angstrom',
  '1/eV',
  '\u00b0',
  '\u00c5/s',
])

function exponentOf(unit: string, units: Readonly<Record<string, number>>): number | null {
  if (unit === '') return Object.keys(units).length === 0 ? 0 : null
  return Object.hasOwn(units, unit) ? units[unit] : null
}

function wrongUnit(unit: string, text: string, name: DimensionName, accepted: readonly string[]): [string, string] {
  if (accepted.length === 0) {
    const bare = text.slice(0, text.lastIndexOf(unit)).trim()
    if (unit === '%' && Number.isFinite(Number(bare))) return ['takes a plain number', `Write ${shifted(bare, -2)}.`]
    return [`has a unit, "${shortened(unit)}"`, `Write the plain number, like "${bare}".`]
  }
  if (unit === '') return ['has no unit', withUnits(text, name, accepted)]
  const meant = accepted.find((known) => known.toLowerCase() === unit.toLowerCase()) ?? nearest(unit, accepted)[0]
  const list = `Accepted: ${accepted.join(', ')}.`
  if (unit === 'A' && accepted.includes('nm'))
    return ['is in "A", which is the ampere', 'Write "Å", or nm (1 Å = 0.1 nm).']
  const rule = `has the unit "${shortened(unit)}"`
  return meant ? [rule, `Write "${text.split(unit).join(meant)}". ${list}`] : [rule, list]
}

function withUnits(text: string, name: DimensionName, accepted: readonly string[]): string {
  if (name === 'width' && !text.includes('step')) {
    return `Write "${text} ML" or "${text.replace(new RegExp(number, 'g'), inNm)} nm".`
  }
  if (name === 'percent' && single.test(text))
    return `Write "${text} %", or "${shifted(text, 2)} %" if it is a fraction.`
  const [before, step] = text.split(/\s+step\s+/)
  const written = accepted.slice(0, 2).map((unit) => `"${before} ${unit}${step ? ` step ${step} ${unit}` : ''}"`)
  return `Write ${written.join(' or ')}.`
}

/** About as many nm as monolayers of GaAs: a bare width counts monolayers more often than not. */
function inNm(monolayers: string): string {
  return String(Math.round(Number(monolayers) * 2.827) / 10)
}

function misread(text: string, accepted: readonly string[], like: string): [string, string] {
  const unit = accepted[0] ? ` ${accepted[0]}` : ''
  if (/^[+-]?\.?(nan|inf(inity)?)\b/i.test(text)) return ['is not a finite number', like]
  if (/\d,\d/.test(text)) return ['has a comma', `Write a dot: "${text.replaceAll(',', '.')}".`]
  const dash = /^(\d[\d.]*)\s*(?:-|–|—|to|\.{3,}|…)\s*(\d[\d.]*)\s*(\S*)$/.exec(text)
  if (dash) return ['is no range', `Write "${dash[1]}..${dash[2]}${dash[3] ? ` ${dash[3]}` : unit}".`]
  const twice = /^(\S+)\s*(\D+?)\s*\.\.\s*(\S+)\s*(\D+)$/.exec(text)
  if (twice && twice[2] === twice[4]) return ['has its unit twice', `Write "${twice[1]}..${twice[3]} ${twice[4]}".`]
  const open = /^(\S+)\s*\.\.\s*([^\d\s]*)$/.exec(text)
  if (open) return ['is a range without an end', like]
  const dot = /(^|[^\d.])\.\d|\d\.(?![\d.])/.test(text)
  if (dot) return ['has a dot without a digit on each side', like]
  return ['is no quantity', like]
}

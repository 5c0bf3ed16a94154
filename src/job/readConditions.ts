import type { Loose } from './checkShape.js'
import type { Condition } from './job.js'
import { shortened } from './problemAt.js'
import type { Reader } from './Reader.js'
import type { JobAsWritten } from './schema.js'
import type { Path } from './YamlSource.js'

type Written = Pick<Loose<JobAsWritten>, 'temperature' | 'bias' | 'in-plane' | 'angle' | 'polarisation' | 'conditions'>

const mostConditions = 16
const rest: Condition = {
  name: '',
  temperatureK: 300,
  biasV: 0,
  inPlaneEv: 0,
  angleDeg: 0,
  polarisation: 's',
}

/** The operating points: those of `conditions`, which take from the top of the job what they don't state, else the one stated there. */
export function readConditions(written: Written, reader: Reader): Condition[] {
  const { problems } = reader
  const top = readCondition(written, [], rest, reader)
  const { conditions } = written
  if (conditions === undefined) return [top]
  const names = Object.keys(conditions)
  if (names.length === 0)
    problems.addAtKey(['conditions'], 'There are no conditions.', 'Write "rest: { bias: 0 mV }", or take it out.')
  if (names.length > mostConditions) {
    problems.addAtKey(
      ['conditions'],
      `There are more than ${mostConditions} conditions.`,
      'Leave out the ones between.',
    )
    return [top]
  }
  return names.map((name) => {
    const path = ['conditions', name]
    if (!/^[A-Za-z][A-Za-z0-9_-]{0,39}$/.test(name)) {
      problems.addAtKey(
        path,
        `The condition "${shortened(name)}" has no name.`,
        'Use letters, digits and dashes, a letter first.',
      )
    }
    return { ...readCondition(conditions[name] ?? {}, path, top, reader), name }
  })
}

function readCondition(written: Omit<Written, 'conditions'>, path: Path, top: Condition, reader: Reader): Condition {
  const at = (key: string) => [...path, key]
  const temperatureK = reader.single(written.temperature, at('temperature'), 'temperature') ?? top.temperatureK
  if (temperatureK < 0 || temperatureK > 1000) {
    reader.complain(at('temperature'), 'is outside 0..1000 K', 'Write the temperature in operation, like "77 K".')
  }
  const biasV = reader.single(written.bias, at('bias'), 'voltage') ?? top.biasV
  if (!(Math.abs(biasV) <= 10))
    reader.complain(at('bias'), 'is more than 10 V', 'Write the voltage across the stack, like "350 mV".')
  const inPlaneEv = reader.single(written['in-plane'], at('in-plane'), 'energy') ?? top.inPlaneEv
  if (inPlaneEv < 0)
    reader.complain(at('in-plane'), 'is negative', 'Write the kinetic energy along the layers, like "10 meV".')
  const angleDeg = reader.single(written.angle, at('angle'), 'angle') ?? top.angleDeg
  if (!(angleDeg >= 0 && angleDeg < 90))
    reader.complain(at('angle'), 'is outside 0..90 deg, 90 left out', 'Write the angle in the entry, like "45 deg".')
  const polarisation = written.polarisation ?? top.polarisation
  return { name: '', temperatureK, biasV: biasV === 0 ? 0 : biasV, inPlaneEv, angleDeg, polarisation }
}

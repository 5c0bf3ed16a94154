import { MaterialError } from './MaterialError.js'
import type { Alloy, Binary, Bowing, Gap } from './material.js'
import { material } from './materials.js'

/** A material at a composition and a temperature, unstrained. */
export interface BandParameters {
  /** Conduction edge (Gamma), on the source's common scale of offsets: vbo + gap. */
  readonly edgeEv: number
  readonly gapEv: number
  readonly massRel: number
  /** At 300 K, whatever the temperature; c11 and c12 too. */
  readonly latticeNm: number
  readonly c11: number
  readonly c12: number
  readonly acEv: number
  readonly avEv: number
  /** Edge of the X valley on the same scale; absent where it is not known. */
  readonly edgeXEv?: number
}

/** A composition may run over its ends by this much, so that the growth error of an almost pure alloy has a value. */
const beyond = 0.05

/**
 * Band edges, masses and elastic numbers of a built-in material: Varshni acts on the binaries, then the bowing; everything
 * else is linear in x but for the bowings listed. The band-edge mass does not change with temperature.
 * `x` is null exactly for a binary. Throws MaterialError for an unknown name, a missing or useless x, x outside 0..1 (by
 * more than 0.05) and a temperature that is negative or not finite.
 */
export function bandParameters(name: string, x: number | null, temperatureK: number): BandParameters {
  const found = material(name)
  if (!(temperatureK >= 0 && temperatureK < Number.POSITIVE_INFINITY)) {
    throw new MaterialError(`Temperature of ${name} is ${temperatureK} K. Give a finite number, 0 or above.`)
  }
  if (found.kind === 'binary') {
    if (x !== null) throw new MaterialError(`${name} has a fixed composition, but x = ${x} is given. Leave x out.`)
    return binaryParameters(found, temperatureK)
  }
  if (x === null) throw new MaterialError(`${name} needs a composition. Give x: ${found.x}.`)
  if (!(x >= found.xRange[0] - beyond && x <= found.xRange[1] + beyond)) {
    throw new MaterialError(`x = ${x} of ${name} is outside ${found.xRange[0]}..${found.xRange[1]}: ${found.x}.`)
  }
  return alloyParameters(found, x, temperatureK)
}

function binaryParameters(binary: Binary, temperatureK: number): BandParameters {
  const gapEv = varshni(binary.gap, temperatureK)
  return {
    edgeEv: binary.vbo.value + gapEv,
    gapEv,
    massRel: binary.mass.value,
    latticeNm: binary.lattice.value,
    c11: binary.c11.value,
    c12: binary.c12.value,
    acEv: binary.ac.value,
    avEv: binary.av.value,
    ...(binary.gapX && { edgeXEv: binary.vbo.value + varshni(binary.gapX, temperatureK) }),
  }
}

function alloyParameters(alloy: Alloy, x: number, temperatureK: number): BandParameters {
  const { atZero, atOne, bowings } = alloy
  const gapEv = mix(x, varshni(atZero.gap, temperatureK), varshni(atOne.gap, temperatureK), bowings.gap)
  const vbo = mix(x, atZero.vbo.value, atOne.vbo.value, bowings.vbo)
  const gapX =
    atZero.gapX && atOne.gapX
      ? mix(x, varshni(atZero.gapX, temperatureK), varshni(atOne.gapX, temperatureK), bowings.gapX)
      : null
  return {
    edgeEv: vbo + gapEv,
    gapEv,
    massRel: mix(x, atZero.mass.value, atOne.mass.value, bowings.mass),
    latticeNm: mix(x, atZero.lattice.value, atOne.lattice.value),
    c11: mix(x, atZero.c11.value, atOne.c11.value),
    c12: mix(x, atZero.c12.value, atOne.c12.value),
    acEv: mix(x, atZero.ac.value, atOne.ac.value, bowings.ac),
    avEv: mix(x, atZero.av.value, atOne.av.value),
    ...(gapX !== null && bowings.gapX && { edgeXEv: vbo + gapX }),
  }
}

function varshni(gap: Gap, temperatureK: number): number {
  return gap.zero.value - (gap.alpha.value * temperatureK * temperatureK) / (temperatureK + gap.beta.value)
}

function mix(x: number, atZero: number, atOne: number, bowing?: Bowing): number {
  const linear = (1 - x) * atZero + x * atOne
  if (!bowing) return linear
  return linear - x * (1 - x) * (bowing.constant.value + (bowing.slope?.value ?? 0) * x)
}

import type { Side } from '../wave/index.js'
import { StackError } from './StackError.js'
import type { ElectronStack, LightStack, Medium, OfWavelength, Region } from './types.js'

/** Throws StackError, naming the number, for a stack that has no spectrum of waves from `from`. */
export function checkStack(stack: ElectronStack | LightStack, from: Side): void {
  stack.layers.forEach(({ widthNm }, i) => {
    if (!(widthNm >= 0 && widthNm < Number.POSITIVE_INFINITY)) {
      throw new StackError(`Width of layer ${i + 1} is ${widthNm} nm. Give a finite number, 0 or above.`)
    }
  })
  if (stack.kind === 'electron') checkElectrons(stack, from)
  else checkLight(stack, from)
}

function checkElectrons({ entry, layers, exit, inPlaneKPerNm = 0 }: ElectronStack, from: Side): void {
  checkRegion(entry, 'the entry')
  layers.forEach((layer, i) => void checkRegion(layer, `layer ${i + 1}`))
  if (exit !== 'hard wall') checkRegion(exit, 'the exit')
  else if (from === 'exit')
    throw new StackError('No wave comes from the side of a hard wall. Ask for one from the entry.')
  if (!Number.isFinite(inPlaneKPerNm))
    throw new StackError(`In-plane wave number is ${inPlaneKPerNm} /nm. Give a finite number.`)
}

function checkRegion({ potentialEv, massRel, alphaPerEv = 0 }: Region, of: string): void {
  if (!Number.isFinite(potentialEv))
    throw new StackError(`Potential of ${of} is ${potentialEv} eV. Give a finite number.`)
  if (!(massRel > 0 && massRel < Number.POSITIVE_INFINITY)) {
    throw new StackError(`Mass of ${of} is ${massRel}. Give a finite number above 0, in free-electron masses.`)
  }
  if (!Number.isFinite(alphaPerEv)) throw new StackError(`Alpha of ${of} is ${alphaPerEv} /eV. Give a finite number.`)
}

function checkLight(stack: LightStack, from: Side): void {
  const { entry, layers, exit, angleDeg = 0, polarisation = 's', back } = stack
  if (back) {
    checkMedium(back.exit, 'the medium behind the back face')
    for (const [medium, of] of [
      [exit, 'the exit, a thick plate'],
      ...(from === 'exit' ? [[back.exit, 'the medium behind the back face, from which the wave comes'] as const] : []),
    ] as const) {
      if (medium.extinction !== undefined && medium.extinction !== 0)
        throw new StackError(
          `Extinction of ${of}, is ${medium.extinction}. It must be 0: intensities add up in a lossless plate.`,
        )
    }
  }
  checkMedium(entry, 'the entry')
  layers.forEach((layer, i) => void checkMedium(layer, `layer ${i + 1}`))
  checkMedium(exit, 'the exit')
  const { extinction = 0 } = from === 'entry' ? entry : exit
  if (typeof extinction === 'number' && extinction !== 0) {
    throw new StackError(
      `Extinction of the ${from} is ${extinction}, and the wave comes from there: in an absorbing medium incident and reflected ` +
        'fluxes interfere and T + R + A = 1 has no meaning. Give it no extinction.',
    )
  }
  if (!(angleDeg >= 0 && angleDeg < 90))
    throw new StackError(`Angle is ${angleDeg} degrees. Give 0 or above, below 90.`)
  if (polarisation !== 's' && polarisation !== 'p')
    throw new StackError(`Polarisation is "${polarisation}". Give "s" or "p".`)
}

function checkMedium({ index, extinction = 0 }: Medium, of: string): void {
  if (isNumber(index) && !(index > 0 && index < Number.POSITIVE_INFINITY)) {
    throw new StackError(`Index of ${of} is ${index}. Give a finite number above 0.`)
  }
  if (isNumber(extinction) && !(extinction >= 0 && extinction < Number.POSITIVE_INFINITY)) {
    throw new StackError(`Extinction of ${of} is ${extinction}. Give a finite number, 0 or above: positive absorbs.`)
  }
}

function isNumber(of: OfWavelength): of is number {
  return typeof of === 'number'
}

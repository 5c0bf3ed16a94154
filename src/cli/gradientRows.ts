import type { BoundJob } from '../batch/index.js'
import { jacobianDigits } from '../search/index.js'
import { gradientDigits } from '../wave/index.js'

const energies = 16

/**
 * The derivatives that the search goes by, checked on the stack in the middle of the lattice: those of T by complex steps at 16
 * energies of the scan, those of the fit by extrapolated differences. The worst of each, in decimal digits.
 */
export function gradientRows(
  { design, problem }: BoundJob,
  [low, high]: readonly [number, number],
): [string, string][] {
  const middle = design.repair(Int32Array.from(design.places, ({ choices }) => choices >> 1))
  const worst = new Map<string, number>()
  for (const system of design.systems(middle)) {
    // A complex step knows the transmission of one wave that nothing absorbs.
    if (!system.media.lossless || system.beside || system.behind !== undefined) continue
    for (let i = 0; i < energies; i++) {
      const found = gradientDigits(system, low + ((high - low) * (i + 0.5)) / energies)
      for (const [what, digits] of Object.entries(found ?? {})) {
        worst.set(what, Math.min(digits, worst.get(what) ?? Number.POSITIVE_INFINITY))
      }
    }
  }
  const relaxed = problem.relax(middle)
  const fit = jacobianDigits(relaxed, relaxed.start)
  const ofT = [...worst].map(([what, digits]) => `${what} ${digits.toFixed(1)}`).join(', ')
  const ofFit = fit.map((digits, v) => `${design.places[relaxed.place[v]].name} ${digits.toFixed(1)}`).join(', ')
  return [
    ['gradients', `digits of dT by complex steps: ${ofT || 'not known of this stack'}`],
    ['', `digits of the fit by differences: ${ofFit || 'nothing is fitted'}`],
  ]
}

import type { Design } from '../design/index.js'
import type { ChainAbscissa, ChainMatrices, SearchChain } from '../search/index.js'
import type { Target } from '../target/index.js'
import { layerMatrices } from '../wave/index.js'

/**
 * The chain of a design, with what the points of a target add to the merit. Null where the design has none, where it is so thick that
 * products of its matrices may leave the range of doubles, and where nothing is read at points.
 */
export function searchChain(design: Design, target: Target): SearchChain | null {
  const chain = design.chain()
  if (chain === null || target.pointShares.length === 0 || !target.onlyT) return null
  const { links, systems, labels, mostLabels } = chain
  const points = target.pointShares.map(({ condition, energyEv, square, extreme, goal }) => ({
    condition,
    at: energyEv,
    square,
    extreme,
    goal,
  }))
  const all = matricesAt(points)
  if (all === null) return null
  const thickest = links.map((link) =>
    link.cells.reduce((most, cell) => Math.max(most, cell < 0 ? 0 : all.exponent[cell]), 0),
  )
  if (thickest.reduce((sum, exponent) => sum + exponent, 0) > mostExponent) return null
  const matrices = (at: readonly ChainAbscissa[]): ChainMatrices => (at === points ? all : matricesAt(at)!)
  return { links, labels, mostLabels, points, matrices }

  /** Null where a layer is too thick for a matrix. */
  function matricesAt(at: readonly ChainAbscissa[]): (ChainMatrices & { readonly exponent: Float64Array }) | null {
    const cells = labels.length
    const size = at.length * cells
    const same = new Float64Array(size)
    const down = new Float64Array(size)
    const up = new Float64Array(size)
    const far = new Float64Array(at.length)
    const angle = new Float64Array(at.length)
    const exponent = new Float64Array(cells)
    for (const [condition, system] of systems.entries()) {
      const mine = at.flatMap((point, p) => (point.condition === condition ? [p] : []))
      const part = mine.length * cells
      const out = { same: new Float64Array(part), down: new Float64Array(part), up: new Float64Array(part) }
      const ends = layerMatrices(
        system,
        Float64Array.from(mine, (p) => at[p].at),
        out,
      )
      if (ends === null) return null
      mine.forEach((p, i) => {
        // In units in which the entry's admittance is 1.
        const unit = ends.entryY[i]
        for (let c = 0; c < cells; c++) {
          same[p * cells + c] = out.same[i * cells + c]
          down[p * cells + c] = out.down[i * cells + c] * unit
          up[p * cells + c] = out.up[i * cells + c] / unit
        }
        far[p] = ends.exitY[i] / unit
        angle[p] = ends.angle[i]
      })
      ends.exponent.forEach((kw, c) => {
        exponent[c] = Math.max(exponent[c], kw)
      })
    }
    return { same, down, up, far, angle, exponent }
  }
}

/** Products of sizes of halves grow like the square of e^exponent, exponents added up along the stack: doubles end at e^709. */
const mostExponent = 330

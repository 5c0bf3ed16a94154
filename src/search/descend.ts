import type { Examiner, Reached } from './Examiner.js'
import { neighbours } from './neighbours.js'
import { promisingMoves } from './promisingMoves.js'

/**
 * Descends on the lattice under the full order of stacks until no move of `neighbours` helps, or the budget is spent. Where the
 * neighbours of a stack that misses its limits can be priced, those within reach are tried from the cheapest up; else the moves that
 * the residuals' quadratic promises most come first, those of three places among them, and stacks that meet all limits go on by their
 * margin. The first move that helps is taken.
 */
export function descend(examiner: Examiner, from: Reached, most = 3): Reached {
  const { problem } = examiner
  let here = from
  let next: Reached | null = from
  while (next !== null && !examiner.exhausted) {
    here = next
    next = examiner.priced(here)
      ? pricedBetter()
      : (firstBetter(promising(here)) ?? firstBetter(neighbours(problem, here.stack, mostNeighbours)))
  }
  return here

  function pricedBetter(): Reached | null {
    for (let together = 1; together <= most; together++) {
      const better = firstBetter(examiner.pricedMoves(here, together, mostPriced))
      if (better) return better
    }
    return null
  }

  function promising({ stack, score }: Reached): Int32Array[] {
    if (score.merit === 0) return []
    examiner.charge(fitCost)
    const moves = promisingMoves(problem.places, problem.relax(stack), stack, mostTried)
    return moves.filter((moved) => problem.feasible(moved))
  }

  function firstBetter(moves: Iterable<Int32Array>): Reached | null {
    for (const stack of moves) {
      if (examiner.exhausted) return null
      const score = examiner.better(stack, here.score)
      if (score) return { stack, score }
    }
    return null
  }
}

/** Priced moves of each kind that are tried; where the points are all that counts the first one decides. */
const mostPriced = 8

/** Promising moves that are looked at before all neighbours are. */
const mostTried = 48

/** Neighbours of each kind: those with one, two and three places moved. */
const mostNeighbours = 400

/** Residuals and Jacobian in bounds. */
export const fitCost = 4

import type { Examiner, Reached } from './Examiner.js'
import { neighbours } from './neighbours.js'
import { promisingMoves } from './promisingMoves.js'

/**
 * Descends on the lattice under the full order of stacks until no move of `neighbours` helps, or the budget is spent. While the
 * limits are unmet, the moves that the residuals' quadratic promises most are tried first, those of three places among them; stacks
 * that meet all limits go on by their margin. The first move that helps is taken.
 */
export function descend(examiner: Examiner, from: Reached): Reached {
  const { problem } = examiner
  let here = from
  let next: Reached | null = from
  while (next !== null && !examiner.exhausted) {
    here = next
    next = firstBetter(promising(here)) ?? firstBetter(neighbours(problem, here.stack, mostNeighbours))
  }
  return here

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

/** Promising moves that are looked at before all neighbours are. */
const mostTried = 48

/** Neighbours of each kind: those with one, two and three places moved. */
const mostNeighbours = 400

/** Residuals and Jacobian in bounds. */
export const fitCost = 4

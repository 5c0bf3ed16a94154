import type { Candidate } from '../deliver/index.js'

type Figures = Pick<Candidate, 'id' | 'yield' | 'totalNm' | 'compositions'>

/**
 * Ids of the stacks that stand for a choice of their own (Pareto): no other one is at least as good in yield, total width and number of
 * compositions and better in one of them. In the order given; a stack that was not grown counts below any yield.
 */
export function nonDominated(stacks: readonly Figures[]): string[] {
  return stacks.filter((one) => !stacks.some((other) => dominates(other, one))).map(({ id }) => id)
}

function dominates(a: Figures, b: Figures): boolean {
  const better = [moreYield(a, b), nm(b) - nm(a), b.compositions - a.compositions]
  return better.every((by) => by >= 0) && better.some((by) => by > 0)
}

/** As the order of stacks compares them. */
function nm({ totalNm }: Figures): number {
  return Math.round(totalNm * 1e6)
}

/** As whole numbers, so that no rounding decides. */
function moreYield({ yield: a }: Figures, { yield: b }: Figures): number {
  if (a === null || b === null) return Number(b === null) - Number(a === null)
  return a.passed * b.trials - b.passed * a.trials
}

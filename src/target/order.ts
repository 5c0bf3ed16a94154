import type { Job } from '../job/index.js'
import type { Score } from './types.js'

/**
 * The one order of stacks (design 3), as a comparison: negative when `a` comes first. Limits met before unmet. Met: with a curve in
 * the job the smaller merit, else the larger margin; then smaller total width, then id. Unmet: smaller merit, total width, id. A
 * job with curves only goes by merit. Merits compare at 9 significant digits, total widths rounded to 1e-6 nm.
 */
export function compareScores({ demands }: Pick<Job, 'demands'>): (a: Score, b: Score) => number {
  const curves = demands.filter(({ kind }) => kind === 'curve').length
  const onlyCurves = curves === demands.length
  return (a, b) => {
    if (!onlyCurves && a.met !== b.met) return a.met ? -1 : 1
    const byGoal = !a.met || curves > 0 ? byMerit(a, b) : marginOf(b) - marginOf(a)
    return byGoal || byWidth(a, b) || (a.id < b.id ? -1 : a.id > b.id ? 1 : 0)
  }
}

function byMerit(a: Score, b: Score): number {
  return nineDigits(a.merit) - nineDigits(b.merit)
}

/** Shortest decimal forms are exact by the language's standard, so every machine rounds alike. */
function nineDigits(merit: number): number {
  return Number(merit.toPrecision(9))
}

function byWidth(a: Score, b: Score): number {
  return Math.round(a.totalNm * 1e6) - Math.round(b.totalNm * 1e6)
}

function marginOf({ margin }: Score): number {
  return margin ?? -1
}

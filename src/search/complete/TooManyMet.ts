/** Stacks that meet all limits are ordered by their margins, which no bound knows: each must be looked at. */
export const mostMet = 1_000_000

/** A complete search that would have to look at more stacks that meet all limits than it can. */
export class TooManyMet extends Error {
  override readonly name = 'TooManyMet'

  constructor(readonly count: number) {
    super(tooManyMet(`${count}`))
  }
}

/** The sentence for the user; `count` in words. */
export function tooManyMet(count: string): string {
  return (
    `${count} stacks meet all limits; the complete method ranks at most ${mostMet} of them. ` +
    'Narrow the limits or the ranges, or write "method: sampled".'
  )
}

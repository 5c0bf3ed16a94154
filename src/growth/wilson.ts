/** The normal deviate that leaves 2.5 % on either side. */
const z = 1.959963984540054

/**
 * Wilson's score interval of a proportion, 95 %: E. B. Wilson, J. Am. Stat. Assoc. 22, 209 (1927), from memory. Fractions;
 * at 0 of n and n of n the outer end is exactly 0 or 1.
 */
export function wilson(passed: number, trials: number): readonly [low: number, high: number] {
  const share = passed / trials
  const z2 = (z * z) / trials
  const middle = (share + 0.5 * z2) / (1 + z2)
  const half = (z * Math.sqrt((share * (1 - share)) / trials + (0.25 * z2) / trials)) / (1 + z2)
  return [passed === 0 ? 0 : middle - half, passed === trials ? 1 : middle + half]
}

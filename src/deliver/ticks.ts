export interface Tick {
  readonly value: number
  readonly text: string
}

/**
 * Round values in [from, to], about `wanted` of them, 1, 2 or 5 times a power of ten apart. Made of products and quotients only: the
 * ticks of the plotting libraries take logarithms of the JavaScript engine, whose last digit is nobody's promise.
 */
export function roundTicks(from: number, to: number, wanted: number): Tick[] {
  const { step, inverse, digits } = roundStep((to - from) / wanted)
  const value = (n: number) => (inverse === null ? n * step : n / inverse)
  const ticks: Tick[] = []
  for (let n = Math.ceil(from / step - 1e-9); value(n) <= to + 1e-9 * step; n++) {
    ticks.push({ value: value(n), text: value(n).toFixed(digits).replace('-', '\u2212') })
  }
  return ticks
}

/** The least of 1, 2, 5 times a power of ten that is at least `raw`; up to 1 it is the inverse of a whole number. */
function roundStep(raw: number): { step: number; inverse: number | null; digits: number } {
  if (!(raw > 1e-15 && raw < 1e15)) throw new RangeError(`No round step for an axis with steps of ${raw}.`)
  let power = 1
  if (raw > 1) {
    while (power * 10 < raw) power *= 10
    const times = [2, 5, 10].find((factor) => power * factor >= raw)!
    return { step: power * times, inverse: null, digits: 0 }
  }
  while (1 / (power * 10) >= raw) power *= 10
  const digits = String(power).length
  const per = [5, 2].find((factor) => 1 / (power * factor) >= raw)
  if (per !== undefined) return { step: 1 / (power * per), inverse: power * per, digits }
  return { step: 1 / power, inverse: power, digits: digits - 1 }
}

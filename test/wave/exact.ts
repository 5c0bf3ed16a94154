import type { Decimal } from 'decimal.js'

/** The exact binary value of a double; `new Decimal(x)` takes the shortest decimal string instead, half a unit off. */
export function exact(x: number, D: typeof Decimal): Decimal {
  const double = new Float64Array([x])
  const bits = new BigUint64Array(double.buffer)[0]
  const exponent = Number((bits >> 52n) & 0x7ffn)
  const fraction = bits & 0xfffffffffffffn
  const mantissa = exponent === 0 ? fraction : fraction | 0x10000000000000n
  const wide = D.clone({ precision: Math.max(D.precision, 60) })
  const power = new wide(2).pow(Math.max(exponent, 1) - 1075)
  const value = new D(new wide(mantissa.toString()).times(power))
  return x < 0 ? value.neg() : value
}

/** Distance of x from the true value in units in the last place of x. */
export function ulps(x: number, truth: Decimal, D: typeof Decimal): number {
  const exponent = Math.max(Math.floor(Math.log2(Math.abs(x))), -1022)
  return truth
    .minus(exact(x, D))
    .abs()
    .div(new D(2).pow(exponent - 52))
    .toNumber()
}

/** A decimal text times a power of ten, rounded once: shifted('80', -3) is the literal 0.08. */
export function shifted(text: string, exponent: number): number {
  const [mantissa, power] = text.toLowerCase().split('e')
  return Number(`${mantissa}e${Number(power ?? 0) + exponent}`)
}

/** from, from + step, ... up to `to`, rounded to the 14 digits that a job would be written in; the ends stay as given. */
export function stepped(from: number, to: number, step: number): number[] {
  const count = stepsBetween(from, to, step)
  const values = Array.from({ length: count + 1 }, (_, i) => (i === 0 ? from : tidy(from + i * step)))
  if (count > 0 && Math.abs(values[count] - to) <= 1e-9 * step) values[count] = to
  return values
}

export function stepsBetween(from: number, to: number, step: number): number {
  return Math.floor((to - from) / step + 1e-9)
}

/** 10^exponent by powers and square roots only, so that it is the same on every machine. */
export function tenTo(exponent: number): number {
  const whole = Math.floor(exponent)
  let rest = exponent - whole
  let factor = 1
  for (let root = Math.sqrt(10), bit = 0; rest > 0 && bit < 54; bit++, root = Math.sqrt(root)) {
    rest *= 2
    if (rest >= 1) {
      factor *= root
      rest -= 1
    }
  }
  return factor === 1 ? Number(`1e${whole}`) : factor * Number(`1e${whole}`)
}

function tidy(value: number): number {
  return Number(value.toPrecision(14))
}

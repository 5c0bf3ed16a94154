import type { Decimal } from 'decimal.js'

/**
 * Transmission in as many digits as asked for, from amplitudes of travelling and decaying waves matched at every
 * interface: another algorithm than the core's, in other arithmetic. Media are given as exact decimals.
 */
export interface DecimalLayer {
  q: Decimal
  mu: Decimal
  w: Decimal
}

export interface DecimalLead {
  q: Decimal
  mu: Decimal
}

type Complex = [Decimal, Decimal]

export function decimalT(entry: DecimalLead, layers: DecimalLayer[], exit: DecimalLead, D: typeof Decimal): Decimal {
  const times = (a: Complex, b: Complex): Complex => [
    a[0].times(b[0]).minus(a[1].times(b[1])),
    a[0].times(b[1]).plus(a[1].times(b[0])),
  ]
  const plus = (a: Complex, b: Complex): Complex => [a[0].plus(b[0]), a[1].plus(b[1])]
  const minus = (a: Complex, b: Complex): Complex => [a[0].minus(b[0]), a[1].minus(b[1])]
  const over = (a: Complex, b: Complex): Complex => {
    const size = b[0].times(b[0]).plus(b[1].times(b[1]))
    const top = times(a, [b[0], b[1].neg()])
    return [top[0].div(size), top[1].div(size)]
  }
  const zero = new D(0)
  const wave = (q: Decimal): Complex => (q.gt(0) ? [new D(q).sqrt(), zero] : [zero, new D(q).neg().sqrt()])
  // e^(-i k w): the wave that runs to the exit, carried from the right face to the left one.
  const back = (k: Complex, w: Decimal): Complex => {
    const phase = k[0].times(w)
    const size = k[1].times(w).exp()
    return [size.times(phase.cos()), size.times(phase.sin()).neg()]
  }
  const half = (a: Complex): Complex => [a[0].div(2), a[1].div(2)]
  const admittance = (m: DecimalLead): Complex => {
    const k = wave(new D(m.q))
    return [k[0].div(m.mu), k[1].div(m.mu)]
  }
  let forward: Complex = [new D(1), zero]
  let backward: Complex = [zero, zero]
  let Y = admittance(exit)
  const media = [entry, ...layers]
  for (let j = media.length - 1; j >= 0; j--) {
    const left = admittance(media[j])
    const ratio = over(Y, left)
    const sum = plus(forward, backward)
    const difference = times(ratio, minus(forward, backward))
    forward = half(plus(sum, difference))
    backward = half(minus(sum, difference))
    if (j > 0) {
      const layer = layers[j - 1]
      const turn = back(wave(new D(layer.q)), new D(layer.w))
      forward = times(forward, turn)
      backward = over(backward, turn)
    }
    Y = left
  }
  const size = forward[0].times(forward[0]).plus(forward[1].times(forward[1]))
  const near = admittance(entry)[0]
  return admittance(exit)[0].div(near).div(size)
}

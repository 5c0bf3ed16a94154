import { log, sinCos } from '../wave/index.js'
import { philox } from './philox.js'

/** Independent random numbers, one after the other. */
export interface RandomStream {
  /** 32 random bits. */
  word(): number
  /** In [0, 1), 53 bits. */
  uniform(): number
  /** A whole number from 0 to below `count`, each as likely as the next; count up to 2^32. */
  integer(count: number): number
  /** Mean 0, standard deviation 1. */
  normal(): number
}

/**
 * The stream of a seed and a place: what it gives depends on them alone, not on what was drawn before or elsewhere. `place` names
 * it: words and whole numbers from 0 to below 2^53, `'unit', 17`. Different seeds or places give unrelated streams.
 */
export function randomStream(seed: Uint32Array | string, ...place: readonly (number | string)[]): RandomStream {
  return new PhiloxStream(digest([wordsOf(seed), ...place.map(wordsOf)]))
}

class PhiloxStream implements RandomStream {
  /** Words 0 and 1 count the blocks, 2 and 3 are the stream's own. */
  private readonly counter: Uint32Array
  private readonly block = new Uint32Array(4)
  private used = 4
  private readonly trig = new Float64Array(2)
  private spare: number | null = null

  constructor(private readonly key: Uint32Array) {
    this.counter = Uint32Array.of(0, 0, key[2], key[3])
  }

  word(): number {
    if (this.used === 4) {
      philox(this.counter, this.key[0], this.key[1], this.block)
      if (++this.counter[0] === 0) this.counter[1]++
      this.used = 0
    }
    return this.block[this.used++]
  }

  uniform(): number {
    const high = this.word() >>> 5
    const low = this.word() >>> 6
    return (high * 67108864 + low) / 9007199254740992
  }

  integer(count: number): number {
    // Words beyond the last whole multiple of count would favour the small numbers.
    const end = 4294967296 - (4294967296 % count)
    for (;;) {
      const word = this.word()
      if (word < end) return word % count
    }
  }

  /** Box and Muller's pair, with the engine's own elementary functions. */
  normal(): number {
    if (this.spare !== null) {
      const { spare } = this
      this.spare = null
      return spare
    }
    const radius = Math.sqrt(-2 * log(1 - this.uniform()))
    sinCos(2 * Math.PI * this.uniform(), this.trig)
    this.spare = radius * this.trig[0]
    return radius * this.trig[1]
  }
}

/** Words with a head that says their kind and number, so that no two lists of parts look alike. */
function wordsOf(part: Uint32Array | string | number): number[] {
  if (typeof part === 'string')
    return [1, part.length, ...Array.from({ length: part.length }, (_, i) => part.charCodeAt(i))]
  if (typeof part === 'number') return [2, part >>> 0, Math.floor(part / 4294967296)]
  return [3, part.length, ...part]
}

/** 128 bits of the parts: blocks of four words, each folded in by Philox (Davies and Meyer's construction). */
function digest(parts: readonly number[][]): Uint32Array {
  const words = parts.flat()
  const state = new Uint32Array(4)
  const block = new Uint32Array(4)
  const mixed = new Uint32Array(4)
  for (let first = 0; first < words.length; first += 4) {
    for (let i = 0; i < 4; i++) block[i] = state[i] ^ (words[first + i] ?? 0)
    philox(block, first, words.length, mixed)
    for (let i = 0; i < 4; i++) state[i] = mixed[i] ^ block[i]
  }
  return state
}

import { type Rational, rational } from '../../shared/engine/arithmetic/rational.ts'

/** Random numbers from a seed that a failing test prints, so that the failure can be repeated: RANDOM_SEED=… npx vitest … */
export class Random {
  readonly seed: number
  private state: number

  constructor(seed = Number(process.env.RANDOM_SEED ?? Date.now() % 2 ** 31)) {
    this.seed = seed
    this.state = seed >>> 0
  }

  /** 32 random bits (a Weyl sequence through a multiplicative mixer). */
  bits(): number {
    this.state = (this.state + 0x9e3779b9) >>> 0
    let x = this.state
    x = Math.imul(x ^ (x >>> 16), 0x21f0aaad)
    x = Math.imul(x ^ (x >>> 15), 0x735a2d97)
    return (x ^ (x >>> 15)) >>> 0
  }

  /** A whole number from `least` to `most`. */
  whole(least: number, most: number): number {
    return least + Math.floor((this.bits() / 2 ** 32) * (most - least + 1))
  }

  /** A non-negative integer of at most `count` bits, short ones and ones with long runs of 0 or 1 among them. */
  big(count: number): bigint {
    let value = 0n
    const length = this.whole(1, count)
    const run = this.whole(0, 3) === 0
    for (let done = 0; done < length; done += 32) {
      const word = run ? (this.bits() % 2 === 0 ? 0 : 2 ** 32 - 1) : this.bits()
      value = (value << 32n) | BigInt(word)
    }
    return BigInt.asUintN(length, value)
  }

  signed(count: number): bigint {
    return this.bits() % 2 === 0 ? this.big(count) : -this.big(count)
  }

  fraction(count: number): Rational {
    return rational(this.signed(count), this.big(count) + 1n)
  }
}

import { type Arithmetic, type Vector, type Weights, makeWeights } from '../arithmetic/arithmetic.ts'
import { abs, bitLength } from '../arithmetic/integers.ts'
import { leastPrimeDivisors, primesUpTo } from '../arithmetic/primes.ts'
import { dyadic, rational } from '../arithmetic/rational.ts'
import { etaWeights } from './borwein.ts'

/** What the zeta values of one computation are made with; every choice is sound, some are slow or coarse. */
export interface ZetaSettings {
  /** Terms of the alternating sum for eta (Z-1). */
  terms: number
  /** The primes up to here are split off from the prime zeta function (Z-3). */
  split: number
}

/** What all points s share: logarithms of primes, the weights of the eta sum in the order of the power vectors. */
export interface ZetaContext<N> {
  readonly arithmetic: Arithmetic<N>
  readonly split: number
  /** The primes <= split, ascending: the first entries of every power vector. */
  readonly primes: readonly number[]
  /** The integers n whose powers n^-s the eta sum needs or may need: `primes`, then the others. */
  readonly members: readonly number[]
  /** position[n] is the index of n in `members`. */
  readonly position: ReadonlyMap<number, number>
  readonly leastDivisor: Uint32Array
  /** Sizes and signs of the coefficients of the eta sum (Z-1), in the order of `members`, and the bound of its error. */
  readonly etaSizes: Vector<N>
  readonly etaSigns: Weights
  readonly etaError: N
  readonly primeSum: Weights
  readonly log2: N
  readonly one: N
  /** An integer below 256 log2(split + 1). */
  readonly logSplitLower: number
  logPrime(p: number): N
}

export function createZetaContext<N>(arithmetic: Arithmetic<N>, settings: ZetaSettings): ZetaContext<N> {
  const { terms, split } = settings
  const primes = primesUpTo(split)
  const needed = Array.from({ length: terms }, (_, i) => i + 1).filter((n) => !primes.includes(n))
  // Primes above the split come before the composites that are made from them.
  const members = [...primes, ...needed]
  const position = new Map(members.map((n, index) => [n, index]))

  const plain = etaWeights(terms)
  const inOrder = members.map((n) => (n <= terms ? plain.numerators[n - 1] : 0n))
  const logs = new Map<number, N>()

  return {
    arithmetic,
    split,
    primes,
    members,
    position,
    leastDivisor: leastPrimeDivisors(Math.max(terms, split, 2)),
    etaSizes: arithmetic.vector(inOrder.map((c) => arithmetic.rational(rational(abs(c), plain.divisor)))),
    etaSigns: makeWeights(inOrder.map((c) => (c < 0n ? -1n : c > 0n ? 1n : 0n)), 1n),
    etaError: arithmetic.rational(rational(1n, plain.divisor)),
    primeSum: makeWeights(primes.map(() => 1n), 1n),
    log2: arithmetic.log2(),
    one: arithmetic.rational(rational(1n)),
    logSplitLower: bitLength(BigInt(split + 1) ** 256n) - 1,
    logPrime(p) {
      let value = logs.get(p)
      if (value === undefined) {
        value = arithmetic.keep(() => (p === 2 ? arithmetic.log2() : arithmetic.log(arithmetic.rational(rational(p)))))
        logs.set(p, value)
      }
      return value
    },
  }
}

/** 2^-bits as an interval, a handy bound. */
export function powerOfTwo<N>(arithmetic: Arithmetic<N>, bits: number): N {
  return arithmetic.rational(dyadic(1n, bits))
}

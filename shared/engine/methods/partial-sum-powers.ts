import { type Arithmetic, type Vector, type Weights, makeWeights } from '../arithmetic/arithmetic.ts'
import { binomial } from '../arithmetic/integers.ts'
import { primesUpTo } from '../arithmetic/primes.ts'
import { ONE, ZERO, compare, rational } from '../arithmetic/rational.ts'
import type { PrimePowerTail } from '../estimates/prime-power-tail.ts'
import { symmetricFunction } from '../series/symmetric.ts'
import type { SetOfIntegers } from '../sets/definition.ts'
import { type BinTable, LARGEST_EXPONENT, LOG_BINS_FROM } from '../sieve/log-moments.ts'

const SMALL_PRIMES = primesUpTo(LOG_BINS_FROM)
const ALL_SMALL: Weights = makeWeights(SMALL_PRIMES.map(() => 1n), 1n)
/** Powers of 1/(p^s) that make up 1/(p^s - 1)^j over large primes; what is left out is below 2^-100. */
const POWERS = 12

export type ProductSet = Extract<SetOfIntegers, { kind: 'almost-primes' | 'squarefree-almost-primes' | 'distinct-prime-factors' }>

/** What is known of the primes up to the cut-off and beyond. */
export interface PrimeKnowledge<N> {
  cutoff: number
  bins: BinTable<N>
  tail: PrimePowerTail<N>
}

/** The sums of p^-js over the primes at one real s > 1, and what is made of them. */
export class PartialPrimePoint<N> {
  private readonly arithmetic: Arithmetic<N>
  private readonly knowledge: PrimeKnowledge<N>
  /** s - 1 and its logarithm. */
  private readonly y: N
  private readonly logY: N
  private readonly s: N
  private readonly smallPowers: Vector<N>[]
  private readonly large: N[] = []
  private readonly binFactors: Vector<N>[] = []

  constructor(arithmetic: Arithmetic<N>, knowledge: PrimeKnowledge<N>, logsOfSmall: readonly N[], y: N, logY: N) {
    this.arithmetic = arithmetic
    this.knowledge = knowledge
    this.y = y
    this.logY = logY
    this.s = arithmetic.add(arithmetic.rational(ONE), y)
    const minus = arithmetic.negate(this.s)
    this.smallPowers = [arithmetic.vector(logsOfSmall.map((log) => arithmetic.exp(arithmetic.multiply(minus, log))))]
  }

  /** The Dirichlet series of a set at s. *Claim*: contains it. *Bound*: S-9, Z-4. */
  series(set: ProductSet): N {
    const { arithmetic } = this
    const sum = set.kind === 'distinct-prime-factors' ? (j: number) => this.ratioSum(j, set.exclude) : (j: number) => this.powerSum(j, set.exclude)
    return symmetricFunction(arithmetic, set.kind === 'almost-primes' ? 'complete' : 'elementary', sum, [], set.k)
  }

  /** Sum of p^-js over the primes not excluded. */
  private powerSum(j: number, exclude: readonly number[]): N {
    const { arithmetic } = this
    let total = arithmetic.add(arithmetic.dot(ALL_SMALL, this.small(j)), this.overLarge(j))
    for (const p of exclude) total = arithmetic.subtract(total, this.power(p, j))
    return total
  }

  /** Sum of (p^s - 1)^-j over the primes not excluded: over large ones by sum over i >= j of C(i-1, j-1) p^-is. */
  private ratioSum(j: number, exclude: readonly number[]): N {
    const { arithmetic } = this
    const one = arithmetic.rational(ONE)
    const ratio = (power: N): N => {
      const base = arithmetic.divide(power, arithmetic.subtract(one, power))
      let result = base
      for (let i = 1; i < j; i++) result = arithmetic.multiply(result, base)
      return result
    }
    const last = Math.max(j, POWERS)
    let total = arithmetic.rational(ZERO)
    for (let i = j; i <= last; i++) total = arithmetic.add(total, arithmetic.scale(this.overLarge(i), rational(binomial(i - 1, j - 1))))
    // C(i-1, j-1) <= 2^(i-1) and 2 p^-s < 2^-9: the terms i > last add up to at most 2^(last+1) times those for last + 1.
    total = arithmetic.addError(total, arithmetic.scale(this.beyond(LOG_BINS_FROM - 1, last + 1), rational(2n ** BigInt(last + 1))))
    SMALL_PRIMES.forEach((p, i) => {
      if (!exclude.includes(p)) total = arithmetic.add(total, ratio(arithmetic.item(this.small(1), i)))
    })
    for (const p of exclude) if (p > LOG_BINS_FROM) total = arithmetic.subtract(total, ratio(this.power(p, 1)))
    return total
  }

  private small(j: number): Vector<N> {
    const { smallPowers } = this
    while (smallPowers.length < j) smallPowers.push(this.arithmetic.multiplyVectors(smallPowers[smallPowers.length - 1], smallPowers[0]))
    return smallPowers[j - 1]
  }

  private power(p: number, j: number): N {
    const index = SMALL_PRIMES.indexOf(p)
    if (index >= 0) return this.arithmetic.item(this.small(j), index)
    return this.arithmetic.exp(this.arithmetic.scale(this.arithmetic.multiply(this.s, this.arithmetic.log(this.arithmetic.rational(rational(p)))), rational(-j)))
  }

  /** Sum of p^-js over the primes above LOG_BINS_FROM: bins and tail, or where js is large its bound. */
  private overLarge(j: number): N {
    const { arithmetic, knowledge } = this
    if (this.large[j] === undefined) {
      const exponent = arithmetic.scale(this.s, rational(j))
      if (compare(arithmetic.upper(exponent), rational(LARGEST_EXPONENT)) > 0) {
        this.large[j] = this.fromZero(this.beyond(LOG_BINS_FROM - 1, j))
      } else {
        const rest = j === 1 ? knowledge.tail.sum(this.y, this.logY) : this.fromZero(this.beyond(knowledge.cutoff, j))
        this.large[j] = arithmetic.add(knowledge.bins.powerSum(exponent, this.factors(j)), rest)
      }
    }
    return this.large[j]
  }

  /** e^(-(js-1) lambda) over the bins. */
  private factors(j: number): Vector<N> {
    const { arithmetic, binFactors, knowledge } = this
    if (binFactors.length === 0) binFactors.push(knowledge.bins.factors(this.y))
    const step = j > 1 ? arithmetic.multiplyVectors(binFactors[0], knowledge.bins.inverses) : binFactors[0]
    while (binFactors.length < j) binFactors.push(arithmetic.multiplyVectors(binFactors[binFactors.length - 1], step))
    return binFactors[j - 1]
  }

  /** x^(1-js)/(js - 1), above the sum of n^-js over n > x; js > 1. */
  private beyond(x: number, j: number): N {
    const { arithmetic } = this
    const excess = arithmetic.add(arithmetic.scale(this.y, rational(j)), arithmetic.rational(rational(j - 1)))
    const decay = arithmetic.exp(arithmetic.negate(arithmetic.multiply(excess, arithmetic.log(arithmetic.rational(rational(x))))))
    return arithmetic.divide(decay, excess)
  }

  private fromZero(bound: N): N {
    return this.arithmetic.between(ZERO, this.arithmetic.upper(bound))
  }
}

export function logsOfSmallPrimes<N>(arithmetic: Arithmetic<N>): N[] {
  return SMALL_PRIMES.map((p) => arithmetic.log(arithmetic.rational(rational(p))))
}

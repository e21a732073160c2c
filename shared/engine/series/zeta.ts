import type { Vector } from '../arithmetic/arithmetic.ts'
import { bitLength } from '../arithmetic/integers.ts'
import { rational } from '../arithmetic/rational.ts'
import { type ZetaContext, powerOfTwo } from './zeta-context.ts'

/**
 * The powers n^-s and the zeta values at the multiples s, 2s, 3s, … of one real s > 1, each made once, when first asked for.
 * The excess x = s - 1 and its logarithm come from outside, because near the pole they are known much better than s.
 */
export class ZetaPoint<N> {
  readonly context: ZetaContext<N>
  readonly excess: N
  readonly logExcess: N
  readonly s: N
  /** Results shared by several series at this point, by a name of their own. */
  readonly shared = new Map<string, N[]>()
  private readonly primeVectors: Vector<N>[] = []
  private readonly etas: N[] = []
  /** Coefficient times n^(-rs) for each term of the eta sum, r being the number of `etas`. */
  private etaTerms: Vector<N>
  private powersOfMembers: Vector<N> | undefined
  private readonly otherPowers = new Map<number, N[]>()

  constructor(context: ZetaContext<N>, excess: N, logExcess: N) {
    this.context = context
    this.excess = excess
    this.logExcess = logExcess
    this.s = context.arithmetic.add(context.one, excess)
    this.etaTerms = context.etaSizes
  }

  /** The vector of p^(-rs) over the context's primes; each r costs one product an entry more than the one before. */
  primePowers(r: number): Vector<N> {
    const { arithmetic, primes } = this.context
    const { primeVectors } = this
    if (primeVectors.length === 0) primeVectors.push(arithmetic.vector(primes.map((_, i) => arithmetic.item(this.powers(), i))))
    while (primeVectors.length < r) primeVectors.push(arithmetic.multiplyVectors(primeVectors[primeVectors.length - 1], primeVectors[0]))
    return primeVectors[r - 1]
  }

  /** p^(-rs) for a prime p. */
  primePower(p: number, r: number): N {
    const { arithmetic, position, primes } = this.context
    const index = position.get(p)
    if (index !== undefined && index < primes.length) return arithmetic.item(this.primePowers(r), index)
    let known = this.otherPowers.get(p)
    if (!known) {
      known = [this.exponentialOf(p)]
      this.otherPowers.set(p, known)
    }
    while (known.length < r) known.push(arithmetic.multiply(known[known.length - 1], known[0]))
    return known[r - 1]
  }

  /** Product over the primes p <= split of 1 - p^(-rs). */
  eulerFactors(r: number): N {
    return this.context.arithmetic.eulerProduct(this.primePowers(r), this.context.primes.length)
  }

  /**
   * *Claim*: contains eta(rs) = (1 - 2^(1-rs)) zeta(rs). *Valid for*: s > 0, r >= 1. *Bound*: Z-1.
   * The terms go from r to r + 1 by one product each, the coefficients being in them from the start; so the values are made in turn.
   */
  eta(r: number): N {
    const { arithmetic, etaSigns, etaError } = this.context
    while (this.etas.length < r) {
      this.etaTerms = arithmetic.multiplyVectors(this.etaTerms, this.powers())
      this.etas.push(arithmetic.addError(arithmetic.dot(etaSigns, this.etaTerms), etaError))
    }
    return this.etas[r - 1]
  }

  /** *Claim*: contains (s-1) zeta(s), to full accuracy also where s is as near to 1 as you like. *Valid for*: s >= 1. *Bound*: Z-2. */
  zetaTimesExcess(): N {
    return this.context.arithmetic.divide(this.eta(1), this.binaryFactor())
  }

  /** *Claim*: contains zeta(rs). *Valid for*: s >= 1, r >= 2. *Bound*: Z-1. */
  zeta(r: number): N {
    const { arithmetic, one } = this.context
    const factor = arithmetic.subtract(one, arithmetic.scale(this.primePower(2, r), rational(2)))
    return arithmetic.divide(this.eta(r), factor)
  }

  private exponentialOf(p: number): N {
    const { arithmetic } = this.context
    return arithmetic.exp(arithmetic.negate(arithmetic.multiply(this.s, this.context.logPrime(p))))
  }

  /** The vector of n^-s over the context's members. */
  private powers(): Vector<N> {
    this.powersOfMembers ??= this.makePowers()
    return this.powersOfMembers
  }

  private makePowers(): Vector<N> {
    const { arithmetic, members, leastDivisor, one } = this.context
    const found = new Map<number, N>([[1, one]])
    const power = (n: number): N => {
      let value = found.get(n)
      if (value === undefined) {
        const p = leastDivisor[n]
        value = p === n ? this.exponentialOf(n) : arithmetic.multiply(power(p), power(n / p))
        found.set(n, value)
      }
      return value
    }
    return arithmetic.vector(members.map(power))
  }

  /**
   * (1 - 2^-x)/x at the excess x >= 0: by its series sum (-y)^i/(i+1)! times log 2, y = x log 2, where y < 2^-6, so that
   * nothing cancels. The terms alternate and decrease, so the rest is below the first one left out (Z-2).
   */
  private binaryFactor(): N {
    const { arithmetic, one, log2 } = this.context
    const [, upper] = arithmetic.fixedBounds(this.excess)
    const smallness = arithmetic.precision - bitLength(upper)
    const y = arithmetic.multiply(this.excess, log2)
    if (smallness < 6) {
      return arithmetic.divide(arithmetic.subtract(one, arithmetic.exp(arithmetic.negate(y))), this.excess)
    }
    // x < 2^-smallness, hence y too, and |y|^terms < 2^-precision. The interval of y may reach below 0; see Z-2.
    const terms = Math.ceil(arithmetic.precision / smallness) + 1
    let series = one
    for (let i = terms - 1; i >= 1; i--) {
      series = arithmetic.subtract(one, arithmetic.scale(arithmetic.multiply(y, series), rational(1, i + 1)))
    }
    return arithmetic.multiply(log2, arithmetic.addError(series, powerOfTwo(arithmetic, smallness * terms)))
  }
}

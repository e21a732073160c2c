import { bitLength, floorShift } from '../arithmetic/integers.ts'
import { moebius } from '../arithmetic/primes.ts'
import { rational } from '../arithmetic/rational.ts'
import type { ZetaPoint } from './zeta.ts'
import { powerOfTwo } from './zeta-context.ts'

/**
 * The prime zeta values P(s), P(2s), … at one point, through
 *   sum over p > A of p^-js = sum over m >= 1 of mu(m)/m log zeta_A(jms),
 * zeta_A being zeta without its Euler factors at the primes <= A. The sum is cut after jm = `order`.
 */
export class PrimeZeta<N> {
  readonly point: ZetaPoint<N>
  /** The largest r for which log zeta_A(rs) is used. */
  readonly order: number
  /** (A+1)^-s <= 2^-bitsOfStep. */
  private readonly bitsOfStep: number
  private readonly logs: N[] = []
  private readonly rough: N[] = []

  constructor(point: ZetaPoint<N>) {
    const { arithmetic, logSplitLower } = point.context
    this.point = point
    // A lower bound of 256 s. All products here are below 2^53 and divided by powers of two: exact in a double.
    const [lower] = arithmetic.fixedBounds(point.s)
    const s = Math.min(2 ** 20, Math.max(256, Number(floorShift(lower, arithmetic.precision - 8))))
    this.bitsOfStep = (s * logSplitLower) / 2 ** 16
    this.order = 1
    while (this.roughBits(this.order + 1) < arithmetic.precision) this.order++
  }

  /**
   * *Claim*: sum over p > A of p^(-rs), and log zeta_A(rs), are at most 2^-result; so is the sum of either over all r' >= r.
   * *Valid for*: s >= 1, r >= 2. *Bound*: Z-3: 4 (A+1) (A+1)^(-rs). *Rounding*: the result is rounded down.
   */
  roughBits(r: number): number {
    return Math.floor(r * this.bitsOfStep) - bitLength(BigInt(4 * (this.point.context.split + 1)))
  }

  /** log zeta_A(rs) for 1 <= r <= order; at r = 1 it contains the term -log(s-1) of the pole. */
  logRough(r: number): N {
    if (this.logs[r] === undefined) {
      const { point } = this
      const { arithmetic } = point.context
      const regular = r === 1 ? point.zetaTimesExcess() : point.zeta(r)
      const log = arithmetic.log(arithmetic.multiply(regular, point.eulerFactors(r)))
      this.logs[r] = r === 1 ? arithmetic.subtract(log, point.logExcess) : log
    }
    return this.logs[r]
  }

  /**
   * Sum over the primes p > split of p^(-js).
   * *Claim*: contains it. *Valid for*: s > 1, j >= 1. *Bound*: Z-3.
   */
  overRoughPrimes(j: number): N {
    if (this.rough[j] === undefined) {
      const { arithmetic } = this.point.context
      let total = arithmetic.rational(rational(0))
      for (let m = 1; m * j <= this.order; m++) {
        const mu = moebius(m)
        if (mu !== 0) total = arithmetic.add(total, m === 1 ? this.logRough(j) : arithmetic.scale(this.logRough(j * m), rational(mu, m)))
      }
      const firstLeftOut = j * (Math.floor(this.order / j) + 1)
      this.rough[j] = arithmetic.addError(total, powerOfTwo(arithmetic, this.roughBits(firstLeftOut)))
    }
    return this.rough[j]
  }

  /** P(js) less the excluded primes' share. *Claim*: contains it. *Valid for*: s > 1, j >= 1. *Bound*: Z-3. */
  value(j: number, exclude: readonly number[]): N {
    const { arithmetic, primeSum } = this.point.context
    const key = 'prime-zeta'
    const known = this.point.shared.get(key) ?? []
    this.point.shared.set(key, known)
    known[j] ??= arithmetic.add(arithmetic.dot(primeSum, this.point.primePowers(j)), this.overRoughPrimes(j))
    return exclude.reduce((rest, p) => arithmetic.subtract(rest, this.point.primePower(p, j)), known[j])
  }
}

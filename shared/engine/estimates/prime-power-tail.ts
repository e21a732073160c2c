import type { Arithmetic } from '../arithmetic/arithmetic.ts'
import { ONE, ZERO, compare, rational } from '../arithmetic/rational.ts'
import { EngineRefusal } from '../errors.ts'
import type { EstimateUse } from '../methods/computation.ts'
import { eulerGamma } from '../series/euler-gamma.ts'
import { thetaEnvelope } from './envelope.ts'
import type { Estimate, Term } from './estimate.ts'
import { logPowerIntegral } from './log-power-integral.ts'
import { type Interval, integralOfBound, usesOf } from './prime-tail.ts'

const RECIPROCAL = { power: ONE, logPower: ZERO }
const FOUR = rational(4)

/** The sign that all terms of a bound have. */
function signOf(terms: readonly Term[]): -1 | 1 {
  const negative = terms.filter(({ coefficient }) => coefficient.startsWith('-')).length
  if (negative !== 0 && negative !== terms.length) throw new Error('a bound whose terms differ in sign')
  return negative === 0 ? 1 : -1
}

/** The sums of p^-s over all primes p > x, for many real s > 1. */
export class PrimePowerTail<N> {
  readonly uses: EstimateUse[]
  private readonly arithmetic: Arithmetic<N>
  private readonly cutoff: number
  private readonly logX: N
  private readonly logLogX: N
  private readonly excess: N
  private readonly gamma: N
  /** The integrals of the bounds of E(t) against -h' at s = 1: at most 0, and at least 0. */
  private readonly low: N
  private readonly high: N

  /** `theta` contains theta(cutoff). */
  constructor(arithmetic: Arithmetic<N>, cutoff: number, theta: Interval, estimates: readonly Estimate[]) {
    this.arithmetic = arithmetic
    this.cutoff = cutoff
    this.logX = arithmetic.log(arithmetic.rational(rational(cutoff)))
    this.logLogX = arithmetic.log(this.logX)
    this.excess = arithmetic.subtract(arithmetic.between(theta.lo, theta.hi), arithmetic.rational(rational(cutoff)))
    this.gamma = eulerGamma(arithmetic)
    const envelope = thetaEnvelope(arithmetic, cutoff, estimates, RECIPROCAL)
    if (!envelope) throw new EngineRefusal('cutoff_too_small', 'cutoff', 'No estimate of theta covers all that lies beyond this cut-off.')
    this.uses = usesOf(envelope)
    const parts = (side: 'lower' | 'upper'): N =>
      envelope[side]
        .filter(({ terms }) => signOf(terms) === (side === 'lower' ? -1 : 1))
        .map((piece) => integralOfBound(arithmetic, RECIPROCAL, piece))
        .reduce((total, one) => arithmetic.add(total, one), arithmetic.rational(ZERO))
    this.low = parts('lower')
    this.high = parts('upper')
  }

  /**
   * With y = s - 1, L = log x: E_1(yL) - x^-s E(x)/L + x^-y s [low, high].
   * *Claim*: contains the sum over p > x of p^-s. *Valid for*: s > 1, given by y = s - 1 > 0 and log y. *Bound*: S-9.
   */
  sum(y: N, logY: N): N {
    const { arithmetic, logX } = this
    const z = arithmetic.multiply(y, logX)
    const decay = arithmetic.exp(arithmetic.negate(z))
    const main = this.exponentialIntegral(z, arithmetic.add(logY, this.logLogX))
    const atX = arithmetic.divide(arithmetic.scale(arithmetic.multiply(decay, this.excess), rational(1, this.cutoff)), logX)
    const factor = arithmetic.multiply(decay, arithmetic.add(arithmetic.rational(ONE), y))
    const unknown = arithmetic.between(
      arithmetic.lower(arithmetic.multiply(factor, this.low)),
      arithmetic.upper(arithmetic.multiply(factor, this.high)),
    )
    return arithmetic.add(arithmetic.subtract(main, atX), unknown)
  }

  /**
   * E_1(z), the integral of e^-v/v from z on.
   * *Claim*: contains it. *Valid for*: z > 0 with its logarithm. *Bound*: S-9 (by the series -gamma - log z + z - z^2/4 + … where
   * z < 4, else S-4).
   */
  private exponentialIntegral(z: N, logZ: N): N {
    const { arithmetic } = this
    if (compare(arithmetic.upper(z), FOUR) >= 0) return logPowerIntegral(arithmetic, rational(2), ONE, z, null)
    let total = arithmetic.negate(arithmetic.add(this.gamma, logZ))
    let power = arithmetic.rational(rational(-1))
    // power = -(-z)^k/k!; the terms k > last are below 2 (4^k/k!)/k each, and fall by a factor 2 at least.
    const last = 40 + arithmetic.precision
    for (let k = 1; k <= last; k++) {
      power = arithmetic.scale(arithmetic.multiply(power, z), rational(-1, k))
      total = arithmetic.add(total, arithmetic.scale(power, rational(1, k)))
      if (k >= 8 && arithmetic.fixedBounds(power).every((end) => -2n <= end && end <= 2n)) break
    }
    return arithmetic.addError(total, arithmetic.scale(power, rational(2)))
  }
}

import type { Arithmetic } from '../arithmetic/arithmetic.ts'
import { ONE, type Rational, ZERO, add, compare, multiply as times, negate, parseRational, rational, subtract } from '../arithmetic/rational.ts'
import { EngineRefusal } from '../errors.ts'
import type { EstimateUse } from '../methods/computation.ts'
import { units } from '../series/characters.ts'
import { type RationalWeight, negativePower, weightAt } from '../sieve/weight.ts'
import { type Envelope, type Piece, thetaEnvelope } from './envelope.ts'
import type { Estimate, Term } from './estimate.ts'
import { logPowerIntegral } from './log-power-integral.ts'

/** An interval with exact ends. */
export interface Interval {
  lo: Rational
  hi: Rational
}

export interface Tail {
  /** Encloses the sum of the weight over all primes above the cut-off. */
  sum: Interval
  /** The part of its width that comes from what is unknown of theta beyond the cut-off. */
  uncertainty: Rational
  uses: EstimateUse[]
}

/** What theta is summed over, and what is known of it at the cut-off. */
export interface ThetaAt {
  /** Contains theta(x), or theta(x;q,a); null where it is not known and the estimates serve for it, too. */
  value: Interval | null
  /** q; 1 for all primes. */
  modulus: number
}

/**
 * The sum of w(p) = p^-s (log p)^-b over the primes p > x. With h = w/log and E(t) = theta(t) - t it is
 *   integral of h from x on  -  h(x) E(x)  +  integral of E (-h') from x on,
 * where E(x) is known from the sieve, and E beyond x is known to lie between the bounds of the estimates.
 *
 * *Claim*: the interval contains it, if the estimates used are true. *Valid for*: x >= 2, s >= 1, b > 0 where s = 1, `theta`
 * containing theta(x) or null; s log x + b + 1 > 0, else refused, as is a cut-off below every estimate. *Bound*: S-5.
 */
export function primeTail<N>(arithmetic: Arithmetic<N>, weight: RationalWeight, x: number, theta: Interval | null, estimates: readonly Estimate[]): Tail {
  const tail = tailFrom(arithmetic, weight, x, { value: theta, modulus: 1 }, estimates)
  if (tail) return tail
  throw new EngineRefusal('cutoff_too_small', 'cutoff', 'No estimate of theta covers all that lies beyond this cut-off.')
}

/**
 * The same over the primes p > x of one class prime to `modulus`, `theta` containing theta(x;q,a). Where no estimate for the class
 * covers what lies beyond, its sum is taken to be between 0 and that over all primes.
 * *Claim*, *Valid for*, *Bound*: as primeTail.
 */
export function classTail<N>(
  arithmetic: Arithmetic<N>,
  weight: RationalWeight,
  x: number,
  theta: Interval,
  modulus: number,
  estimates: readonly Estimate[],
): Tail {
  const own = tailFrom(arithmetic, weight, x, { value: theta, modulus }, estimates)
  if (own) return own
  const all = primeTail(arithmetic, weight, x, null, estimates)
  return { sum: { lo: ZERO, hi: all.sum.hi }, uncertainty: all.sum.hi, uses: all.uses }
}

/** Null where no estimate covers all that lies beyond. */
function tailFrom<N>(arithmetic: Arithmetic<N>, weight: RationalWeight, x: number, theta: ThetaAt, estimates: readonly Estimate[]): Tail | null {
  let uses: EstimateUse[] = []
  const ends = arithmetic.frame(() => {
    const { add: plus, scale } = arithmetic
    const { power: s, logPower: b } = weight
    const slope = add(b, ONE)
    const logX = arithmetic.log(arithmetic.rational(rational(x)))
    if (compare(arithmetic.lower(plus(scale(logX, s), arithmetic.rational(slope))), ZERO) <= 0) {
      throw new EngineRefusal('cutoff_too_small', 'cutoff', 'The weight does not decrease yet at this cut-off: choose a larger one.')
    }
    const envelope = thetaEnvelope(arithmetic, x, estimates, weight, theta.modulus)
    if (!envelope) return null
    uses = usesOf(envelope)

    const share = rational(1, units(theta.modulus).length)
    const main = scale(logPowerIntegral(arithmetic, s, slope, logX, null), share)
    const excess = theta.value
      ? arithmetic.subtract(arithmetic.between(theta.value.lo, theta.value.hi), arithmetic.rational(times(rational(x), share)))
      : hull(arithmetic, boundAt(arithmetic, envelope.lower[0].terms, logX), boundAt(arithmetic, envelope.upper[0].terms, logX))
    const atX = arithmetic.multiply(weightAt(arithmetic, { power: s, logPower: slope }, x, logX), excess)
    const known = arithmetic.subtract(main, atX)

    const total = (pieces: readonly Piece<N>[]): N =>
      pieces.map((piece) => integralOfBound(arithmetic, weight, piece)).reduce((sum, one) => plus(sum, one))
    const [low, high] = [total(envelope.lower), total(envelope.upper)]
    return {
      lo: arithmetic.lower(plus(known, low)),
      hi: arithmetic.upper(plus(known, high)),
      uncertainty: subtract(arithmetic.upper(high), arithmetic.lower(low)),
    }
  })
  return ends && { sum: { lo: ends.lo, hi: ends.hi }, uncertainty: ends.uncertainty, uses }
}

/** The integral of bound(t) (-h'(t)), -h' = s t^(-s-1) L^(-b-1) + (b+1) t^(-s-1) L^(-b-2), L = log t, over one piece. */
export function integralOfBound<N>(arithmetic: Arithmetic<N>, { power: s, logPower }: RationalWeight, { from, to, terms }: Piece<N>): N {
  const slope = add(logPower, ONE)
  const ofTerm = ({ coefficient, power, logPower, overPi }: Term): N => {
    const [c, a, k] = [coefficient, power, logPower].map((text) => parseRational(text)!)
    const sigma = subtract(add(s, ONE), a)
    const beta = subtract(slope, k)
    const first = arithmetic.scale(logPowerIntegral(arithmetic, sigma, beta, from.log, to && to.log), s)
    const second = arithmetic.scale(logPowerIntegral(arithmetic, sigma, add(beta, ONE), from.log, to && to.log), slope)
    const whole = arithmetic.scale(arithmetic.add(first, second), c)
    return overPi ? arithmetic.divide(whole, arithmetic.pi()) : whole
  }
  return terms.map(ofTerm).reduce((sum, one) => arithmetic.add(sum, one))
}

function boundAt<N>(arithmetic: Arithmetic<N>, terms: readonly Term[], logX: N): N {
  const ofTerm = ({ coefficient, power, logPower, overPi }: Term): N => {
    const [c, a, k] = [coefficient, power, logPower].map((text) => parseRational(text)!)
    const inLog = negativePower(arithmetic, logX, negate(k))
    const whole = arithmetic.scale(arithmetic.timesExp(inLog, arithmetic.scale(logX, a)), c)
    return overPi ? arithmetic.divide(whole, arithmetic.pi()) : whole
  }
  return terms.map(ofTerm).reduce((sum, one) => arithmetic.add(sum, one))
}

function hull<N>(arithmetic: Arithmetic<N>, low: N, high: N): N {
  return arithmetic.between(arithmetic.lower(low), arithmetic.upper(high))
}

/** Where each estimate is used, one that bounds both sides once. */
export function usesOf<N>({ lower, upper }: Envelope<N>): EstimateUse[] {
  return [...lower, ...upper.filter((one) => !lower.some((other) => sameUse(one, other)))].map(useOf)
}

function useOf<N>({ estimate: { id, validFor, conditional }, from, to }: Piece<N>): EstimateUse {
  return { id, usedAt: to === null ? `x >= ${from.label}` : `${from.label} <= x <= ${to.label}`, validFor, conditional }
}

function sameUse<N>(a: Piece<N>, b: Piece<N>): boolean {
  return a.estimate === b.estimate && a.from.key === b.from.key && a.to?.key === b.to?.key
}

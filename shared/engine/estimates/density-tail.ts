import type { Arithmetic } from '../arithmetic/arithmetic.ts'
import { ONE, type Rational, ZERO, add, compare, multiply, rational, subtract } from '../arithmetic/rational.ts'
import { EngineRefusal } from '../errors.ts'
import { type RationalWeight, weightAt } from '../sieve/weight.ts'
import { logPowerIntegral } from './log-power-integral.ts'
import type { Interval } from './prime-tail.ts'

/** A set of integers, 1 included, with #{n <= t} = density t + R(t), |R(t)| <= root sqrt(t) + constant for t >= 1. */
export interface Density<N> {
  density: N
  root: Rational
  constant: Rational
}

/** The integers coprime to the excluded primes: density prod (1 - 1/p), |R| <= 2^r with r of them (S-10). */
export function integerDensity<N>(arithmetic: Arithmetic<N>, exclude: readonly number[]): Density<N> {
  const density = exclude.reduce((product, p) => multiply(product, rational(p - 1, p)), ONE)
  return { density: arithmetic.rational(density), root: ZERO, constant: rational(2n ** BigInt(exclude.length)) }
}

/** The squarefree ones among them: density 6/pi^2 prod p/(p+1), |R(t)| <= (2^r + 1) sqrt t + 1 (S-10). */
export function squarefreeDensity<N>(arithmetic: Arithmetic<N>, exclude: readonly number[]): Density<N> {
  const factor = exclude.reduce((product, p) => multiply(product, rational(p, p + 1)), rational(6))
  const pi = arithmetic.pi()
  return {
    density: arithmetic.divide(arithmetic.rational(factor), arithmetic.multiply(pi, pi)),
    root: rational(2n ** BigInt(exclude.length) + 1n),
    constant: ONE,
  }
}

/**
 * The sum of w(n) = n^-s (log n)^-b over the members n > x of a set with that density, `count` being the number of members <= x,
 * 1 included: density times the integral of w, less R(x) w(x), plus the integral of R (-w').
 * *Claim*: contains it. *Valid for*: x >= 3, s log x + b > 0, else refused; s >= 1, b > 1 where s = 1. *Bound*: S-10.
 */
export function densityTail<N>(arithmetic: Arithmetic<N>, weight: RationalWeight, x: number, count: bigint, set: Density<N>): Interval {
  return arithmetic.frame(() => {
    const { add: plus, subtract: minus, scale } = arithmetic
    const { power: s, logPower: b } = weight
    const logX = decreasingFrom(arithmetic, weight, x)
    const atX = weightAt(arithmetic, weight, x, logX)
    const main = arithmetic.multiply(set.density, logPowerIntegral(arithmetic, s, b, logX, null))
    const excess = minus(arithmetic.rational(rational(count)), scale(set.density, rational(x)))
    // The integral of (root sqrt t + constant) (-w'), -w' = s t^(-s-1) L^-b + b t^(-s-1) L^(-b-1).
    const sigma = add(s, rational(1, 2))
    const first = scale(logPowerIntegral(arithmetic, sigma, b, logX, null), s)
    const second = scale(logPowerIntegral(arithmetic, sigma, add(b, ONE), logX, null), b)
    const unknown = plus(scale(plus(first, second), set.root), scale(atX, set.constant))
    const tail = arithmetic.addError(minus(main, arithmetic.multiply(excess, atX)), unknown)
    // In any case it is not negative and no more than over all integers.
    const whole = arithmetic.upper(logPowerIntegral(arithmetic, s, b, logX, null))
    const [lo, hi] = [arithmetic.lower(tail), arithmetic.upper(tail)]
    return { lo: lo.num > 0n ? lo : ZERO, hi: compare(hi, whole) < 0 ? hi : whole }
  })
}

/** Between 0 and the sum over all integers n > x (S-10). */
export function anyTail<N>(arithmetic: Arithmetic<N>, weight: RationalWeight, x: number): Interval {
  return arithmetic.frame(() => {
    const logX = decreasingFrom(arithmetic, weight, x)
    return { lo: ZERO, hi: arithmetic.upper(logPowerIntegral(arithmetic, weight.power, weight.logPower, logX, null)) }
  })
}

/** log x, where the weight decreases from x on. */
function decreasingFrom<N>(arithmetic: Arithmetic<N>, { power, logPower }: RationalWeight, x: number): N {
  const logX = arithmetic.log(arithmetic.rational(rational(x)))
  if (compare(arithmetic.lower(arithmetic.scale(logX, power)), subtract(ZERO, logPower)) <= 0) {
    throw new EngineRefusal('cutoff_too_small', 'cutoff', 'The weight does not decrease yet at this cut-off: choose a larger one.')
  }
  return logX
}

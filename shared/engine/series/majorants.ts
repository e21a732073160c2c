import { bitLength, factorial } from '../arithmetic/integers.ts'
import { ONE, type Rational, ZERO, add, ceil, ceilScaled, dyadic, multiply, rational, subtract } from '../arithmetic/rational.ts'
import type { Majorant } from './dirichlet.ts'

/**
 * Bounds of D(s0 + t) as t falls to 0, in exact rationals rounded up. With s0 = 1 they are polynomials in y = log(1/t) + 1,
 * because P(1+t) <= log zeta(1+t) <= log(1 + 1/t) <= y; with s0 > 1 the same polynomials at the fixed y >= log zeta(s0).
 */

/** Coefficients are rounded up to this many bits after the point, so that they stay short. */
const BITS = 64

export function roundUp(a: Rational): Rational {
  return dyadic(ceilScaled(a, BITS), BITS)
}

/** *Claim*: log(1 + 1/x) <= result for x > 0. *Bound*: T-3. log q <= log 2 times the bit length of ceil(q), log 2 < 0.6932. */
export function logZetaUpper(excess: Rational): Rational {
  const q = ceil(add(ONE, rational(excess.den, excess.num)))
  return multiply(rational(bitLength(q)), rational(6932, 10_000))
}

/** The polynomial as it is where s0 = 1, else its value at the y that bounds log zeta(s0). */
function atPower(power: Rational, coefficients: Rational[]): Majorant {
  const excess = subtract(power, ONE)
  if (excess.num === 0n) return { coefficients }
  const y = logZetaUpper(excess)
  const value = coefficients.reduceRight((total, c) => add(multiply(total, y), c), ZERO)
  return { coefficients: [roundUp(value)] }
}

/**
 * r_0, …, r_k with sum r_i z^i = exp(sum_{j>=2} q_j z^j/j), q_j = 2^-j (j+1)/(j-1) >= P(j).
 * *Claim*: r_i is at least the coefficient with P(j) in place of q_j. *Bound*: T-3. *Rounding*: up.
 */
function remainderCoefficients(k: number): Rational[] {
  const r = [ONE]
  for (let n = 1; n <= k; n++) {
    let total = ZERO
    for (let j = 2; j <= n; j++) total = add(total, multiply(rational(j + 1, BigInt(j - 1) << BigInt(j)), r[n - j]))
    r.push(roundUp(multiply(total, rational(1, n))))
  }
  return r
}

/** Sum over integers with k prime factors, repeated or not, and any subset of them (T-3). */
export function almostPrimeMajorant(power: Rational, k: number): Majorant {
  const r = remainderCoefficients(k)
  return atPower(power, Array.from({ length: k + 1 }, (_, i) => roundUp(multiply(r[k - i], rational(1, factorial(i))))))
}

/** Exactly k distinct prime factors: D <= (sum_p 1/(p^s - 1))^k / k! <= (P(s) + 1)^k / k! (T-3). */
export function distinctFactorMajorant(power: Rational, k: number): Majorant {
  return atPower(power, Array.from({ length: k + 1 }, (_, i) => rational(1, factorial(i) * factorial(k - i))))
}

/** Subsets of the integers >= 2: zeta(s) - 1 <= 1/(s-1) (T-3). The factor t^-pole stands apart where s0 = 1. */
export function integerMajorant(power: Rational): Majorant {
  const excess = subtract(power, ONE)
  return { coefficients: [excess.num === 0n ? ONE : rational(excess.den, excess.num)] }
}

/** Integers with all prime factors in the list: D(s) <= D(1) = product of p/(p-1), less 1 (T-3). */
export function smoothMajorant(primes: readonly number[]): Majorant {
  const product = primes.reduce((total, p) => roundUp(multiply(total, rational(p, p - 1))), ONE)
  return { coefficients: [subtract(product, ONE)] }
}

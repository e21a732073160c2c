import type { Arithmetic } from '../arithmetic/arithmetic.ts'
import { type Rational, ZERO, add, magnitude, multiply, rational, subtract } from '../arithmetic/rational.ts'
import { bernoulliNumbers } from './bernoulli.ts'

/**
 * Euler's constant.
 * *Claim*: the value contains gamma. *Valid for*: every precision. *Bound*: E-3 (Euler-Maclaurin for 1/x: the error is below
 * the first omitted term). *Rounding*: the rational part is exact; one logarithm and one sum in `arithmetic`.
 */
export function eulerGamma<N>(arithmetic: Arithmetic<N>): N {
  const n = BigInt(Math.max(10, arithmetic.precision >> 1)) // heuristic: affects speed only
  const terms = bernoulliNumbers(Math.max(4, arithmetic.precision >> 2)) // heuristic: affects speed only
  let exact = subtract(harmonic(1n, n + 1n), rational(1n, 2n * n))
  let omitted: Rational = ZERO
  for (let k = 1; k < terms.length; k++) {
    const term = multiply(terms[k], rational(1n, BigInt(2 * k) * n ** BigInt(2 * k)))
    omitted = magnitude(term)
    if (k === terms.length - 1 || omitted.num << BigInt(arithmetic.precision + 4) < omitted.den) break
    exact = add(exact, term)
  }
  const value = arithmetic.subtract(arithmetic.rational(exact), arithmetic.log(arithmetic.rational(rational(n))))
  return arithmetic.addError(value, arithmetic.rational(omitted))
}

/** sum of 1/i over from <= i < to, exactly, by halves, so that the fractions stay small as long as they can. */
function harmonic(from: bigint, to: bigint): Rational {
  if (to - from === 1n) return rational(1n, from)
  const middle = (from + to) >> 1n
  return add(harmonic(from, middle), harmonic(middle, to))
}

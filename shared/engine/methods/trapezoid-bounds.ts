import type { Arithmetic } from '../arithmetic/arithmetic.ts'
import { ONE, type Rational, add, divide, multiply, negate, rational, subtract } from '../arithmetic/rational.ts'
import { EngineRefusal } from '../errors.ts'
import type { DirichletSeries } from '../series/dirichlet.ts'

/** The error bounds of the trapezoid as exact rationals, rounded up; made in an arithmetic of their own, finer than the sum's. */

/**
 * kappa with |h sum_j f(jh) - I| <= kappa I, I the integral of f over the line.
 * *Claim*: kappa = 2 sin(gap)^-b / (e^X - 1), X = 2 pi (pi/2 - gap)/h. *Valid for*: 0 < gap <= 1, b > 0, h > 0.
 * *Bound*: T-2. *Rounding*: up; sin(gap) >= gap - gap^3/6.
 */
export function discretisationUpper<N>(a: Arithmetic<N>, step: Rational, gap: Rational, logPower: Rational): Rational {
  const sineLower = subtract(gap, divide(multiply(gap, multiply(gap, gap)), rational(6)))
  const pi = a.pi()
  // X = (pi^2 - 2 pi gap) / h.
  const exponent = a.scale(a.subtract(a.multiply(pi, pi), a.scale(pi, multiply(rational(2), gap))), divide(ONE, step))
  const growth = a.scale(a.log(a.rational(sineLower)), negate(logPower))
  const one = a.rational(ONE)
  const numerator = a.timesExp(a.rational(rational(2)), a.subtract(growth, exponent))
  return a.upper(a.divide(numerator, a.subtract(one, a.exp(a.negate(exponent)))))
}

/**
 * h times the sum of f over the nodes jh with j < first.
 * *Claim*: at most the result. *Valid for*: first <= -1. *Bound*: T-3. *Rounding*: up.
 * At L = |j| h the term is at most e^(-decay L) Q(L+1); one step down multiplies this by at most
 * e^(-decay h) ((y+h)/y)^degree, y = L + 1, which decreases with L.
 */
export function truncationBelowUpper<N>(a: Arithmetic<N>, series: DirichletSeries, step: Rational, first: number, decay: Rational): Rational {
  const { coefficients } = series.majorant
  const depth = multiply(step, rational(1 - first))
  const y = add(depth, ONE)
  const majorant = coefficients.reduceRight((total, c) => a.add(a.scale(total, y), a.rational(c)), a.rational(rational(0)))
  const term = a.timesExp(majorant, a.rational(negate(multiply(decay, depth))))
  const growth = divide(add(y, step), y)
  let ratio = a.exp(a.rational(negate(multiply(decay, step))))
  for (let i = 1; i < coefficients.length; i++) ratio = a.scale(ratio, growth)
  return geometricUpper(a, a.scale(term, step), ratio, 'first')
}

/**
 * h times the sum of f over the nodes jh with j > last, where `value` encloses f(last h) and `t` encloses e^(last h).
 * *Claim*: at most the result. *Valid for*: ratio < 1, else refused. *Bound*: T-4. *Rounding*: up.
 */
export function truncationAboveUpper<N>(
  a: Arithmetic<N>,
  series: DirichletSeries,
  step: Rational,
  value: Rational,
  t: Rational,
  logPower: Rational,
): Rational {
  const logLeast = a.log(a.rational(rational(series.leastMember)))
  const exponent = a.scale(a.subtract(a.rational(logPower), a.scale(logLeast, t)), step)
  const ratio = a.exp(exponent)
  return geometricUpper(a, a.scale(a.multiply(a.rational(value), ratio), step), ratio, 'last')
}

/** first / (1 - ratio), rounded up. */
function geometricUpper<N>(a: Arithmetic<N>, first: N, ratio: N, field: string): Rational {
  const rest = a.subtract(a.rational(ONE), ratio)
  if (a.lower(rest).num <= 0n) {
    throw new EngineRefusal('unsound_parameter', field, `The parameter ${field} leaves out terms that do not decrease yet.`)
  }
  return a.upper(a.divide(first, rest))
}

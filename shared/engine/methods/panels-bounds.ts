import type { Arithmetic } from '../arithmetic/arithmetic.ts'
import { isqrt } from '../arithmetic/integers.ts'
import { ONE, type Rational, add, compare, multiply, negate, rational, subtract } from '../arithmetic/rational.ts'

/** The error bounds of the panels as exact rationals, rounded up; made in an arithmetic of their own, finer than the sums'. */

/** What a bound needs to know of the summand: n^-power (log n)^-logPower over integers n >= least. */
export interface Summand {
  readonly power: Rational
  readonly logPower: Rational
  readonly least: bigint
}

/**
 * *Claim*: D(sigma) <= result. *Valid for*: sigma > 1. *Bound*: P-8: least^-sigma (1 + least/(sigma - 1)). *Rounding*: up.
 */
export function seriesUpper<N>(a: Arithmetic<N>, least: bigint, sigma: Rational): N {
  const excess = subtract(sigma, ONE)
  const factor = add(ONE, rational(least * excess.den, excess.num))
  return a.timesExp(a.rational(factor), a.scale(a.log(a.rational(rational(least))), negate(sigma)))
}

/** The whole number e >= |a|. */
function ceilMagnitude(a: Rational): bigint {
  const n = a.num < 0n ? -a.num : a.num
  return (n + a.den - 1n) / a.den
}

/** *Claim*: t^exponent <= result for nearest <= |t| <= farthest. *Valid for*: nearest > 0. *Rounding*: up, to a whole power. */
export function powerUpper(exponent: Rational, nearest: Rational, farthest: Rational): Rational {
  const base = exponent.num >= 0n ? farthest : { num: nearest.den, den: nearest.num }
  if (compare(base, ONE) <= 0) return ONE
  const whole = ceilMagnitude(exponent)
  return rational(base.num ** whole, base.den ** whole)
}

/** rho = axis + sqrt(axis^2 - 1), rounded down: the ellipse with foci -1, 1 and the semi-axis `axis` > 1. */
export function ellipseParameter(axis: Rational): Rational {
  const bits = 64n
  const under = subtract(multiply(axis, axis), ONE)
  return add(axis, rational(isqrt((under.num << (2n * bits)) / under.den), 1n << bits))
}

/** factor rho^-n / (1 - rho^-step), rounded up. */
function geometricTail<N>(a: Arithmetic<N>, factor: N, rho: Rational, n: number, step: 1 | 2): N {
  const rest = subtract(ONE, rational(rho.den ** BigInt(step), rho.num ** BigInt(step)))
  const decay = a.scale(a.log(a.rational(rho)), rational(-n))
  return a.timesExp(a.divide(factor, a.rational(rest)), decay)
}

/** A panel [from, to] with its Gauss-Legendre rule and the ellipse in which the integrand is bounded. */
export interface Panel {
  readonly from: Rational
  readonly to: Rational
  readonly nodes: number
  readonly axis: Rational
}

/** The left end of the panel's ellipse. */
export function leftEnd({ from, to, axis }: Pick<Panel, 'from' | 'to' | 'axis'>): Rational {
  const half = rational(1, 2)
  return subtract(multiply(add(from, to), half), multiply(axis, multiply(subtract(to, from), half)))
}

/**
 * *Claim*: |sum w_j f(t_j) - integral of f| <= result on the panel, f(t) = t^(b-1) D(s0+t).
 * *Valid for*: leftEnd > 0, axis > 1, nodes >= 2. *Bound*: P-7. *Rounding*: up.
 */
export function panelErrorUpper<N>(a: Arithmetic<N>, panel: Panel, summand: Summand): Rational {
  const half = rational(1, 2)
  const left = leftEnd(panel)
  const width = multiply(subtract(panel.to, panel.from), half)
  const right = add(multiply(add(panel.from, panel.to), half), multiply(panel.axis, width))
  const weight = powerUpper(subtract(summand.logPower, ONE), left, right)
  const most = a.scale(seriesUpper(a, summand.least, add(summand.power, left)), multiply(weight, multiply(width, rational(64, 15))))
  return a.upper(geometricTail(a, most, ellipseParameter(panel.axis), 2 * panel.nodes, 2))
}

/**
 * The bound of P-4 for one function of the edge: (norm + weights) 2 most rho^-nodes / (1 - 1/rho), rho that of the ellipse
 * with foci 0, eps whose left end is -reach.
 * *Claim*: as there. *Valid for*: reach > 0. *Bound*: P-4. *Rounding*: up.
 */
export function edgeErrorUpper<N>(a: Arithmetic<N>, eps: Rational, reach: Rational, nodes: number, weights: Rational, most: N): Rational {
  const rho = ellipseParameter(edgeAxis(eps, reach))
  return a.upper(geometricTail(a, a.scale(most, multiply(rational(2), weights)), rho, nodes, 1))
}

/** The semi-axis over eps/2: 1 + 2 reach/eps. */
export function edgeAxis(eps: Rational, reach: Rational): Rational {
  return add(ONE, rational(2n * reach.num * eps.den, reach.den * eps.num))
}

/**
 * *Claim*: the integral of t^(b-1) D(s0+t) over t >= from is at most the result; null where the bound does not apply.
 * *Valid for*: from > 0. *Bound*: P-8. *Rounding*: up.
 */
export function tailUpper<N>(a: Arithmetic<N>, from: Rational, summand: Summand): Rational | null {
  const exponent = subtract(summand.logPower, ONE)
  const slowing = exponent.num > 0n ? rational(exponent.num * from.den, exponent.den * from.num) : rational(0)
  const rate = a.subtract(a.log(a.rational(rational(summand.least))), a.rational(slowing))
  if (a.lower(rate).num <= 0n) return null
  const atFrom = seriesUpper(a, summand.least, add(summand.power, from))
  // from^(b-1) itself: tails far out would lose too much by a whole power.
  const weight = a.scale(a.log(a.rational(from)), exponent)
  return a.upper(a.divide(a.timesExp(atFrom, weight), rate))
}

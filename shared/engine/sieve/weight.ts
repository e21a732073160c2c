import type { Arithmetic } from '../arithmetic/arithmetic.ts'
import { binomial } from '../arithmetic/integers.ts'
import { ONE, type Rational, ZERO, add, ceil, isInteger, magnitude, multiply, negate, rational } from '../arithmetic/rational.ts'

/** n^-power (log n)^-logPower, power >= 0. */
export interface RationalWeight {
  power: Rational
  logPower: Rational
}

/** base^-exponent for an interval of positive numbers whose logarithm is known. */
export function negativePower<N>(arithmetic: Arithmetic<N>, base: N, exponent: Rational, logBase?: N): N {
  if (isInteger(exponent)) {
    const n = exponent.num < 0n ? -exponent.num : exponent.num
    let power = arithmetic.rational(ONE)
    for (let i = 0n; i < n; i++) power = arithmetic.multiply(power, base)
    return exponent.num > 0n ? arithmetic.divide(arithmetic.rational(ONE), power) : power
  }
  return arithmetic.exp(arithmetic.scale(logBase ?? arithmetic.log(base), negate(exponent)))
}

/** The weight at an integer n >= 2 whose logarithm is known. *Claim*: inclusion. */
export function weightAt<N>(arithmetic: Arithmetic<N>, weight: RationalWeight, n: number | bigint, logN: N): N {
  const { power, logPower } = weight
  const inLog = negativePower(arithmetic, logN, logPower)
  if (isInteger(power)) return arithmetic.scale(inLog, { num: 1n, den: BigInt(n) ** power.num })
  return arithmetic.timesExp(inLog, arithmetic.scale(logN, negate(power)))
}

/**
 * The Taylor expansion of a weight about any centre c, with y = 1/log c:
 *   w(c (1 + d)) = w(c) sum_j d^j sum_{i <= j} numerators[j][i]/denominator y^i.
 * *Claim*: the numerators are exact, and for |d| <= 3/4, log c >= 9 the terms j > order sum to at most
 * w(c) (4|d|/3)^(order+1) remainderFactor in magnitude. *Valid for*: power >= 0. *Bound*: S-3.
 */
export interface WeightExpansion {
  weight: RationalWeight
  order: number
  numerators: bigint[][]
  denominator: bigint
  remainderFactor: Rational
}

export function expandWeight(weight: RationalWeight, order: number): WeightExpansion {
  const { power, logPower } = weight
  if (power.num < 0n) throw new RangeError('a weight that grows like a power of n')
  const columns: Rational[][] = []
  // (1 + d)^-power, then times log(1 + d) once for each power of y, with the binomial coefficients of (1 + x)^-logPower.
  let series = Array.from({ length: order + 1 }, (_, j) => generalBinomial(negate(power), j))
  const logSeries = Array.from({ length: order + 1 }, (_, j) => (j === 0 ? ZERO : rational(j % 2 === 1 ? 1n : -1n, BigInt(j))))
  for (let i = 0; i <= order; i++) {
    const coefficient = generalBinomial(negate(logPower), i)
    columns.push(series.map((term) => multiply(coefficient, term)))
    series = product(series, logSeries)
  }
  const denominator = columns.flat().reduce((common, { den }) => leastCommonMultiple(common, den), 1n)
  const numerators = Array.from({ length: order + 1 }, (_, j) =>
    columns.slice(0, j + 1).map((column) => (column[j].num * denominator) / column[j].den),
  )
  const logExponent = ceil(magnitude(logPower))
  const remainderFactor = rational(4n ** ceil(power) * 6n ** logExponent, 5n ** logExponent)
  return { weight, order, numerators, denominator, remainderFactor }
}

/** binomial(a, n) for a rational a. */
function generalBinomial(a: Rational, n: number): Rational {
  if (isInteger(a) && a.num >= 0n && a.num < 1000n) return rational(binomial(Number(a.num), n))
  let value = ONE
  for (let i = 0; i < n; i++) value = multiply(value, multiply(add(a, rational(-i)), rational(1, i + 1)))
  return value
}

function product(a: Rational[], b: Rational[]): Rational[] {
  return a.map((_, n) => a.slice(0, n + 1).reduce((total, term, i) => add(total, multiply(term, b[n - i])), ZERO))
}

function leastCommonMultiple(a: bigint, b: bigint): bigint {
  return rational(a, b).num * b
}

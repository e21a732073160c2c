import { type Arithmetic, type Vector, type Weights, makeWeights } from '../arithmetic/arithmetic.ts'
import { ceilShift, floorShift } from '../arithmetic/integers.ts'
import { ONE, type Rational, add, divide, negate, rational, subtract } from '../arithmetic/rational.ts'

/**
 * The product rule for a weight with a singularity at 0: with the Gauss-Legendre nodes x_j and weights w_j on [0, 1],
 *   integral over [0, 1] of x^(beta-1) log(1/x)^i / i! f(x) dx  is about  sum_j W_j f(x_j),
 *   W_j = w_j sum over m < n of (2m+1) mu_m P_m(2 x_j - 1),   mu_m = the integral with the shifted Legendre polynomial for f,
 * and is equal to it where f is a polynomial of degree below n (P-4).
 */

/**
 * mu_m for the powers i = 0 … logs of the logarithm and m < n, as moments[m][i].
 * *Claim*: contains it. *Valid for*: rational beta > 0. *Bound*: P-5: sum over i of mu_m z^i is the product over l < m of
 * -(l+1-beta+z)/(l+1+beta-z), over beta - z. *Rounding*: that of the arithmetic.
 */
export function legendreMoments<N>(a: Arithmetic<N>, n: number, beta: Rational, logs: number): N[][] {
  const zero = a.rational(rational(0))
  const overLinear = (series: readonly N[], c: Rational): N[] => {
    // q (c - z) = series, coefficient by coefficient.
    const inverse = divide(ONE, c)
    let before = zero
    return series.map((value) => (before = a.scale(a.add(value, before), inverse)))
  }
  const moments = [overLinear([a.rational(ONE), ...new Array<N>(logs).fill(zero)], beta)]
  for (let m = 0; m + 1 < n; m++) {
    const last = moments[m]
    const constant = negate(subtract(rational(m + 1), beta))
    const numerator = last.map((value, i) => a.subtract(a.scale(value, constant), i === 0 ? zero : last[i - 1]))
    moments.push(overLinear(numerator, add(rational(m + 1), beta)))
  }
  return moments
}

/** What turns the values P_m at a node into the weights W_j / w_j, for every power of the logarithm. */
export interface ProductRule<N> {
  /** The factors for the nodes +x and -x of a symmetric pair, indexed by the power of the logarithm. */
  atPair(legendre: readonly N[]): { plus: N[]; minus: N[] }
}

/**
 * (2m+1) mu_m, enclosed in the finer arithmetic `wide`, as exact integers over 2^precision of `a`, P_m as (2 + P_m)/4 in [0, 1], so that the arithmetic's dot product can be
 * used; what the integers leave out is added as an error, |P_m| <= 1. Even and odd m are kept apart: P_m(-x) = (-1)^m P_m(x).
 */
export function createProductRule<N>(a: Arithmetic<N>, wide: Arithmetic<N>, moments: readonly (readonly N[])[]): ProductRule<N> {
  const parts = [0, 1].map((parity) => {
    const rows = moments.filter((_, m) => m % 2 === parity)
    return moments[0].map((_, i) => integerWeights(a, wide, rows.map((row, r) => wide.scale(row[i], rational(2 * (2 * r + parity) + 1)))))
  })
  return {
    atPair(legendre) {
      const sums = [0, 1].map((parity) => {
        const vector = a.vector(legendre.filter((_, m) => m % 2 === parity).map((p) => a.scale(a.add(p, a.rational(rational(2))), rational(1, 4))))
        return parts[parity].map((part) => part.dot(vector))
      })
      return {
        plus: sums[0].map((even, i) => a.add(even, sums[1][i])),
        minus: sums[0].map((even, i) => a.subtract(even, sums[1][i])),
      }
    },
  }
}

/** sum c_m P_m = 4 sum c_m (2 + P_m)/4 - 2 sum c_m, the c_m replaced by integers over 2^precision. */
function integerWeights<N>(a: Arithmetic<N>, wide: Arithmetic<N>, coefficients: readonly N[]): { dot(v: Vector<N>): N } {
  const divisor = 1n << BigInt(a.precision)
  const shift = wide.precision - a.precision
  const bounds = coefficients.map((c) => {
    const [lo, hi] = wide.fixedBounds(c)
    return [floorShift(lo, shift), ceilShift(hi, shift)]
  })
  const weights: Weights = makeWeights(bounds.map(([lo, hi]) => (lo + hi) >> 1n), divisor)
  const total = weights.numerators.reduce((x, y) => x + y, 0n)
  const constant = a.rational({ num: -2n * total, den: divisor })
  // |c - num/2^p| is at most half the width and the unit that >> drops.
  const error = a.rational({ num: bounds.reduce((sum, [lo, hi]) => sum + (hi - lo + 2n), 0n), den: 2n * divisor })
  return { dot: (v) => a.addError(a.add(a.scale(a.dot(weights, v), rational(4)), constant), error) }
}

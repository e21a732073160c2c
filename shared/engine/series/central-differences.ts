import { factorial } from '../arithmetic/integers.ts'
import { type Polynomial, multiply as product } from '../arithmetic/polynomial.ts'
import { type Rational, multiply, rational } from '../arithmetic/rational.ts'

/**
 * Weights w_j, -half <= j <= half, with p^(order)(0) = sum w_j p(j) for every polynomial p of degree at most 2 half: the derivative
 * at 0 of the polynomial through 2 half + 1 equally spaced points. Exact. In the middle of the points these weights stay small.
 */
export function centralDifferenceWeights(half: number, order: number): Rational[] {
  const nodes = Array.from({ length: 2 * half + 1 }, (_, i) => BigInt(i - half))
  const whole = nodes.reduce<Polynomial>((poly, node) => product(poly, [-node, 1n]), [1n])
  return nodes.map((node, index) => {
    // Coefficient of z^order in whole / (z - node), by synthetic division from the top.
    let coefficient = 0n
    for (let i = whole.length - 1; i > order; i--) coefficient = coefficient * node + whole[i]
    const sign = (2 * half - index) % 2 === 0 ? 1n : -1n
    const denominator = sign * factorial(index) * factorial(2 * half - index)
    return rational(coefficient * factorial(order), denominator)
  })
}

/**
 * What interpolation can be off by.
 * *Claim*: for f analytic with |f| <= size on the disc |z - c| <= radius, the derivative of this order at c of the polynomial through
 * `count` points within `reach` of c differs from that of f by at most the result. *Valid for*: 0 < reach < radius.
 * *Bound*: D-1. *Rounding*: none, all is exact.
 */
export function interpolationErrorUpper(size: Rational, radius: Rational, reach: Rational, count: number, order: number): Rational {
  const gap = rational(radius.num * reach.den - reach.num * radius.den, radius.den * reach.den)
  const ratio = rational(2n * reach.num * gap.den, reach.den * gap.num)
  const powers: Rational = { num: ratio.num ** BigInt(count), den: ratio.den ** BigInt(count) }
  const scale = rational(factorial(order) * radius.num * gap.den * reach.den ** BigInt(order), radius.den * gap.num * reach.num ** BigInt(order))
  return multiply(multiply(size, scale), powers)
}

import { type Polynomial, degree, leading, reversedMonic, valueAt } from '../arithmetic/polynomial.ts'
import { type Rational, ONE, ZERO, add, compare, divide, magnitude, multiply, rational, subtract } from '../arithmetic/rational.ts'
import { EngineRefusal } from '../errors.ts'

/**
 * A function of a prime as a power series in 1/p: sum of c_j p^-j over j >= 2 for p > `radius`, with
 *   |c_j| <= scale radius^j  for every j   (E-1).
 */
export interface PrimeExpansion {
  coefficient(j: number): Rational
  readonly radius: Rational
  readonly scale: Rational
}

/**
 * The expansion of f = numerator / denominator.
 * *Claim*: the coefficients and their bound. *Valid for*: f = O(p^-2), refused otherwise. *Bound*: E-1. *Rounding*: none, all is exact.
 */
export function expandQuotient(numerator: Polynomial, denominator: Polynomial): PrimeExpansion {
  if (numerator.length === 0) throw new EngineRefusal('identically_zero', 'expression', 'The function is 0 for every prime, so the sum is 0.')
  const gap = degree(denominator) - degree(numerator)
  if (gap < 2) throw new EngineRefusal('diverges', 'expression', 'The sum over the primes diverges: the function must fall at least as fast as 1/p^2.')
  const q = reversedMonic(denominator)
  const top = [...numerator].reverse().map((c) => rational(c, leading(denominator)))
  const radius = rootRadius([q])
  const scale = top.reduce((sum, c, i) => add(sum, divide(magnitude(c), power(radius, gap + i))), ZERO)
  // 1/q = sum h_j x^j by h_j = -sum q_i h_(j-i); then c_j = sum over i of top_i h_(j-gap-i).
  const h: Rational[] = []
  const inverse = (j: number): Rational => {
    for (let n = h.length; n <= j; n++) {
      let value = n === 0 ? ONE : ZERO
      for (let i = 1; i <= Math.min(n, q.length - 1); i++) value = subtract(value, multiply(q[i], h[n - i]))
      h.push(value)
    }
    return h[j]
  }
  return {
    radius,
    scale,
    coefficient: (j) => top.reduce((sum, c, i) => (j - gap - i < 0 ? sum : add(sum, multiply(c, inverse(j - gap - i)))), ZERO),
  }
}

/**
 * The expansion of log g, g = numerator / denominator -> 1: with the power sums s_j of the inverse roots of each, log of a
 * polynomial 1 + q_1 x + … is -sum s_j x^j / j.
 * *Claim*: the coefficients and their bound. *Valid for*: g = 1 + O(p^-2), refused otherwise. *Bound*: E-1. *Rounding*: none.
 */
export function expandLogarithm(numerator: Polynomial, denominator: Polynomial): PrimeExpansion {
  const diverges = (): EngineRefusal =>
    new EngineRefusal('diverges', 'expression', 'The product over the primes does not converge: the function must be 1 + O(1/p^2).')
  if (degree(numerator) !== degree(denominator) || leading(numerator) !== leading(denominator)) throw diverges()
  const [above, below] = [reversedMonic(numerator), reversedMonic(denominator)]
  if (compare(above[1] ?? ZERO, below[1] ?? ZERO) !== 0) throw diverges()
  if (above.length === 1) throw new EngineRefusal('identically_one', 'expression', 'The function is 1 for every prime, so the product is 1.')
  const [s, t] = [powerSums(above), powerSums(below)]
  return {
    radius: rootRadius([above, below]),
    scale: rational(above.length - 1 + below.length - 1),
    coefficient: (j) => divide(subtract(t(j), s(j)), rational(j)),
  }
}

/** log(1 - 1/p) + 1/p: c_j = -1/j (E-4: its sum and Euler's constant make the Mertens constant). */
export function expandMertens(): PrimeExpansion {
  return { radius: ONE, scale: ONE, coefficient: (j) => (j < 2 ? ZERO : rational(-1, j)) }
}

/** Power sums of the inverse roots of 1 + q_1 x + … + q_m x^m by Newton's identities. */
function powerSums(q: readonly Rational[]): (j: number) => Rational {
  const sums: Rational[] = [ZERO]
  return (j) => {
    for (let n = sums.length; n <= j; n++) {
      let value = n < q.length ? multiply(rational(-n), q[n]) : ZERO
      for (let i = 1; i < Math.min(n, q.length); i++) value = subtract(value, multiply(q[i], sums[n - i]))
      sums.push(value)
    }
    return sums[j]
  }
}

/**
 * A fraction R >= 1 with sum over i >= 1 of |q_i| R^-i <= 1 for each polynomial, hence at least the size of every inverse root
 * (E-1): found among the halves of integers, checked exactly.
 */
function rootRadius(polynomials: readonly (readonly Rational[])[]): Rational {
  const holds = (r: Rational): boolean =>
    polynomials.every((q) => compare(q.slice(1).reduce((sum, c, i) => add(sum, divide(magnitude(c), power(r, i + 1))), ZERO), ONE) <= 0)
  let high = ONE
  while (!holds(high)) {
    high = multiply(high, rational(2))
    if (compare(high, rational(1 << 20)) > 0) {
      throw new EngineRefusal('coefficients_too_large', 'expression', 'The function only settles for primes above a million; scale it down.')
    }
  }
  for (let step = divide(high, rational(4)); compare(step, rational(1, 4)) >= 0; step = divide(step, rational(2))) {
    const lower = subtract(high, step)
    if (compare(lower, ONE) >= 0 && holds(lower)) high = lower
  }
  return high
}

function power(a: Rational, n: number): Rational {
  return { num: a.num ** BigInt(n), den: a.den ** BigInt(n) }
}

/** numerator(p) / denominator(p) for a prime p; refuses a pole, and a factor 0 of a product. */
export function valueAtPrime(numerator: Polynomial, denominator: Polynomial, p: number, combine: 'sum' | 'product'): Rational {
  const below = valueAt(denominator, BigInt(p))
  const above = valueAt(numerator, BigInt(p))
  if (below === 0n) throw new EngineRefusal('pole', 'expression', `The function has a pole at p = ${p}; exclude that prime.`)
  if (above === 0n && combine === 'product') throw new EngineRefusal('zero_factor', 'expression', `The factor at p = ${p} is 0, and so is the product; exclude that prime.`)
  return rational(above, below)
}

/**
 * The sum of |c_j| sum over p > split of p^-j over all j > terms.
 * *Claim*: an upper bound. *Valid for*: split > radius, terms >= 1. *Bound*: E-2. *Rounding*: none, all is exact.
 */
export function expansionTail(expansion: PrimeExpansion, split: number, terms: number): Rational {
  const ratio = divide(expansion.radius, rational(split))
  if (compare(ratio, ONE) >= 0) throw new RangeError('the split must lie beyond the radius')
  const first = { num: ratio.num ** BigInt(terms + 1), den: ratio.den ** BigInt(terms + 1) }
  return divide(multiply(multiply(expansion.scale, rational(split, terms)), first), subtract(ONE, ratio))
}


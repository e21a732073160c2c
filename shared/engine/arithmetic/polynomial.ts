import { abs, gcd } from './integers.ts'
import type { Rational } from './rational.ts'
import { rational } from './rational.ts'

/** A polynomial with integer coefficients in ascending powers and no leading zero; [] is 0. */
export type Polynomial = readonly bigint[]

function trimmed(coefficients: bigint[]): Polynomial {
  let length = coefficients.length
  while (length > 0 && coefficients[length - 1] === 0n) length -= 1
  return coefficients.slice(0, length)
}

/** Degree; -1 for the zero polynomial. */
export function degree(a: Polynomial): number {
  return a.length - 1
}

export function leading(a: Polynomial): bigint {
  return a.length === 0 ? 0n : a[a.length - 1]
}

/** x a + y b. */
export function combine(x: bigint, a: Polynomial, y: bigint, b: Polynomial): Polynomial {
  const length = Math.max(a.length, b.length)
  return trimmed(Array.from({ length }, (_, i) => x * (a[i] ?? 0n) + y * (b[i] ?? 0n)))
}

export function multiply(a: Polynomial, b: Polynomial): Polynomial {
  if (a.length === 0 || b.length === 0) return []
  const product = new Array<bigint>(a.length + b.length - 1).fill(0n)
  a.forEach((x, i) => b.forEach((y, j) => (product[i + j] += x * y)))
  return trimmed(product)
}

/** Greatest common divisor of the coefficients, >= 0. */
export function content(a: Polynomial): bigint {
  return a.reduce((g, c) => gcd(g, c), 0n)
}

/** a / content(a), with a positive leading coefficient. */
export function primitivePart(a: Polynomial): Polynomial {
  const c = content(a)
  if (c === 0n) return []
  const divisor = leading(a) < 0n ? -c : c
  return a.map((x) => x / divisor)
}

/** Remainder of l^j a on division by b != 0, for some power l^j of the leading coefficient l of b (pseudo-division). */
function pseudoRemainder(a: Polynomial, b: Polynomial): Polynomial {
  let rest = a
  while (rest.length >= b.length) {
    const shifted = [...new Array<bigint>(rest.length - b.length).fill(0n), ...b]
    rest = combine(leading(b), rest, -leading(rest), shifted)
  }
  return rest
}

/** Exponents e of Mersenne primes 2^e - 1, enough for the coefficients of divisors of what an expression may hold. */
const MERSENNE_EXPONENTS = [61n, 521n, 2_203n, 4_423n]

/** 1/a modulo a prime that does not divide a, by the extended Euclidean algorithm. */
function inverseModulo(a: bigint, modulus: bigint): bigint {
  let [r, next] = [modulus, a % modulus]
  let [t, nextT] = [0n, 1n]
  while (next !== 0n) {
    const q = r / next
    ;[r, next] = [next, r - q * next]
    ;[t, nextT] = [nextT, t - q * nextT]
  }
  // r is 1 or -1.
  return r * t
}

function remainderModulo(a: Polynomial, b: Polynomial, modulus: bigint): Polynomial {
  const inverse = inverseModulo(leading(b), modulus)
  const rest = [...a]
  for (let i = rest.length - b.length; i >= 0; i--) {
    const q = (rest[i + b.length - 1] * inverse) % modulus
    b.forEach((c, j) => (rest[i + j] = (rest[i + j] - q * c) % modulus))
  }
  return trimmed(rest)
}

/** The greatest common divisor modulo a prime, its leading coefficient made `lead`, lifted to the residues of least size. */
function liftedDivisor(a: Polynomial, b: Polynomial, lead: bigint, modulus: bigint): Polynomial {
  let [x, y] = [a, b].map((part) => trimmed(part.map((c) => c % modulus)))
  while (y.length > 0) [x, y] = [y, remainderModulo(x, y, modulus)]
  const factor = (lead * inverseModulo(leading(x), modulus)) % modulus
  return trimmed(x.map((c) => {
    const residue = (((c * factor) % modulus) + modulus) % modulus
    return 2n * residue > modulus ? residue - modulus : residue
  }))
}

/**
 * Greatest common divisor over the rationals as a primitive polynomial. It divides a and b over the integers, hence keeps its degree
 * modulo a prime that does not divide the leading coefficient of a, and divides the greatest common divisor there: so a common divisor
 * found by lifting that one is the greatest. Where no prime of the list gives one, Euclid's algorithm with primitive remainders does.
 */
export function commonDivisor(a: Polynomial, b: Polynomial): Polynomial {
  let [x, y] = [primitivePart(a), primitivePart(b)]
  if (x.length > 0 && y.length > 0) {
    const lead = gcd(leading(x), leading(y))
    for (const exponent of MERSENNE_EXPONENTS) {
      const modulus = (1n << exponent) - 1n
      if (leading(x) % modulus === 0n) continue
      const found = primitivePart(liftedDivisor(x, y, lead, modulus))
      if (quotientOf(x, found) && quotientOf(y, found)) return found
    }
  }
  while (y.length > 0) [x, y] = [y, primitivePart(pseudoRemainder(x, y))]
  return x
}

/** a / b, null where it is no polynomial with integer coefficients; b != 0. */
function quotientOf(a: Polynomial, b: Polynomial): Polynomial | null {
  const rest = [...a]
  const quotient = new Array<bigint>(Math.max(a.length - b.length + 1, 0)).fill(0n)
  for (let i = quotient.length - 1; i >= 0; i--) {
    const q = rest[i + b.length - 1] / leading(b)
    quotient[i] = q
    b.forEach((c, j) => (rest[i + j] -= q * c))
    if (rest[i + b.length - 1] !== 0n) return null
  }
  return rest.some((r) => r !== 0n) ? null : trimmed(quotient)
}

/** a / b where b is primitive and divides a exactly. */
export function exactQuotient(a: Polynomial, b: Polynomial): Polynomial {
  const quotient = quotientOf(a, b)
  if (!quotient) throw new RangeError('the division is not exact')
  return quotient
}

/** The value at an integer, by Horner's rule. */
export function valueAt(a: Polynomial, x: bigint): bigint {
  return a.reduceRight((value, c) => value * x + c, 0n)
}

/** The coefficients divided by the leading one and reversed: 1 + q_1 x + q_2 x^2 + … = x^deg a(1/x) / leading(a). */
export function reversedMonic(a: Polynomial): Rational[] {
  return [...a].reverse().map((c) => rational(c, leading(a)))
}

/** Largest number of bits of a coefficient, to bound the work before it is done. */
export function coefficientBits(a: Polynomial): number {
  return a.reduce((most, c) => Math.max(most, abs(c).toString(2).length), 0)
}

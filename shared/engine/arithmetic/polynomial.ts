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

/** A prime, 2^61 - 1. */
const MODULUS = (1n << 61n) - 1n

function remainderModulo(a: Polynomial, b: Polynomial): Polynomial {
  let inverse = 1n
  for (let [base, e] = [leading(b), MODULUS - 2n]; e > 0n; e >>= 1n, base = (base * base) % MODULUS) if (e & 1n) inverse = (inverse * base) % MODULUS
  const rest = [...a]
  for (let i = rest.length - b.length; i >= 0; i--) {
    const q = (rest[i + b.length - 1] * inverse) % MODULUS
    b.forEach((c, j) => (rest[i + j] = (rest[i + j] - q * c) % MODULUS))
  }
  return trimmed(rest)
}

/**
 * Whether a and b are coprime modulo a prime that does not divide the leading coefficient of a. If so, they are coprime over the
 * rationals: a primitive common divisor divides a over the integers, hence keeps its degree modulo the prime.
 */
function coprimeModulo(a: Polynomial, b: Polynomial): boolean {
  if (leading(a) % MODULUS === 0n) return false
  let [x, y] = [a, b].map((part) => trimmed(part.map((c) => c % MODULUS)))
  while (y.length > 0) [x, y] = [y, remainderModulo(x, y)]
  return degree(x) === 0
}

/** Greatest common divisor over the rationals as a primitive polynomial, by Euclid's algorithm with primitive remainders. */
export function commonDivisor(a: Polynomial, b: Polynomial): Polynomial {
  // The usual case, told apart at once: between coprime polynomials the remainders grow enormous.
  if (coprimeModulo(a, b)) return [1n]
  let [x, y] = [primitivePart(a), primitivePart(b)]
  while (y.length > 0) [x, y] = [y, primitivePart(pseudoRemainder(x, y))]
  return x
}

/** a / b where b is primitive and divides a exactly. */
export function exactQuotient(a: Polynomial, b: Polynomial): Polynomial {
  const rest = [...a]
  const quotient = new Array<bigint>(Math.max(a.length - b.length + 1, 0)).fill(0n)
  for (let i = quotient.length - 1; i >= 0; i--) {
    const q = rest[i + b.length - 1] / leading(b)
    quotient[i] = q
    b.forEach((c, j) => (rest[i + j] -= q * c))
  }
  if (rest.some((r) => r !== 0n)) throw new RangeError('the division is not exact')
  return trimmed(quotient)
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

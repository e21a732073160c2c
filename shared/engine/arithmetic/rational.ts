import { abs, bitLength, ceilDivide, floorDivide, gcd } from './integers.ts'

/** An exact fraction in lowest terms with a positive denominator. */
export interface Rational {
  readonly num: bigint
  readonly den: bigint
}

export function rational(num: bigint | number, den: bigint | number = 1n): Rational {
  const n = BigInt(num)
  const d = BigInt(den)
  if (d === 0n) throw new RangeError('a fraction with denominator 0')
  const g = gcd(n, d)
  return d < 0n ? { num: -n / g, den: -d / g } : { num: n / g, den: d / g }
}

export const ZERO: Rational = { num: 0n, den: 1n }
export const ONE: Rational = { num: 1n, den: 1n }

export function negate(a: Rational): Rational {
  return { num: -a.num, den: a.den }
}

export function add(a: Rational, b: Rational): Rational {
  return rational(a.num * b.den + b.num * a.den, a.den * b.den)
}

export function subtract(a: Rational, b: Rational): Rational {
  return rational(a.num * b.den - b.num * a.den, a.den * b.den)
}

export function multiply(a: Rational, b: Rational): Rational {
  return rational(a.num * b.num, a.den * b.den)
}

export function divide(a: Rational, b: Rational): Rational {
  return rational(a.num * b.den, a.den * b.num)
}

export function magnitude(a: Rational): Rational {
  return { num: abs(a.num), den: a.den }
}

/** -1, 0 or 1 as a < b, a = b, a > b. Exact, so that it may order what intervals may not. */
export function compare(a: Rational, b: Rational): -1 | 0 | 1 {
  const difference = a.num * b.den - b.num * a.den
  return difference < 0n ? -1 : difference > 0n ? 1 : 0
}

export function isInteger(a: Rational): boolean {
  return a.den === 1n
}

export function floor(a: Rational): bigint {
  return floorDivide(a.num, a.den)
}

export function ceil(a: Rational): bigint {
  return ceilDivide(a.num, a.den)
}

/** floor(a 2^bits) for a signed number of bits. */
export function floorScaled(a: Rational, bits: number): bigint {
  return bits >= 0 ? floorDivide(a.num << BigInt(bits), a.den) : floorDivide(a.num, a.den << BigInt(-bits))
}

/** ceil(a 2^bits) for a signed number of bits. */
export function ceilScaled(a: Rational, bits: number): bigint {
  return -floorScaled(negate(a), bits)
}

/** n 2^-bits, exactly. */
export function dyadic(n: bigint, bits: number): Rational {
  if (n === 0n || bits <= 0) return { num: n << BigInt(Math.max(0, -bits)), den: 1n }
  // Only powers of 2 cancel, and they are seen without Euclid's algorithm: such numbers are made by the thousand.
  const twos = Math.min(bits, bitLength(n & -n) - 1)
  return { num: n >> BigInt(twos), den: 1n << BigInt(bits - twos) }
}

/** The canonical text: "3", "-1/2". */
export function toText(a: Rational): string {
  return a.den === 1n ? a.num.toString() : `${a.num}/${a.den}`
}

/** Reads "3", "-1/2", "0.25", "1e-3" exactly; null where the text is none of these or its exponent is beyond 10,000. */
export function parseRational(text: string): Rational | null {
  const fraction = /^\s*([+-]?\d{1,10000})\s*\/\s*(\d{1,10000})\s*$/.exec(text)
  if (fraction) return BigInt(fraction[2]) === 0n ? null : rational(BigInt(fraction[1]), BigInt(fraction[2]))
  const decimal = /^\s*([+-]?)(\d{0,110000})(?:\.(\d{0,110000}))?(?:[eE]([+-]?\d{1,5}))?\s*$/.exec(text)
  if (!decimal) return null
  const [, sign, whole, part = '', exponent = '0'] = decimal
  if (whole === '' && part === '') return null
  const shift = BigInt(exponent) - BigInt(part.length)
  if (shift > 10_000n || shift < -220_000n) return null
  const digits = BigInt(sign === '-' ? -1 : 1) * BigInt(whole + part)
  return shift >= 0n ? rational(digits * 10n ** shift) : rational(digits, 10n ** -shift)
}

import { abs, ceilDivide, floorDivide } from './integers.ts'
import { type Rational, compare, rational, subtract } from './rational.ts'

/** Text of n 10^-places with exactly `places` decimals. */
export function decimalText(n: bigint, places: number): string {
  const digits = abs(n).toString().padStart(places + 1, '0')
  const sign = n < 0n ? '-' : ''
  return places === 0 ? sign + digits : `${sign}${digits.slice(0, -places)}.${digits.slice(-places)}`
}

/** The largest decimal with `places` places that is <= a. */
export function lowerDecimal(a: Rational, places: number): string {
  return decimalText(floorDivide(a.num * 10n ** BigInt(places), a.den), places)
}

/** The least decimal with `places` places that is >= a. */
export function upperDecimal(a: Rational, places: number): string {
  return decimalText(ceilDivide(a.num * 10n ** BigInt(places), a.den), places)
}

/** Exactly the value of a plain decimal such as "-12.340"; null where it is none. */
export function parseDecimal(text: string): Rational | null {
  const match = /^(-?)(\d{1,110000})(?:\.(\d{1,110000}))?$/.exec(text)
  if (!match) return null
  const part = match[3] ?? ''
  const n = BigInt(match[2] + part)
  return rational(match[1] === '-' ? -n : n, 10n ** BigInt(part.length))
}

/** A non-negative number in scientific notation with two digits, rounded up: "3.1e-42"; "0" for 0. */
export function scientificUpper(a: Rational): string {
  if (a.num === 0n) return '0'
  if (a.num < 0n) throw new RangeError('a magnitude is not negative')
  let exponent = a.num.toString().length - a.den.toString().length
  // Now 10^(exponent-1) < a < 10^(exponent+1).
  if (compare(a, powerOfTen(exponent)) < 0) exponent -= 1
  let digits = ceilOfScaled(a, 1 - exponent)
  if (digits === 100n) {
    digits = 10n
    exponent += 1
  }
  return `${digits / 10n}.${digits % 10n}e${exponent}`
}

/**
 * The decimals after the point that all numbers of [lo, hi] share: `truncated` when cut off, `rounded` when rounded to nearest
 * (ties undecided); each is the largest such count up to `limit`, and -1 where not even the integer part is shared.
 */
export function certifiedDigits(lo: Rational, hi: Rational, limit: number): { truncated: number; rounded: number } {
  const largest = (agree: (places: number) => boolean): number => {
    for (let places = limit; places >= 0; places--) if (agree(places)) return places
    return -1
  }
  // Truncation is towards zero, so an interval with 0 inside shares its integer part 0 or nothing.
  const truncate = (a: Rational, places: number): bigint => (a.num * 10n ** BigInt(places)) / a.den
  const sameSign = lo.num >= 0n || hi.num <= 0n
  const width = subtract(hi, lo)
  const start = width.num === 0n ? limit : Math.min(limit, width.den.toString().length - width.num.toString().length + 1)
  if (start < 0) return { truncated: -1, rounded: -1 }
  limit = start
  return {
    truncated: largest((places) => (sameSign || places === 0) && truncate(lo, places) === truncate(hi, places)),
    rounded: largest((places) => {
      const [a, b] = [twiceScaled(lo, places), twiceScaled(hi, places)]
      // Both strictly inside the same cell (2m-1, 2m+1) of twice the scaled line.
      const m = floorDivide(a.num + a.den, 2n * a.den)
      const cellLow = rational(2n * m - 1n)
      const cellHigh = rational(2n * m + 1n)
      return compare(a, cellLow) > 0 && compare(b, cellHigh) < 0
    }),
  }
}

function twiceScaled(a: Rational, places: number): Rational {
  return rational(2n * a.num * 10n ** BigInt(places), a.den)
}

function powerOfTen(exponent: number): Rational {
  return exponent >= 0 ? rational(10n ** BigInt(exponent)) : rational(1n, 10n ** BigInt(-exponent))
}

function ceilOfScaled(a: Rational, power: number): bigint {
  return power >= 0 ? ceilDivide(a.num * 10n ** BigInt(power), a.den) : ceilDivide(a.num, a.den * 10n ** BigInt(-power))
}

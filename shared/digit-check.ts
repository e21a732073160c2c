import { decimalText, scaleEnclosure } from './digits.ts'
import { plainDecimal, type ReadNumber } from './digit-reading.ts'

/** How printed digits stand for a number: cut off towards zero after the last one, or rounded to it. */
export type PrintedAs = 'truncated' | 'rounded'

/** `confirmed`: so for every number of the enclosure; `refuted`: for none; `undecided`: for some. */
export type DigitVerdict = 'confirmed' | 'refuted' | 'undecided'

export interface CheckedDigit {
  digit: string
  /** 1 is the first place after the point, 0 the units, -1 the tens. */
  place: number
  verdict: DigitVerdict
}

export interface DigitCheckResult {
  sign: DigitVerdict
  digits: CheckedDigit[]
  /** The number as a whole. */
  whole: DigitVerdict
  /** Place up to which the digits fit no number of the enclosure any more: the first wrong one. */
  firstWrong: number | null
  /** Places after the point that are confirmed one after the other. */
  confirmed: number
  /** Whether the interval of a stated uncertainty contains the enclosure; null where none is stated. */
  uncertainty: DigitVerdict | null
}

/** Everything that the enclosure allows: the integers |x| 10^places cut or rounded, from the least to the greatest. */
interface Possible {
  least: bigint
  greatest: bigint
}

const abs = (value: bigint): bigint => (value < 0n ? -value : value)

/**
 * Holds printed digits against an enclosure [lo, hi] of the number they stand for.
 *
 * *Claim.* A digit is `confirmed` when every number of [lo, hi], cut or rounded to as many places, has that digit at that place,
 * `refuted` when none has. Where a number lies midway between two roundings both are allowed, so that no verdict depends on how
 * ties are rounded. All of it is exact: integers over one power of ten.
 */
export function checkDigits(number: ReadNumber, reading: PrintedAs, lo: string, hi: string): DigitCheckResult {
  const places = number.fraction.length
  const possible = possibleIntegers(reading, places, lo, hi)
  const least = possible.least.toString()
  const greatest = possible.greatest.toString()
  const length = Math.max(places + number.integer.length, greatest.length, places + 1)
  const printed = (number.integer + number.fraction).padStart(length, '0')
  const digits = compare(printed, least.padStart(length, '0'), greatest.padStart(length, '0'), places)

  const sign = signVerdict(number, lo, hi)
  const value = BigInt(number.integer + number.fraction)
  const whole = combine(sign, value < possible.least || value > possible.greatest ? 'refuted' : possible.least === possible.greatest ? 'confirmed' : 'undecided')
  const firstPlaceAfter = digits.filter(({ place }) => place >= 1)
  const before = digits.every(({ place, verdict }) => place >= 1 || verdict === 'confirmed') && sign === 'confirmed'
  const stop = firstPlaceAfter.findIndex(({ verdict }) => verdict !== 'confirmed')
  return {
    sign,
    digits,
    whole,
    firstWrong: sign === 'refuted' ? (digits[0]?.place ?? 0) : firstMisfit(printed, least.padStart(length, '0'), greatest.padStart(length, '0'), places),
    confirmed: before ? (stop < 0 ? firstPlaceAfter.length : stop) : 0,
    uncertainty: number.uncertainty === null ? null : containment(number, number.uncertainty, lo, hi),
  }
}

function possibleIntegers(reading: PrintedAs, places: number, lo: string, hi: string): Possible {
  const ends = scaleEnclosure(lo, hi)
  const straddles = ends.low < 0n && ends.high > 0n
  const [a, b] = [abs(ends.low), abs(ends.high)]
  const near = straddles ? 0n : a < b ? a : b
  const far = a < b ? b : a
  // |x| 10^places = m 10^places / 10^ends.places; twice that, so that halves are integers too.
  const up = 10n ** BigInt(places)
  const unit = 2n * 10n ** BigInt(ends.places)
  if (reading === 'truncated') return { least: (2n * near * up) / unit, greatest: (2n * far * up) / unit }
  const half = 10n ** BigInt(ends.places)
  const ceil = (value: bigint) => (value <= 0n ? 0n : (value + unit - 1n) / unit)
  return { least: ceil(2n * near * up - half), greatest: (2n * far * up + half) / unit }
}

/**
 * Compares digit by digit. The numbers that the possible integers give when cut after a digit are consecutive, so the digits
 * possible there are `low`, `low + 1`, … modulo 10, `spread` steps; beyond nine every digit is possible.
 */
function compare(printed: string, least: string, greatest: string, places: number): CheckedDigit[] {
  let spread = 0
  return [...printed].map((digit, index) => {
    const low = Number(least[index])
    spread = Math.min(10, 10 * spread + Number(greatest[index]) - low)
    const steps = (Number(digit) - low + 10) % 10
    const verdict: DigitVerdict = steps > spread ? 'refuted' : spread === 0 ? 'confirmed' : 'undecided'
    return { digit, place: index - (printed.length - places) + 1, verdict }
  })
}

/** The first place at which the printed digits, cut there, lie outside what is possible. */
function firstMisfit(printed: string, least: string, greatest: string, places: number): number | null {
  // While the printed prefix equals that of an end, the next digit can leave the range there.
  let onLeast = true
  let onGreatest = true
  for (let index = 0; index < printed.length && (onLeast || onGreatest); index += 1) {
    const digit = printed[index] ?? '0'
    if ((onLeast && digit < (least[index] ?? '0')) || (onGreatest && digit > (greatest[index] ?? '0'))) return index - (printed.length - places) + 1
    onLeast &&= digit === least[index]
    onGreatest &&= digit === greatest[index]
  }
  return null
}

function signVerdict({ negative, integer, fraction }: ReadNumber, lo: string, hi: string): DigitVerdict {
  const { low, high } = scaleEnclosure(lo, hi)
  // Digits that are all zero say nothing about the sign.
  if (BigInt(integer + fraction) === 0n) return 'confirmed'
  if (negative ? high < 0n : low > 0n) return 'confirmed'
  return (negative ? low >= 0n : high <= 0n) ? 'refuted' : 'undecided'
}

const combine = (a: DigitVerdict, b: DigitVerdict): DigitVerdict =>
  a === 'refuted' || b === 'refuted' ? 'refuted' : a === 'undecided' || b === 'undecided' ? 'undecided' : 'confirmed'

/** Whether [value - u, value + u] contains the enclosure (confirmed), misses it (refuted) or overlaps it (undecided). */
function containment(number: ReadNumber, units: string, lo: string, hi: string): DigitVerdict {
  const [lower, upper] = around(number, BigInt(units), 0)
  const both = scaleEnclosure(lo, hi)
  const stated = scaleEnclosure(lower, upper)
  const places = BigInt(Math.max(both.places, stated.places))
  const scale = (value: bigint, from: number) => value * 10n ** (places - BigInt(from))
  const [a, b, low, high] = [scale(stated.low, stated.places), scale(stated.high, stated.places), scale(both.low, both.places), scale(both.high, both.places)]
  if (b < low || a > high) return 'refuted'
  return a <= low && high <= b ? 'confirmed' : 'undecided'
}

/** value ± units of the last place, written to `more` further places. */
function around(number: ReadNumber, units: bigint, more: number): [lower: string, upper: string] {
  const places = number.fraction.length + more
  const magnitude = BigInt(number.integer + number.fraction) * 10n ** BigInt(more)
  const value = number.negative ? -magnitude : magnitude
  return [decimalText(value - units, places), decimalText(value + units, places)]
}

/**
 * The exact interval of numbers that printed digits can stand for. Truncated: from the printed value away from zero by one unit of
 * the last place. Rounded: half a unit to both sides. Both ends belong to it, so it holds under every convention for ties.
 */
export function intervalOfDigits(number: ReadNumber, reading: PrintedAs): { lo: string; hi: string } {
  if (reading === 'rounded') {
    const [lo, hi] = around(number, 5n, 1)
    return { lo, hi }
  }
  const [below, above] = around(number, 1n, 0)
  const printed = plainDecimal(number)
  return number.negative ? { lo: below, hi: printed } : { lo: printed, hi: above }
}

const ON_UNCERTAINTY: Record<DigitVerdict, string> = {
  confirmed: ' The stated uncertainty covers the enclosure.',
  refuted: ' The stated uncertainty misses the enclosure.',
  undecided: ' The stated uncertainty covers a part of the enclosure only.',
}

/** What came out, for a person. */
export function summaryOfCheck(result: DigitCheckResult, reading: PrintedAs): string {
  return onDigits(result, reading) + (result.uncertainty === null ? '' : ON_UNCERTAINTY[result.uncertainty])
}

function onDigits({ sign, firstWrong, whole, confirmed }: DigitCheckResult, reading: PrintedAs): string {
  const places = `${confirmed} ${confirmed === 1 ? 'place' : 'places'} after the point`
  if (sign === 'refuted') return 'The sign is wrong.'
  if (firstWrong !== null) {
    const where = firstWrong >= 1 ? `place ${firstWrong} after the point` : firstWrong === 0 ? 'the units' : `place ${1 - firstWrong} before the point`
    return `Wrong at ${where}: no number of the enclosure, ${reading}, begins with these digits. Confirmed before it: ${places}.`
  }
  if (whole === 'confirmed') return `Every digit is confirmed, read as ${reading}.`
  return `Nothing is wrong; confirmed are ${places}. The enclosure is too wide to decide the rest.`
}

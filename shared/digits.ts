/**
 * Decimal digits of an enclosure [lo, hi], read from the exact decimal text of its end points. Everything here is string and
 * BigInt work: no digit passes through a float, and whatever is shortened is shortened outward.
 */

/** A decimal number as its digits: the value is ±integer.fraction. `integer` has no leading zero except "0" itself. */
export interface DecimalText {
  negative: boolean
  integer: string
  fraction: string
}

const DECIMAL = /^([+-]?)(\d+)(?:\.(\d*))?$/

/** Reads plain decimal text such as "-1.25". Throws a RangeError for anything else (no exponents, no spaces). */
export function parseDecimal(text: string): DecimalText {
  const match = DECIMAL.exec(text)
  if (!match) throw new RangeError(`not a plain decimal number: ${JSON.stringify(text.slice(0, 60))}`)
  const [, sign, whole = '0', fraction = ''] = match
  const integer = whole.replace(/^0+(?=\d)/, '')
  const zero = /^0*$/.test(integer + fraction)
  return { negative: sign === '-' && !zero, integer, fraction }
}

/** True when `text` is plain decimal text that `parseDecimal` accepts. */
export function isDecimal(text: string): boolean {
  return DECIMAL.test(text)
}

/** Cuts a run of digits into groups of five from the left (the last may be shorter), as they are printed after the point. */
export function groupDigits(digits: string, size = 5): string[] {
  const groups: string[] = []
  for (let start = 0; start < digits.length; start += size) groups.push(digits.slice(start, start + size))
  return groups
}

/** The numbers lo and hi as integers over one power of ten: lo = low / 10^places, hi = high / 10^places. */
export interface ScaledEnclosure {
  low: bigint
  high: bigint
  places: number
}

function scaled({ negative, integer, fraction }: DecimalText, places: number): bigint {
  const magnitude = BigInt(integer + fraction.padEnd(places, '0'))
  return negative ? -magnitude : magnitude
}

/** Both end points over one denominator. Throws a RangeError when an end is no decimal or lo > hi. */
export function scaleEnclosure(lo: string, hi: string): ScaledEnclosure {
  const lower = parseDecimal(lo)
  const upper = parseDecimal(hi)
  const places = Math.max(lower.fraction.length, upper.fraction.length)
  const low = scaled(lower, places)
  const high = scaled(upper, places)
  if (low > high) throw new RangeError('the lower end lies above the upper end')
  return { low, high, places }
}

/** The decimal text of value / 10^places, all places written out. */
export function decimalText(value: bigint, places: number): string {
  const sign = value < 0n ? '-' : ''
  const digits = (value < 0n ? -value : value).toString().padStart(places + 1, '0')
  const point = digits.length - places
  return sign + (places === 0 ? digits : `${digits.slice(0, point)}.${digits.slice(point)}`)
}

/** An enclosure as a digit line shows it: what both ends share, then what each end goes on with. */
export interface SplitEnclosure {
  negative: boolean
  /** Integer part shared by both ends; null when not even that is certain (the ends straddle an integer or zero). */
  integer: string | null
  /** Decimals after the point that every number of the enclosure shares when truncated. */
  decimals: string
  /**
   * The decimals that follow in the upper and the lower end, to the same number of places. Where `integer` is null these are
   * the whole end points with sign and point. Both are empty when lo = hi.
   */
  upperNext: string
  lowerNext: string
}

/**
 * Splits an enclosure into its certified digits and what follows. At most `show` (>= 1) following digits are kept of each end, cut
 * outward: the lower end's down, the upper end's up, so that [certified lowerNext, certified upperNext] still encloses. More
 * are kept where cutting would carry into a certified digit (…99|8 to …00|0).
 */
export function splitEnclosure(lo: string, hi: string, show = Infinity): SplitEnclosure {
  const { low, high, places } = scaleEnclosure(lo, hi)
  const negative = high < 0n
  const straddles = low < 0n && high >= 0n
  const lowText = decimalText(low, places).replace('-', '')
  const highText = decimalText(high, places).replace('-', '')
  const [lowInteger = '', lowFraction = ''] = lowText.split('.')
  const [highInteger = '', highFraction = ''] = highText.split('.')

  if (straddles || lowInteger !== highInteger) {
    const kept = Math.min(places, show)
    return {
      negative: false, integer: null, decimals: '',
      lowerNext: decimalText(floorTo(low, places, kept), kept),
      upperNext: decimalText(ceilTo(high, places, kept), kept),
    }
  }
  let shared = 0
  while (shared < places && lowFraction[shared] === highFraction[shared]) shared += 1
  const decimals = lowFraction.slice(0, shared)
  if (shared === places) return { negative, integer: lowInteger, decimals, lowerNext: '', upperNext: '' }
  const prefix = `${lowInteger}.${decimals}`
  let kept = Math.min(places, shared + show)
  let lower: string
  let upper: string
  do {
    lower = decimalText(floorTo(low, places, kept), kept).replace('-', '')
    upper = decimalText(ceilTo(high, places, kept), kept).replace('-', '')
    kept += 1
  } while (!(lower.startsWith(prefix) && upper.startsWith(prefix)))
  return { negative, integer: lowInteger, decimals, lowerNext: lower.slice(prefix.length), upperNext: upper.slice(prefix.length) }
}

function floorTo(value: bigint, places: number, kept: number): bigint {
  const unit = 10n ** BigInt(places - kept)
  const quotient = value / unit
  return value < 0n && quotient * unit !== value ? quotient - 1n : quotient
}

function ceilTo(value: bigint, places: number, kept: number): bigint {
  return -floorTo(-value, places, kept)
}

/** Digits that every number of an enclosure shares: how many after the point, and the number they spell. */
export interface CertifiedDigits {
  decimals: number
  /** Null when not even the integer part is certain. */
  text: string | null
}

/** What all numbers of [lo, hi] give when truncated towards zero: the longest such decimal. */
export function certifiedTruncated(lo: string, hi: string): CertifiedDigits {
  const { negative, integer, decimals } = splitEnclosure(lo, hi)
  if (integer === null) return { decimals: 0, text: null }
  const magnitude = decimals === '' ? integer : `${integer}.${decimals}`
  return { decimals: decimals.length, text: negative ? `-${magnitude}` : magnitude }
}

/**
 * What all numbers of [lo, hi] give when rounded to nearest, to as many places as that is so. A tie at an end counts as not
 * decided, so that the answer does not depend on how ties are rounded. Not monotone in the places ([0.4499, 0.4501] is 0.450
 * to three places but undecided to one), hence the search from the longest down.
 */
export function certifiedRounded(lo: string, hi: string): CertifiedDigits {
  const { low, high, places } = scaleEnclosure(lo, hi)
  if (low === high) return { decimals: places, text: decimalText(low, places) }
  for (let decimals = Math.max(0, places - (high - low).toString().length + 1); decimals >= 0; decimals -= 1) {
    // m - 1/2 < x 10^decimals < m + 1/2 over the common denominator 2 unit.
    const unit = 10n ** BigInt(places - decimals)
    const nearest = (2n * low + unit) / (2n * unit)
    for (const candidate of [nearest - 1n, nearest, nearest + 1n]) {
      const centre = 2n * candidate * unit
      if (2n * low > centre - unit && 2n * high < centre + unit) return { decimals, text: decimalText(candidate, decimals) }
    }
  }
  return { decimals: 0, text: null }
}

/** The two ends as one line, each exactly as it is stored. */
export function intervalText(lo: string, hi: string): string {
  return `[${lo}, ${hi}]`
}

/** A decimal for LaTeX: thin spaces between groups of five after the point, as in 1.63661\,63233. */
export function latexNumber(text: string): string {
  const { negative, integer, fraction } = parseDecimal(text)
  const grouped = groupDigits(fraction).join('\\,')
  return `${negative ? '-' : ''}${integer}${grouped === '' ? '' : `.${grouped}`}`
}

/** The certified digits followed by an ellipsis, for LaTeX; the interval where no digit is certified. */
export function latexEnclosure(lo: string, hi: string): string {
  const { text } = certifiedTruncated(lo, hi)
  if (text === null || lo === hi) return text === null ? latexInterval(lo, hi) : latexNumber(text)
  return `${latexNumber(text)}\\ldots`
}

/** Both ends for LaTeX. */
export function latexInterval(lo: string, hi: string): string {
  return `[${latexNumber(lo)},\\ ${latexNumber(hi)}]`
}

import { scaleEnclosure } from '../../../../shared/digits.ts'
import { ratio } from './scale.ts'

export interface NestedEnclosure {
  /** Claim number or method: what the row is called. */
  label: string
  lo: string
  hi: string
}

/** One row of the nest; positions are shares of the row's window from its left edge. */
export interface NestRow extends NestedEnclosure {
  /** Where the enclosure begins and ends in its window. */
  start: number
  end: number
  /** Where this row's window lies in the window of the row above; null for the first row. */
  inRowAbove: { start: number; end: number } | null
  /** Magnified by this power of ten against the row above. */
  magnification: number
  /** The window is 10^exponent wide. */
  exponent: number
  /** It has no point in common with the row above. */
  conflict: boolean
  /** Where the enclosure of the row above lies in this window, as far as it can be seen; null for the first row. */
  above: { start: number; end: number } | null
}

interface Interval {
  low: bigint
  high: bigint
}

/** Lays the enclosures out one below the other, widest first, by exact arithmetic; only the final ratios are doubles. */
export function nest(enclosures: NestedEnclosure[]): NestRow[] {
  // Two more places than any end has, so that halves and windows of width 10^-places are whole numbers.
  const places = Math.max(0, ...enclosures.map(({ lo, hi }) => scaleEnclosure(lo, hi).places)) + 2
  const rows = enclosures
    .map((enclosure) => {
      const { low, high, places: own } = scaleEnclosure(enclosure.lo, enclosure.hi)
      const unit = 10n ** BigInt(places - own)
      return { enclosure, interval: { low: low * unit, high: high * unit } }
    })
    .sort((one, other) => (width(one.interval) > width(other.interval) ? -1 : width(one.interval) < width(other.interval) ? 1 : 0))

  let window: Interval | null = null
  let exponentAbove = 0
  return rows.map(({ enclosure, interval }, index) => {
    const above = rows[index - 1]?.interval ?? null
    const conflict = above !== null && (interval.low > above.high || interval.high < above.low)
    const shown = conflict && above ? { low: min(interval.low, above.low), high: max(interval.high, above.high) } : interval
    const power = powerAtLeast((width(shown) * 3n) / 2n)
    const middle = (shown.low + shown.high) / 2n
    const own: Interval = { low: middle - 10n ** BigInt(power) / 2n, high: middle + 10n ** BigInt(power) / 2n }
    const row: NestRow = {
      ...enclosure,
      start: position(interval.low, own),
      end: position(interval.high, own),
      inRowAbove: window && { start: position(own.low, window), end: position(own.high, window) },
      magnification: window ? exponentAbove - (power - places) : 0,
      exponent: power - places,
      conflict,
      above: above && { start: position(above.low, own), end: position(above.high, own) },
    }
    window = own
    exponentAbove = power - places
    return row
  })
}

const width = ({ low, high }: Interval): bigint => high - low
const min = (one: bigint, other: bigint): bigint => (one < other ? one : other)
const max = (one: bigint, other: bigint): bigint => (one > other ? one : other)

/** Share of the window, held between its edges. */
function position(value: bigint, window: Interval): number {
  return Math.min(1, Math.max(0, ratio(value - window.low, width(window))))
}

/** Least e >= 1 with 10^e >= value. */
function powerAtLeast(value: bigint): number {
  return value <= 10n ? 1 : (value - 1n).toString().length
}

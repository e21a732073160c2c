import { certifiedRounded, certifiedTruncated, scaleEnclosure } from './digits.ts'

/** An enclosure by its end points, exact decimal text. */
export interface Interval {
  lo: string
  hi: string
}

/** Whether a >= b, for plain decimal text, exactly. */
function atLeast(a: string, b: string): boolean {
  const [first, second] = [scaleEnclosure(a, a), scaleEnclosure(b, b)]
  return first.low * 10n ** BigInt(second.places) >= second.low * 10n ** BigInt(first.places)
}

/** The numbers that lie in every one of these enclosures; null where there is no enclosure or no such number. Exact. */
export function intersection(enclosures: readonly Interval[]): Interval | null {
  const [first, ...rest] = enclosures
  if (!first) return null
  const lo = rest.reduce((greatest, one) => (atLeast(one.lo, greatest) ? one.lo : greatest), first.lo)
  const hi = rest.reduce((least, one) => (atLeast(least, one.hi) ? one.hi : least), first.hi)
  return atLeast(hi, lo) ? { lo, hi } : null
}

/** Decimals after the point that an enclosure certifies, truncated and rounded. */
export function digitsOf({ lo, hi }: Interval): { truncated: number; rounded: number } {
  return { truncated: certifiedTruncated(lo, hi).decimals, rounded: certifiedRounded(lo, hi).decimals }
}

import { parseDecimal } from '../../shared/engine/arithmetic/decimal.ts'
import { add, compare, rational, subtract } from '../../shared/engine/arithmetic/rational.ts'

/**
 * Whether an enclosure and a value printed elsewhere agree: the printed value, give or take `units` of its last place (1 for a
 * value cut off or rounded), meets [lo, hi].
 */
export function contains(enclosure: { lo: string; hi: string }, printed: string, units = 1): boolean {
  const value = parseDecimal(printed)!
  const places = printed.includes('.') ? printed.length - printed.indexOf('.') - 1 : 0
  const slack = rational(units, 10n ** BigInt(places))
  return (
    compare(parseDecimal(enclosure.lo)!, add(value, slack)) <= 0 && compare(subtract(value, slack), parseDecimal(enclosure.hi)!) <= 0
  )
}

/** Whether the lower and upper end truncated to the printed number of places are the printed digits exactly. */
export function sharesDigits(enclosure: { lo: string; hi: string }, printed: string): boolean {
  return enclosure.lo.startsWith(printed) && enclosure.hi.startsWith(printed)
}

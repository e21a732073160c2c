import { parseDecimal } from '../../shared/engine/arithmetic/decimal.ts'
import { add, compare, multiply, rational, subtract } from '../../shared/engine/arithmetic/rational.ts'

/**
 * Whether an enclosure and a value printed elsewhere agree: the printed value (1.25 or 1.25E-7), give or take `units` of its last
 * place (1 for a value cut off or rounded), meets [lo, hi].
 */
export function contains(enclosure: { lo: string; hi: string }, printed: string, units = 1): boolean {
  const [mantissa, exponent = '0'] = printed.split('E')
  const power = tenTo(Number(exponent))
  const value = multiply(parseDecimal(mantissa)!, power)
  const places = (mantissa.split('.')[1] ?? '').length
  const slack = multiply(rational(units, 10n ** BigInt(places)), power)
  return (
    compare(parseDecimal(enclosure.lo)!, add(value, slack)) <= 0 && compare(subtract(value, slack), parseDecimal(enclosure.hi)!) <= 0
  )
}

const tenTo = (n: number) => (n < 0 ? rational(1n, 10n ** BigInt(-n)) : rational(10n ** BigInt(n)))

/** Whether the lower and upper end truncated to the printed number of places are the printed digits exactly. */
export function sharesDigits(enclosure: { lo: string; hi: string }, printed: string): boolean {
  return enclosure.lo.startsWith(printed) && enclosure.hi.startsWith(printed)
}

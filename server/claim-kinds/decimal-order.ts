import { scaleEnclosure } from '../../shared/digits.ts'

/** Whether a < b for plain decimals, exactly. */
export function isLess(a: string, b: string): boolean {
  const [left, right] = [scaleEnclosure(a, a), scaleEnclosure(b, b)]
  return left.low * 10n ** BigInt(right.places) < right.low * 10n ** BigInt(left.places)
}

import { certifiedDigits, lowerDecimal, parseDecimal, scientificUpper, upperDecimal } from '../arithmetic/decimal.ts'
import { type Rational, add, rational, subtract } from '../arithmetic/rational.ts'
import type { BudgetItem, Enclosure, ErrorSource, Outcome } from './computation.ts'

/** One part of the radius, exactly. */
export interface ExactBudgetItem {
  source: ErrorSource
  bound: string
  magnitude: Rational
}

/** Half the width, exactly. */
export function halfWidth(lo: Rational, hi: Rational): Rational {
  const width = subtract(hi, lo)
  return rational(width.num, width.den * 2n)
}

/** Places after the point at which rounding outward adds less than a fiftieth of the radius; `fallback` for a point interval. */
function placesFor(radius: Rational, fallback: number): number {
  if (radius.num === 0n) return fallback
  // radius > 10^(digits of num - digits of den - 1).
  return Math.max(1, radius.den.toString().length - radius.num.toString().length + 3)
}

/** [lo, hi] as decimals rounded outward, about as fine as the interval deserves. */
export function decimalEnclosure(lo: Rational, hi: Rational, fallback = 20): Enclosure {
  const places = placesFor(halfWidth(lo, hi), fallback)
  return { lo: lowerDecimal(lo, places), hi: upperDecimal(hi, places) }
}

/** The parts of an outcome that follow from the exact interval and the budget. */
export function describeEnclosure(
  lo: Rational,
  hi: Rational,
  items: readonly ExactBudgetItem[],
  fallbackPlaces = 20,
): Pick<Outcome, 'enclosure' | 'radius' | 'digits' | 'budget'> {
  const enclosure = decimalEnclosure(lo, hi, fallbackPlaces)
  const [outerLo, outerHi] = [parseDecimal(enclosure.lo), parseDecimal(enclosure.hi)]
  if (!outerLo || !outerHi) throw new Error('an enclosure was written that cannot be read')
  const radius = halfWidth(outerLo, outerHi)
  const written = subtract(radius, halfWidth(lo, hi))
  const places = enclosure.lo.length - enclosure.lo.indexOf('.') - 1
  const all: ExactBudgetItem[] = [...items, { source: 'rounding', bound: 'A-7', magnitude: written }]
  return {
    enclosure,
    radius: scientificUpper(radius),
    digits: certifiedDigits(outerLo, outerHi, places),
    budget: mergeSameBound(all).map(({ source, bound, magnitude }): BudgetItem => ({ source, bound, magnitude: scientificUpper(magnitude) })),
  }
}

/** One item for each bound, so that a budget is read at a glance. */
function mergeSameBound(items: readonly ExactBudgetItem[]): ExactBudgetItem[] {
  const merged = new Map<string, ExactBudgetItem>()
  for (const item of items) {
    const known = merged.get(item.bound)
    merged.set(item.bound, known ? { ...known, magnitude: add(known.magnitude, item.magnitude) } : { ...item })
  }
  return [...merged.values()]
}

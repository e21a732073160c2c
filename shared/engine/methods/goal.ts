import { LIMITS } from '../../limits.ts'
import { type Rational, ONE, compare, multiply, parseRational, rational } from '../arithmetic/rational.ts'
import { EngineRefusal } from '../errors.ts'

/**
 * What is asked for: certified digits after the point; or a width, hi - lo being at most that (a positive decimal such as "2.5e-30");
 * or, of a partial sum, the cut-off up to which terms are added.
 */
export type Goal = { digits: number } | { width: string } | { cutoff: string }

/** The goal in words. */
export function goalText(goal: Goal): string {
  if ('cutoff' in goal) return `terms up to ${goal.cutoff}`
  return 'width' in goal ? `width at most ${goal.width}` : `${goal.digits} digit${goal.digits === 1 ? '' : 's'}`
}

/** How a width is written. */
export const WIDTH_PATTERN = /^\d{1,40}(\.\d{1,1100})?([eE]-\d{1,4})?$/

/** The width that a text names, exactly; null where it is none that can be asked for. */
export function parseWidth(text: string): Rational | null {
  const width = WIDTH_PATTERN.test(text) ? parseRational(text) : null
  return width && width.num > 0n && compare(width, ONE) < 0 && compare(width, tenToMinus(LIMITS.digits)) >= 0 ? width : null
}

export const WIDTH_HINT = `a decimal below 1 and not below 1e-${LIMITS.digits}, such as 1e-30`

export function readWidth(text: string): Rational {
  const width = parseWidth(text)
  if (!width) throw new EngineRefusal('out_of_range', 'width', `A width is ${WIDTH_HINT}.`)
  return width
}

/** The greatest hi - lo that serves the goal; null for a cut-off, which asks for none. */
export function widthAsked(goal: Goal): Rational | null {
  if ('cutoff' in goal) return null
  return 'digits' in goal ? tenToMinus(goal.digits) : readWidth(goal.width)
}

/**
 * The decimals that a method without a cut-off works to, from 1 to `most`: the least count with 10^-count at most the width asked for.
 * `method` names it in a refusal ("The expansion").
 */
export function decimalsAsked(goal: Goal, method: string, most: number): number {
  if ('cutoff' in goal) throw new EngineRefusal('method_does_not_fit', 'cutoff', `${method} has no cut-off: ask for digits or a width.`)
  const decimals = 'digits' in goal ? goal.digits : decimalsOf(readWidth(goal.width))
  if (decimals > most) throw new EngineRefusal('too_many_digits', 'digits' in goal ? 'digits' : 'width', `${method} goes up to ${most} digits.`)
  return decimals
}

function decimalsOf(width: Rational): number {
  let decimals = 1
  while (compare(tenToMinus(decimals), width) > 0) decimals += 1
  return decimals
}

/** The radius that a method aims at which works to the decimals asked for, in scientific notation: a fifth of the width or less. */
export function radiusAimedAt(goal: Goal): string {
  return `1.0e-${decimalsAsked(goal, '', LIMITS.digits) + 1}`
}

/** Whether an interval of this radius serves the goal. */
export function serves(goal: Goal, radius: Rational): boolean {
  const asked = widthAsked(goal)
  return asked === null || compare(multiply(rational(2), radius), asked) <= 0
}

const tenToMinus = (decimals: number): Rational => rational(1n, 10n ** BigInt(decimals))

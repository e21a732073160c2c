import { type Rational, ceil, compare, multiply, rational } from '../arithmetic/rational.ts'
import { EngineRefusal } from '../errors.ts'
import type { PrimeExpansion } from '../series/prime-expansion.ts'
import type { Parameters } from './computation.ts'

/** All that fixes a run of the expansion. Any values in range give a true enclosure. */
export interface ExpansionParameters {
  /** Bits after the binary point. */
  precision: number
  /** Primes up to here are taken one by one. */
  split: number
  /** Powers of 1/p used beyond them: j = 2 … powers. */
  powers: number
  /** Terms of the alternating sum for zeta (Z-1). */
  terms: number
}

const RANGES: Record<keyof ExpansionParameters, [number, number]> = {
  precision: [32, 40_000],
  split: [3, 5_000_000],
  powers: [2, 10_000],
  terms: [1, 10_000],
}

/** Digits computed beyond those asked for, so that the digits asked for are certified but for rare strings of 0 or 9. */
const SPARE_DIGITS = 5

/** Reads parameters out of a certificate; what is out of range, or a split inside the radius of convergence, is refused. */
export function readExpansionParameters(given: Parameters, expansion: PrimeExpansion): ExpansionParameters {
  const whole = (name: keyof ExpansionParameters): number => {
    const value = given[name]
    const [least, most] = RANGES[name]
    if (typeof value !== 'number' || !Number.isInteger(value) || value < least || value > most) {
      throw new EngineRefusal('unsound_parameter', name, `The parameter ${name} must be a whole number from ${least} to ${most}.`)
    }
    return value
  }
  const p = { precision: whole('precision'), split: whole('split'), powers: whole('powers'), terms: whole('terms') }
  if (compare(rational(p.split), expansion.radius) <= 0) {
    throw new EngineRefusal('unsound_parameter', 'split', 'The parameter split must lie beyond the radius of the expansion.')
  }
  return p
}

/** Chooses parameters for `digits` decimals. heuristic: affects speed only */
export function chooseExpansionParameters(digits: number, expansion: PrimeExpansion): ExpansionParameters {
  const bits = Math.ceil((digits + SPARE_DIGITS) * 3.3219281) // heuristic: affects speed only
  const split = Math.max(50 + Math.round(bits / 6), Number(ceil(multiply(expansion.radius, rational(16))))) // heuristic: affects speed only
  const radiusBits = approxBits(expansion.radius)
  const gain = approxBits(rational(split)) - radiusBits
  const powers = Math.max(2, Math.ceil((bits + approxBits(expansion.scale) + approxBits(rational(split))) / gain) + 1) // heuristic: affects speed only
  // The coefficients grow like radius^j, and so does what rounding has done to the prime zeta values beside them.
  const precision = Math.ceil(bits + powers * radiusBits + Math.max(0, approxBits(expansion.scale)) + 24) // heuristic: affects speed only
  return { precision, split, powers, terms: Math.ceil(precision / 2.54) + 1 } // heuristic: affects speed only
}

/** log2, roughly. heuristic: affects speed only */
function approxBits(a: Rational): number {
  return Math.log2(Number(a.num) / Number(a.den)) // heuristic: affects speed only
}

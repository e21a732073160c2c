import { ONE, type Rational, ZERO, add, compare, dyadic, multiply, rational, subtract } from '../arithmetic/rational.ts'
import { EngineRefusal } from '../errors.ts'
import type { Outcome } from './computation.ts'
import { decimalEnclosure, describeEnclosure, halfWidth } from './outcome.ts'
import type { LevelSums } from './trapezoid-sweep.ts'

/** What a sweep has found for one constant F = I / Gamma(b), I the integral of f Gamma(b) over the line. */
export interface SweepResult {
  sums: LevelSums
  nodes: number
  /** h. */
  step: Rational
  precision: number
  /** The bound in BOUNDS.md that the rounding of the sums rests on. */
  roundingBound: string
  /** Of T-2 for the steps h, 2h, 4h, 8h. */
  kappas: readonly Rational[]
  /** Bounds of what the nodes left out add to h sum f Gamma(b) (T-3, T-4). */
  below: Rational
  above: Rational
  /** Bounds of 1/Gamma(b). */
  gamma: readonly [Rational, Rational]
}

const HALF = rational(1, 2)

/**
 * Bounds of F from the nodes whose index 2^level divides: I is in [S (1 - kappa), (S + left out) (1 + 2 kappa)], S being the
 * step times their sum; null where kappa is too large for that. What is left out with the step 2^level h is at most 2^level
 * times the bound for h (T-7).
 */
function encloseAtLevel({ sums, step, precision, kappas, below, above, gamma }: SweepResult, level: number): { lo: Rational; hi: Rational } | null {
  const kappa = kappas[level]
  if (compare(kappa, HALF) >= 0) return null
  const width = multiply(step, rational(2 ** level))
  const [lo, hi] = sums.slice(level).reduce(([a, b], [c, d]) => [a + c, b + d], [0n, 0n]).map((n) => multiply(dyadic(n, precision), width))
  const most = add(hi, multiply(add(below, above), rational(2 ** level)))
  const least = multiply(multiply(lo, subtract(ONE, kappa)), gamma[0])
  return {
    // All terms of the constant are positive.
    lo: least.num < 0n ? ZERO : least,
    hi: multiply(multiply(most, add(ONE, multiply(kappa, rational(2)))), gamma[1]),
  }
}

/** Enclosure, budget and the enclosures on the way to it. */
export function encloseConstant(result: SweepResult): Pick<Outcome, 'enclosure' | 'radius' | 'digits' | 'budget' | 'convergence'> {
  const { sums, step, precision, kappas, below, above, gamma, nodes, roundingBound } = result
  const finest = encloseAtLevel(result, 0)
  if (!finest) throw new EngineRefusal('unsound_parameter', 'step', 'The parameter step is too wide for its error bound.')
  const upperSum = multiply(dyadic(sums.reduce((total, [, hi]) => total + hi, 0n), precision), step)
  const scaled = (a: Rational, factor: Rational): Rational => multiply(multiply(a, factor), gamma[1])
  const parts = [
    { source: 'discretisation' as const, bound: 'T-2', magnitude: scaled(multiply(kappas[0], upperSum), rational(3, 2)) },
    { source: 'truncation-below' as const, bound: 'T-3', magnitude: scaled(below, HALF) },
    { source: 'truncation-above' as const, bound: 'T-4', magnitude: scaled(above, HALF) },
  ]
  const counted = parts.reduce((total, { magnitude }) => add(total, magnitude), ZERO)
  const rest = subtract(halfWidth(finest.lo, finest.hi), counted)
  const rounding = { source: 'rounding' as const, bound: roundingBound, magnitude: rest.num > 0n ? rest : ZERO }
  return {
    ...describeEnclosure(finest.lo, finest.hi, [...parts, rounding]),
    convergence: [3, 2, 1, 0].flatMap((level) => {
      const enclosed = encloseAtLevel(result, level)
      return enclosed ? [{ at: String(Math.floor(nodes / 2 ** level)), ...decimalEnclosure(enclosed.lo, enclosed.hi) }] : []
    }),
  }
}

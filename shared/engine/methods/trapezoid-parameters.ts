import { ONE, type Rational, compare, multiply, parseRational, rational, toText } from '../arithmetic/rational.ts'
import { EngineRefusal } from '../errors.ts'
import type { DirichletSeries } from '../series/dirichlet.ts'
import type { Parameters } from './computation.ts'

/** All that fixes a run of the trapezoid. Any values in range give a true enclosure; good ones give a narrow one quickly. */
export interface TrapezoidParameters {
  /** Bits after the binary point. */
  precision: number
  /** h. */
  step: Rational
  /** Nodes j h for first <= j <= last. */
  first: number
  last: number
  /** pi/2 - a, where |Im u| < a is the strip of T-2. */
  gap: Rational
  /** See ZetaSettings. */
  terms: number
  split: number
}

const WHOLE: Record<'precision' | 'first' | 'last' | 'terms' | 'split', [number, number]> = {
  precision: [32, 8_000],
  first: [-2_000_000, -1],
  last: [1, 2_000_000],
  terms: [1, 5_000],
  split: [3, 5_000],
}

/** u = log t of the last node: e^20 is beyond every t that a run within the limits needs. */
const LARGEST_U = 20

/** Reads parameters out of a certificate; what is not in range is refused, nothing is trusted beyond that. */
export function readParameters(given: Parameters): TrapezoidParameters {
  const whole = (name: keyof typeof WHOLE): number => {
    const value = given[name]
    const [least, most] = WHOLE[name]
    if (typeof value !== 'number' || !Number.isInteger(value) || value < least || value > most) {
      throw new EngineRefusal('unsound_parameter', name, `The parameter ${name} must be a whole number from ${least} to ${most}.`)
    }
    return value
  }
  const fraction = (name: 'step' | 'gap'): Rational => {
    const value = parseRational(String(given[name] ?? ''))
    if (!value || value.num <= 0n || compare(value, ONE) > 0 || value.den > 2n ** 40n) {
      throw new EngineRefusal('unsound_parameter', name, `The parameter ${name} must be a fraction above 0 and at most 1.`)
    }
    return value
  }
  const [step, last] = [fraction('step'), whole('last')]
  if (compare(multiply(step, rational(last)), rational(LARGEST_U)) > 0) {
    throw new EngineRefusal('unsound_parameter', 'last', `The last node must lie at or below ${LARGEST_U}.`)
  }
  return {
    precision: whole('precision'),
    step,
    first: whole('first'),
    last,
    gap: fraction('gap'),
    terms: whole('terms'),
    split: whole('split'),
  }
}

export function writeParameters(p: TrapezoidParameters): Parameters {
  return { ...p, step: toText(p.step), gap: toText(p.gap) }
}

/** Digits computed beyond those asked for, so that the digits asked for are certified but for rare strings of 0 or 9. */
const SPARE_DIGITS = 5
const STEP_DENOMINATOR = 2_048
const GAP_DENOMINATOR = 65_536
/** More nodes than this are refused: the weight converges too slowly for the method. */
const MOST_NODES = 400_000

/**
 * Chooses the parameters for `digits` decimals. Doubles may be used here: every choice is recorded, and the bounds are
 * computed from what was recorded. heuristic: affects speed only
 */
export function chooseParameters(
  digits: number,
  series: readonly DirichletSeries[],
  power: Rational,
  logPower: Rational,
  complexity: number,
  distinct: boolean,
): TrapezoidParameters {
  const [s0, b] = [approx(power), approx(logPower)]
  const pole = Math.max(...series.map((one) => one.pole))
  const decay = b - pole
  const target = (digits + SPARE_DIGITS) * Math.log(10) // heuristic: affects speed only
  // The constant may be as large as decay^-k, or (log 2)^-b where the first member is 2.
  const size = complexity * Math.max(0, -Math.log(Math.min(1, decay))) + 0.37 * b // heuristic: affects speed only

  let units = STEP_DENOMINATOR
  while (units > 1 && logDiscretisation(units / STEP_DENOMINATOR, b) > -target - size) units--
  const step = units / STEP_DENOMINATOR
  const gapUnits = Math.min(GAP_DENOMINATOR, Math.max(1, Math.round(bestGap(step, b) * GAP_DENOMINATOR)))

  const depth = Math.max(...series.map((one) => truncationDepth(one, decay, target)))
  const height = Math.max(...series.map((one) => truncationHeight(one, s0, b, target)))
  const first = -Math.ceil(depth / step) - 1
  const last = Math.max(1, Math.ceil(Math.log(height) / step)) // heuristic: affects speed only
  if (last - first > MOST_NODES) {
    throw new EngineRefusal('too_slow', 'logPower', 'The sum converges too slowly for so many digits by this method: ask for fewer digits.')
  }

  // Loss through sums of many terms, through t^b at large t, through 1/(s0 - 1), and through symmetric functions.
  const loss = 28 + b * Math.log2(height) + size / Math.LN2 + (s0 > 1 ? Math.log2(1 + 1 / (s0 - 1)) : 0) + (distinct ? 2 * complexity + 10 : 0) // heuristic: affects speed only
  const precision = Math.ceil(target / Math.LN2 + loss)
  return {
    precision,
    step: rational(units, STEP_DENOMINATOR),
    first,
    last,
    gap: rational(gapUnits, GAP_DENOMINATOR),
    terms: Math.ceil(precision / 2.54) + 1,
    split: 50 + Math.round(precision / 6),
  }
}

function approx(a: Rational): number {
  return Number(a.num) / Number(a.den) // heuristic: affects speed only
}

function bestGap(step: number, b: number): number {
  return Math.min(1, (b * step) / 6.283)
}

/** log of kappa in T-2. */
function logDiscretisation(step: number, b: number): number {
  const gap = bestGap(step, b)
  return Math.log(2) - b * Math.log(gap) - (6.2831 * (1.5707 - gap)) / step // heuristic: affects speed only
}

/** L with e^(-decay L) Q(L + 1) / decay about e^-target (T-3). */
function truncationDepth(series: DirichletSeries, decay: number, target: number): number {
  const coefficients = series.majorant.coefficients.map(approx)
  const degree = coefficients.length - 1
  // The highest power is taken out: in a double y^60 would become infinite, and no depth would do.
  const logQ = (y: number): number => degree * Math.log(y) + Math.log(coefficients.reduce((total, c) => total / y + c, 0)) // heuristic: affects speed only
  let depth = (2 * coefficients.length) / decay + 1
  while (-decay * depth + logQ(depth + 1) - Math.log(decay) > -target) depth += 0.25 / Math.min(1, decay) // heuristic: affects speed only
  return depth
}

/** t with t^b n^-(s0 + t) about e^-target, n the least member (T-4). */
function truncationHeight(series: DirichletSeries, s0: number, b: number, target: number): number {
  const logLeast = (series.leastMember.toString(2).length - 1) * Math.LN2
  let height = 1 + (2 * b) / logLeast
  while (b * Math.log(height) - (s0 + height) * logLeast > -target) height += 0.5 // heuristic: affects speed only
  return height
}

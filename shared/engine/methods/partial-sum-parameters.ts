import { LIMITS } from '../../limits.ts'
import { type Rational, compare, floorScaled, isInteger, parseRational, rational } from '../arithmetic/rational.ts'
import { EngineRefusal } from '../errors.ts'
import type { Estimate } from '../estimates/estimate.ts'
import { ESTIMATES, estimateById } from '../estimates/library.ts'
import type { RationalWeight } from '../sieve/weight.ts'
import type { Parameters } from './computation.ts'
import { type Goal, widthAsked } from './goal.ts'

/** All that fixes a partial sum. */
export interface PartialSumParameters {
  /** Terms up to here are added, what lies beyond is estimated. */
  cutoff: number
  /** Bits after the binary point. */
  precision: number
  /** The estimates that the tail may use, by id. */
  estimates: readonly Estimate[]
}

export const LEAST_CUTOFF = 2_000
const PRECISION = 128
const PRECISIONS = [64, 4_096]

function refuse(name: string, message: string): never {
  throw new EngineRefusal('unsound_parameter', name, message)
}

/** The cut-off that a goal or a parameter names, checked. */
export function readCutoff(text: string | number, most: number = LIMITS.cutoff): number {
  const value = parseRational(String(text))
  if (!value || !isInteger(value) || compare(value, rational(LEAST_CUTOFF)) < 0 || compare(value, rational(most)) > 0) {
    throw new EngineRefusal('out_of_range', 'cutoff', `The cut-off must be a whole number from ${LEAST_CUTOFF} to ${most}.`)
  }
  return Number(value.num)
}

/** Reads parameters out of a certificate; what is not sound is refused. */
export function readPartialSumParameters(given: Parameters, most?: number): PartialSumParameters {
  const { precision } = given
  if (typeof precision !== 'number' || !Number.isInteger(precision) || precision < PRECISIONS[0] || precision > PRECISIONS[1]) {
    refuse('precision', `The parameter precision must be a whole number from ${PRECISIONS[0]} to ${PRECISIONS[1]}.`)
  }
  const ids = String(given.estimates ?? '').split(',').filter((id) => id !== '')
  const estimates = ids.map((id) => estimateById(id) ?? refuse('estimates', `There is no estimate named ${id.slice(0, 80)}.`))
  return { cutoff: readCutoff(given.cutoff ?? '', most), precision, estimates }
}

export function writePartialSumParameters({ cutoff, precision, estimates }: PartialSumParameters): Parameters {
  return { cutoff: String(cutoff), precision, estimates: estimates.map(({ id }) => id).join(',') }
}

/** Every estimate that rests on no unproven hypothesis. */
export const unconditional = (): Estimate[] => ESTIMATES.filter(({ conditional }) => !conditional)

/** The parameters for a goal, the radius at a cut-off being about `radiusAt`; null where no allowed cut-off is enough. */
export function choosePartialSumParameters(
  goal: Goal,
  radiusAt: (cutoff: number) => number,
  most: number = LIMITS.cutoff,
): PartialSumParameters | null {
  const width = widthAsked(goal)
  const cutoff = 'cutoff' in goal ? readCutoff(goal.cutoff, most) : cutoffFor(width ? approximate(width) : 1, radiusAt, most)
  return cutoff === null ? null : { cutoff, precision: PRECISION, estimates: unconditional() }
}

/** The least of 1, 2, 5 times a power of ten at which the interval is narrower than asked for. heuristic: affects speed only */
function cutoffFor(width: number, radiusAt: (cutoff: number) => number, most: number): number | null {
  for (let power = 10_000; power <= most; power *= 10) {
    for (const factor of [1, 2, 5]) {
      if (power * factor <= most && radiusAt(power * factor) < 0.45 * width) return power * factor
    }
  }
  return null
}

export function approximate(a: Rational): number {
  return Number(floorScaled(a, 128)) / 2 ** 128 // heuristic: affects speed only
}

/** About the radius that the tail of a sum over the primes leaves (S-5). heuristic: affects speed only */
export function primeTailRadius({ power, logPower }: RationalWeight, cutoff: number): number {
  const [s, b] = [approximate(power), approximate(logPower)]
  const l = Math.log(cutoff) // heuristic: affects speed only
  const near = 0.95 * (s / (s - 0.5)) * cutoff ** (0.5 - s) * l ** (-b - 1)
  const far = 1e19 ** (0.5 - s) * 43.7 ** (1 - b) / 13
  return near + far
}

/** About the same for the primes of a class: 2.072 sqrt(t) up to 10^10 for moduli up to 72, then t/(840 log t). heuristic: affects choice only */
export function classTailRadius(weight: RationalWeight, modulus: number, cutoff: number): number {
  const [s, b] = [approximate(weight.power), approximate(weight.logPower)]
  const l = Math.log(cutoff) // heuristic: affects speed only
  if (modulus > 72 && cutoff < 8e9) return (s === 1 ? l ** -b / b : (cutoff ** (1 - s) * l ** (-b - 1)) / (s - 1)) / 2
  const near = cutoff < 1e10 ? ((2.072 * s) / (s - 0.5)) * cutoff ** (0.5 - s) * l ** (-b - 1) : 0
  const start = Math.max(cutoff, 1e10)
  const v = Math.log(start) // heuristic: affects speed only
  const far = s === 1 ? v ** (-b - 1) / (b + 1) : (start ** (1 - s) * v ** (-b - 2) * s) / (s - 1)
  return near + far / 840
}

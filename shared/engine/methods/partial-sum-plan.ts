import { parseRational } from '../arithmetic/rational.ts'
import { EngineRefusal } from '../errors.ts'
import type { Definition, SeriesDefinition, SetOfIntegers } from '../sets/definition.ts'
import type { Estimate } from '../estimates/estimate.ts'
import { smoothTailRadius } from '../estimates/smooth-tail.ts'
import { MOST_SMOOTH, countSmooth } from '../sets/enumerate-products.ts'
import type { RationalWeight } from '../sieve/weight.ts'
import { type FactorSet, LARGEST_INTEGER_CUTOFF, integerTailRadius } from './partial-sum-integers.ts'
import { type SmoothSet, membersWithin, primesOf } from './partial-sum-smooth.ts'
import { approximate, classTailRadius, primeTailRadius } from './partial-sum-parameters.ts'

/** What the method can do for one definition, and how well. */
export interface Plan {
  weight: RationalWeight
  /** Whether integers are sorted by their prime factors, and not primes summed. */
  byFactors?: true
  /** What the tail may use, where that is not every estimate without a condition. */
  estimates?: readonly Estimate[]
  /** Of a residue class, whose tail has estimates of its own. */
  modulus?: number
  /** The largest cut-off, where it is below the method's. */
  most?: number
  /** About the radius at a cut-off. heuristic: affects choice only */
  radiusAt(cutoff: number): number
  /** CPU seconds on the reference machine. heuristic: affects choice only */
  secondsAt(cutoff: number): number
}

export function misfit(message: string): never {
  throw new EngineRefusal('method_does_not_fit', 'method', message)
}

export function seriesOf(definition: Definition): SeriesDefinition {
  return definition.type === 'series' ? definition : misfit('A partial sum needs a series over a set of integers.')
}

/** Sets that one run can serve together. */
export function familyOf({ kind }: SetOfIntegers): string {
  return kind === 'almost-primes' || kind === 'squarefree-almost-primes' || kind === 'distinct-prime-factors' ? 'products of primes' : kind
}

export function planFor(definition: Definition): Plan {
  const { set, weight: text } = seriesOf(definition)
  const [power, logPower] = [parseRational(text.power), parseRational(text.logPower)]
  if (!power || !logPower) throw new EngineRefusal('not_a_number', 'power', 'The weight is not written as exact numbers.')
  const weight = { power, logPower }
  const primeSeconds = (cutoff: number): number => 0.5 + 1.5e-9 * cutoff
  switch (set.kind) {
    case 'primes':
      return { weight, radiusAt: (cutoff) => primeTailRadius(weight, cutoff), secondsAt: primeSeconds }
    case 'almost-primes':
    case 'squarefree-almost-primes':
    case 'distinct-prime-factors':
      if (logPower.num <= 0n) return integerPlan(set, weight)
      return { weight, radiusAt: (cutoff) => productRadius(weight, set.k, cutoff), secondsAt: (cutoff) => 1.3 + 2.8e-9 * cutoff }
    case 'integers':
    case 'squarefree':
      return integerPlan(set, weight)
    case 'residue-class':
      return { weight, radiusAt: (cutoff) => classTailRadius(weight, set.modulus, cutoff), secondsAt: primeSeconds }
    case 'smooth':
      return smoothPlan(set, weight)
    default:
      return misfit('The method of partial sums has no bound for what lies beyond the cut-off over this set.')
  }
}

function integerPlan(set: FactorSet, weight: RationalWeight): Plan {
  const [s, b] = [approximate(weight.power), approximate(weight.logPower)]
  return {
    weight,
    byFactors: true,
    most: LARGEST_INTEGER_CUTOFF,
    radiusAt: (cutoff) => integerTailRadius(set, s, b, cutoff),
    secondsAt: (cutoff) => 0.4 + 1.2e-8 * cutoff,
  }
}

function smoothPlan(set: SmoothSet, weight: RationalWeight): Plan {
  const rough = { power: approximate(weight.power), logPower: approximate(weight.logPower) }
  const primes = primesOf(set)
  let tooFar = Infinity
  return {
    weight,
    radiusAt: (cutoff) => {
      if (cutoff < tooFar && countSmooth(set.y, set.exclude, cutoff) > MOST_SMOOTH) tooFar = cutoff
      return cutoff < tooFar ? smoothTailRadius(rough, cutoff, primes) : Infinity
    },
    secondsAt: (cutoff) => 0.15 + 6.5e-6 * membersWithin(set, cutoff),
  }
}

/** About the radius of a sum over products of k primes: the uncertainty of P(s) times what multiplies it. heuristic: affects choice only */
function productRadius({ power, logPower }: RationalWeight, k: number, cutoff: number): number {
  const [s, b] = [approximate(power), approximate(logPower)]
  const l = Math.log(cutoff) // heuristic: affects speed only
  const ll = Math.log(l) // heuristic: affects speed only
  let [factor, term] = [0, 1]
  for (let i = 0; i < k; i++, term *= ll / i) factor += term
  return 1.95 * cutoff ** (0.5 - s) * l ** (-1 - b) * Math.min(factor, l)
}

import { createBallArithmetic } from '../arithmetic/ball.ts'
import { ONE, ZERO, parseRational } from '../arithmetic/rational.ts'
import { EngineRefusal } from '../errors.ts'
import { estimatesUsed } from '../estimates/envelope.ts'
import type { Definition, SeriesDefinition, SetOfIntegers } from '../sets/definition.ts'
import type { RationalWeight } from '../sieve/weight.ts'
import type { Computation, ComputationRequest, Goal } from './computation.ts'
import { mellinTask } from './mellin-task.ts'
import type { Forecast, MethodModule } from './method.ts'
import { type PartialSumParameters, approximate, choosePartialSumParameters, primeTailRadius, readPartialSumParameters } from './partial-sum-parameters.ts'
import { type FactorSet, IntegerPartialSum, LARGEST_INTEGER_CUTOFF, integerTailRadius } from './partial-sum-integers.ts'
import { PrimePartialSum } from './partial-sum-primes.ts'
import { ProductPartialSum, chooseProductParameters, readProductParameters } from './partial-sum-products.ts'
import { cutIntoRanges } from './partial-sum-ranges.ts'

/** What the method can do for one definition, and how well. */
interface Plan {
  weight: RationalWeight
  /** Whether integers are sorted by their prime factors, and not primes summed. */
  byFactors?: true
  /** The largest cut-off, where it is below the method's. */
  most?: number
  /** About the radius at a cut-off. heuristic: affects choice only */
  radiusAt(cutoff: number): number
  /** CPU seconds on the reference machine. heuristic: affects choice only */
  secondsAt(cutoff: number): number
}

function misfit(message: string): never {
  throw new EngineRefusal('method_does_not_fit', 'method', message)
}

function seriesOf(definition: Definition): SeriesDefinition {
  return definition.type === 'series' ? definition : misfit('A partial sum needs a series over a set of integers.')
}

/** Sets that one run can serve together. */
function familyOf({ kind }: SetOfIntegers): string {
  return kind === 'almost-primes' || kind === 'squarefree-almost-primes' || kind === 'distinct-prime-factors' ? 'products of primes' : kind
}

function planFor(definition: Definition): Plan {
  const { set, weight: text } = seriesOf(definition)
  const [power, logPower] = [parseRational(text.power), parseRational(text.logPower)]
  if (!power || !logPower) throw new EngineRefusal('not_a_number', 'power', 'The weight is not written as exact numbers.')
  const weight = { power, logPower }
  const primeSeconds = (cutoff: number): number => 0.25 + 1.2e-9 * cutoff
  switch (set.kind) {
    case 'primes':
      return { weight, radiusAt: (cutoff) => primeTailRadius(weight, cutoff), secondsAt: primeSeconds }
    case 'almost-primes':
    case 'squarefree-almost-primes':
    case 'distinct-prime-factors':
      if (logPower.num <= 0n) return integerPlan(set, weight)
      return { weight, radiusAt: (cutoff) => productRadius(weight, set.k, cutoff), secondsAt: (cutoff) => 2.5 + 1.7e-9 * cutoff }
    case 'integers':
    case 'squarefree':
      return integerPlan(set, weight)
    case 'residue-class':
      return { weight, radiusAt: (cutoff) => wholeTail(weight, cutoff) / 2, secondsAt: primeSeconds }
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
    secondsAt: (cutoff) => 0.6 + 1.6e-8 * cutoff,
  }
}

/** About the sum over all primes beyond a cut-off. heuristic: affects choice only */
function wholeTail({ power, logPower }: RationalWeight, cutoff: number): number {
  const [s, b] = [approximate(power), approximate(logPower)]
  const l = Math.log(cutoff) // heuristic: affects speed only
  return s === 1 ? l ** -b / b : (cutoff ** (1 - s) * l ** (-b - 1)) / (s - 1)
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

function parametersFor(plan: Plan, goal: Goal): PartialSumParameters {
  const chosen = choosePartialSumParameters(goal, (cutoff) => plan.radiusAt(cutoff), plan.most)
  if (chosen) return chosen
  throw new EngineRefusal('too_many_digits', 'digits', 'A partial sum cannot reach so many digits: ask for fewer, or choose the transform.')
}

/** Only the estimates that the tail will use. */
function withUsedEstimates(chosen: PartialSumParameters, weights: readonly RationalWeight[]): PartialSumParameters {
  const cutoffs = cutIntoRanges(chosen.cutoff).flatMap(({ hi, mark }) => (mark ? [hi] : []))
  return { ...chosen, estimates: estimatesUsed(createBallArithmetic(chosen.precision), cutoffs, chosen.estimates, weights) }
}

/** Sums the terms up to a cut-off from first principles and bounds the rest by published estimates. */
export const partialSum: MethodModule = {
  name: 'partial-sum',

  forecast(definition, goal, arithmetic, speed): Forecast {
    try {
      const plan = planFor(definition)
      const { cutoff } = parametersFor(plan, goal)
      const seconds = (plan.secondsAt(cutoff) * (arithmetic === 'mpfr' ? 2 : 1)) / speed
      return { possible: true, radius: plan.radiusAt(cutoff).toExponential(1), seconds }
    } catch (refusal) {
      if (refusal instanceof EngineRefusal) return { possible: false, reason: refusal.message }
      throw refusal
    }
  },

  async prepare(request) {
    const definitions = request.definitions.map(seriesOf)
    const plans = definitions.map(planFor)
    const { set } = definitions[0]
    if (definitions.some((one) => familyOf(one.set) !== familyOf(set))) misfit('One run of partial sums serves sets of one kind: ask for others in runs of their own.')
    if (plans.some(({ byFactors }) => byFactors)) return integerSum(request, definitions, plans)
    if (set.kind === 'primes' || set.kind === 'residue-class') return primeSum(request, definitions, plans)
    const chosen = request.parameters ? null : withUsedEstimates(parametersFor(plans[0], request.goal), [RECIPROCAL])
    const task = mellinTask(definitions)
    return new ProductPartialSum(request, chosen ? chooseProductParameters(chosen, task) : readProductParameters(request.parameters ?? {}), task)
  },
}

/** The sums of p^-s over the primes, of which others are made, use theta as the weight 1/p does. */
const RECIPROCAL: RationalWeight = { power: ONE, logPower: ZERO }

function primeSum(request: ComputationRequest, definitions: readonly SeriesDefinition[], plans: readonly Plan[]): Computation {
  const weights = plans.map(({ weight }) => weight)
  const chosen = request.parameters ? readPartialSumParameters(request.parameters) : withUsedEstimates(parametersFor(plans[0], request.goal), weights)
  const tasks = definitions.map(({ set }, i) => ({ weight: weights[i], exclude: 'exclude' in set ? set.exclude : [] }))
  const { set } = definitions[0]
  if (set.kind !== 'residue-class') return new PrimePartialSum(request, chosen, tasks)
  const { modulus, residue } = set
  if (definitions.some(({ set: other }) => other.kind !== set.kind || other.modulus !== modulus || other.residue !== residue)) {
    misfit('One run of partial sums serves one residue class.')
  }
  return new PrimePartialSum(request, chosen, tasks, { modulus, residue })
}

function integerSum(request: ComputationRequest, definitions: readonly SeriesDefinition[], plans: readonly Plan[]): Computation {
  const [{ set }] = definitions
  const same = (other: SetOfIntegers): boolean => other.kind === set.kind && 'exclude' in other && 'exclude' in set && other.exclude.join() === set.exclude.join()
  if (!plans.every(({ byFactors }) => byFactors) || !definitions.every((one) => same(one.set))) {
    misfit('One run of partial sums over integers serves one kind of set with the same exclusions.')
  }
  const chosen = request.parameters ? readPartialSumParameters(request.parameters, LARGEST_INTEGER_CUTOFF) : parametersFor(plans[0], request.goal)
  return new IntegerPartialSum(request, chosen, plans.map(({ weight }) => weight))
}

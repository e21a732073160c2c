import { LIMITS } from '../../limits.ts'
import { createBallArithmetic } from '../arithmetic/ball.ts'
import { ONE, ZERO } from '../arithmetic/rational.ts'
import { EngineRefusal } from '../errors.ts'
import { estimatesUsed } from '../estimates/envelope.ts'
import type { SeriesDefinition, SetOfIntegers } from '../sets/definition.ts'
import type { RationalWeight } from '../sieve/weight.ts'
import type { Computation, ComputationRequest } from './computation.ts'
import type { Goal } from './goal.ts'
import { mellinTask } from './mellin-task.ts'
import type { Forecast, MethodModule } from './method.ts'
import { type PartialSumParameters, choosePartialSumParameters, readPartialSumParameters } from './partial-sum-parameters.ts'
import { IntegerPartialSum, LARGEST_INTEGER_CUTOFF } from './partial-sum-integers.ts'
import { type Plan, familyOf, misfit, planFor, seriesOf } from './partial-sum-plan.ts'
import { PrimePartialSum } from './partial-sum-primes.ts'
import { estimatesLeft, planWithout } from './partial-sum-without.ts'
import { ProductPartialSum, chooseProductParameters, readProductParameters } from './partial-sum-products.ts'
import { type SmoothSet, SmoothPartialSum, chooseSmoothParameters, readSmoothParameters } from './partial-sum-smooth.ts'
import { cutIntoRanges } from './partial-sum-ranges.ts'

function parametersFor(plan: Plan, goal: Goal): PartialSumParameters {
  const chosen = choosePartialSumParameters(goal, (cutoff) => plan.radiusAt(cutoff), plan.most)
  if (chosen) return plan.estimates ? { ...chosen, estimates: estimatesLeft(plan, chosen.cutoff) } : chosen
  if (plan.estimates) estimatesLeft(plan, LIMITS.cutoff)
  throw new EngineRefusal('too_many_digits', 'width' in goal ? 'width' : 'digits', 'A partial sum cannot come so close: ask for less, or choose the transform.')
}

/** Only the estimates that the tail will use. */
function withUsedEstimates(chosen: PartialSumParameters, weights: readonly RationalWeight[], modulus = 1): PartialSumParameters {
  const cutoffs = cutIntoRanges(chosen.cutoff).flatMap(({ hi, mark }) => (mark ? [hi] : []))
  return { ...chosen, estimates: estimatesUsed(createBallArithmetic(chosen.precision), cutoffs, chosen.estimates, weights, modulus) }
}

/** Sums the terms up to a cut-off from first principles and bounds the rest by published estimates. */
export const partialSum: MethodModule = {
  name: 'partial-sum',

  forecast(definition, goal, arithmetic, speed, without = []): Forecast {
    try {
      const plan = planWithout(planFor(definition), definition, without)
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
    const plans = definitions.map((definition) => planWithout(planFor(definition), definition, request.parameters ? [] : (request.without ?? [])))
    const { set } = definitions[0]
    if (definitions.some((one) => familyOf(one.set) !== familyOf(set))) misfit('One run of partial sums serves sets of one kind: ask for others in runs of their own.')
    if (plans.some(({ byFactors }) => byFactors)) return integerSum(request, definitions, plans)
    if (set.kind === 'smooth') return smoothSum(request, definitions, plans, set)
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
  const tasks = definitions.map(({ set }, i) => ({ weight: weights[i], exclude: 'exclude' in set ? set.exclude : [] }))
  const { set } = definitions[0]
  const ofModulus = set.kind === 'residue-class' ? set.modulus : 1
  const chosen = request.parameters
    ? readPartialSumParameters(request.parameters)
    : withUsedEstimates(parametersFor(plans[0], request.goal), weights, ofModulus)
  if (set.kind !== 'residue-class') return new PrimePartialSum(request, chosen, tasks)
  const { modulus, residue } = set
  if (definitions.some(({ set: other }) => other.kind !== set.kind || other.modulus !== modulus || other.residue !== residue)) {
    misfit('One run of partial sums serves one residue class.')
  }
  return new PrimePartialSum(request, chosen, tasks, { modulus, residue })
}

function smoothSum(request: ComputationRequest, definitions: readonly SeriesDefinition[], plans: readonly Plan[], set: SmoothSet): Computation {
  if (!definitions.every(({ set: other }) => other.kind === 'smooth' && other.y === set.y && other.exclude.join() === set.exclude.join())) {
    misfit('One run of partial sums over smooth integers serves one set.')
  }
  const weights = plans.map(({ weight }) => weight)
  const { parameters, goal } = request
  const chosen = parameters ? readSmoothParameters(parameters, weights) : chooseSmoothParameters(parametersFor(plans[0], goal), weights)
  return new SmoothPartialSum(request, chosen, set, weights)
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

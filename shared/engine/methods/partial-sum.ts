import { createBallArithmetic } from '../arithmetic/ball.ts'
import { parseRational } from '../arithmetic/rational.ts'
import { EngineRefusal } from '../errors.ts'
import { estimatesUsed } from '../estimates/envelope.ts'
import type { Definition, SeriesDefinition } from '../sets/definition.ts'
import type { RationalWeight } from '../sieve/weight.ts'
import type { Goal } from './computation.ts'
import type { Forecast, MethodModule } from './method.ts'
import { type PartialSumParameters, approximate, choosePartialSumParameters, primeTailRadius, readPartialSumParameters } from './partial-sum-parameters.ts'
import { PrimePartialSum } from './partial-sum-primes.ts'
import { cutIntoRanges } from './partial-sum-ranges.ts'

/** What the method can do for one definition, and how well. */
interface Plan {
  weight: RationalWeight
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

function planFor(definition: Definition): Plan {
  const { set, weight: text } = seriesOf(definition)
  const [power, logPower] = [parseRational(text.power), parseRational(text.logPower)]
  if (!power || !logPower) throw new EngineRefusal('not_a_number', 'power', 'The weight is not written as exact numbers.')
  const weight = { power, logPower }
  const primeSeconds = (cutoff: number): number => 0.25 + 1.2e-9 * cutoff
  switch (set.kind) {
    case 'primes':
      return { weight, radiusAt: (cutoff) => primeTailRadius(weight, cutoff), secondsAt: primeSeconds }
    case 'residue-class':
      return { weight, radiusAt: (cutoff) => wholeTail(weight, cutoff) / 2, secondsAt: primeSeconds }
    default:
      return misfit('The method of partial sums has no bound for what lies beyond the cut-off over this set.')
  }
}

/** About the sum over all primes beyond a cut-off. heuristic: affects choice only */
function wholeTail({ power, logPower }: RationalWeight, cutoff: number): number {
  const [s, b] = [approximate(power), approximate(logPower)]
  const l = Math.log(cutoff) // heuristic: affects speed only
  return s === 1 ? l ** -b / b : (cutoff ** (1 - s) * l ** (-b - 1)) / (s - 1)
}

function parametersFor(plan: Plan, goal: Goal): PartialSumParameters {
  const chosen = choosePartialSumParameters(goal, (cutoff) => plan.radiusAt(cutoff))
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
    const weights = plans.map(({ weight }) => weight)
    const chosen = request.parameters ? readPartialSumParameters(request.parameters) : withUsedEstimates(parametersFor(plans[0], request.goal), weights)
    const { set } = definitions[0]
    if (definitions.some((one) => one.set.kind !== set.kind)) misfit('One run of partial sums serves sets of one kind: ask for others in runs of their own.')
    const tasks = definitions.map((one, i) => ({ weight: plans[i].weight, exclude: 'exclude' in one.set ? one.set.exclude : [] }))
    if (set.kind === 'residue-class') {
      const { modulus, residue } = set
      if (definitions.some(({ set: other }) => other.kind !== set.kind || other.modulus !== modulus || other.residue !== residue)) {
        misfit('One run of partial sums serves one residue class.')
      }
      return new PrimePartialSum(request, chosen, tasks, { modulus, residue })
    }
    return new PrimePartialSum(request, chosen, tasks)
  },
}

import { type Rational, compare, parseRational, rational } from '../arithmetic/rational.ts'
import { EngineRefusal } from '../errors.ts'
import { type DirichletSeries } from '../series/dirichlet.ts'
import { dirichletSeries } from '../series/families.ts'
import type { Definition, SeriesDefinition } from '../sets/definition.ts'
import type { Goal } from './computation.ts'
import type { Forecast, MethodModule } from './method.ts'
import { TrapezoidComputation } from './trapezoid-computation.ts'
import { predictSeconds } from './trapezoid-cost.ts'
import { type TrapezoidParameters, chooseParameters, readParameters } from './trapezoid-parameters.ts'

/** Beyond this many digits the trapezoid spends too many nodes; `panels` is the method then. */
const MOST_DIGITS = 300

interface Task {
  series: DirichletSeries[]
  power: Rational
  logPower: Rational
  /** The largest k. */
  complexity: number
  /** Whether sums over (p^s - 1)^-j occur, which lose more bits than the others. */
  distinct: boolean
}

/** What the trapezoid would sweep for these definitions; refuses what it cannot. */
function taskOf(definitions: readonly Definition[]): Task {
  const first = definitions[0]
  if (definitions.some((one) => one.type !== 'series')) {
    throw new EngineRefusal('method_does_not_fit', 'method', 'The transform sums weights over a set of integers; this constant is of another kind.')
  }
  const { weight } = first as SeriesDefinition
  const [power, logPower] = [parseRational(weight.power), parseRational(weight.logPower)]
  if (!power || !logPower) throw new EngineRefusal('not_a_number', 'power', 'The weight is not written as exact numbers.')
  if (logPower.num <= 0n) {
    throw new EngineRefusal('method_does_not_fit', 'method', 'The transform needs a positive power of the logarithm; use the method for derivatives.')
  }
  const series = definitions.map((one) => {
    const { set, weight: other } = one as SeriesDefinition
    if (other.power !== weight.power || other.logPower !== weight.logPower) {
      throw new EngineRefusal('mixed_weights', 'definitions', 'One sweep serves one weight: ask for other weights in runs of their own.')
    }
    const found = dirichletSeries(set, power)
    if (!found) throw new EngineRefusal('method_does_not_fit', 'method', 'The transform does not know the Dirichlet series of this set.')
    if (compare(logPower, rational(found.pole)) <= 0) {
      throw new EngineRefusal('diverges', 'logPower', 'The sum diverges: over such a set 1/(n log^b n) needs b > 1.')
    }
    return found
  })
  const complexity = Math.max(...definitions.map((one) => ('set' in one && 'k' in one.set ? one.set.k : 1)))
  const distinct = definitions.some((one) => 'set' in one && one.set.kind === 'distinct-prime-factors')
  return { series, power, logPower, complexity, distinct }
}

function parametersFor(task: Task, goal: Goal): TrapezoidParameters {
  if (!('digits' in goal)) throw new EngineRefusal('method_does_not_fit', 'cutoff', 'The transform has no cut-off: ask for a number of digits.')
  if (goal.digits > MOST_DIGITS) {
    throw new EngineRefusal('too_many_digits', 'digits', `The trapezoid goes up to ${MOST_DIGITS} digits: use panels, or ask for fewer.`)
  }
  return chooseParameters(goal.digits, task.series, task.power, task.logPower, task.complexity, task.distinct)
}

/** The Mellin transform by the trapezoid rule. */
export const trapezoid: MethodModule = {
  name: 'transform',

  forecast(definition, goal, arithmetic, speed): Forecast {
    try {
      const task = taskOf([definition])
      const parameters = parametersFor(task, goal)
      const digits = 'digits' in goal ? goal.digits : 0
      return { possible: true, radius: `1.0e-${digits + 1}`, seconds: predictSeconds(definition, parameters, arithmetic) / speed }
    } catch (refusal) {
      if (refusal instanceof EngineRefusal) return { possible: false, reason: refusal.message }
      throw refusal
    }
  },

  async prepare(request) {
    const task = taskOf(request.definitions)
    const parameters = request.parameters ? readParameters(request.parameters) : parametersFor(task, request.goal)
    return new TrapezoidComputation(request, parameters, task.series, task)
  },
}

import { EngineRefusal } from '../errors.ts'
import type { Goal } from './computation.ts'
import { type MellinTask, mellinTask } from './mellin-task.ts'
import type { Forecast, MethodModule } from './method.ts'
import { TrapezoidComputation } from './trapezoid-computation.ts'
import { predictSeconds } from './trapezoid-cost.ts'
import { type TrapezoidParameters, chooseParameters, readParameters } from './trapezoid-parameters.ts'

/** Beyond this many digits the trapezoid spends too many nodes; `panels` is the method then. */
const MOST_DIGITS = 300

function parametersFor(task: MellinTask, goal: Goal): TrapezoidParameters {
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
      const task = mellinTask([definition])
      const parameters = parametersFor(task, goal)
      const digits = 'digits' in goal ? goal.digits : 0
      return { possible: true, radius: `1.0e-${digits + 1}`, seconds: predictSeconds(definition, parameters, arithmetic) / speed }
    } catch (refusal) {
      if (refusal instanceof EngineRefusal) return { possible: false, reason: refusal.message }
      throw refusal
    }
  },

  async prepare(request) {
    const task = mellinTask(request.definitions)
    const parameters = request.parameters ? readParameters(request.parameters) : parametersFor(task, request.goal)
    return new TrapezoidComputation(request, parameters, task.series, task)
  },
}

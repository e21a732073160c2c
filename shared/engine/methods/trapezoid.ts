import { EngineRefusal } from '../errors.ts'
import { type Goal, decimalsAsked, radiusAimedAt } from './goal.ts'
import { type MellinTask, mellinTask } from './mellin-task.ts'
import type { Forecast, MethodModule } from './method.ts'
import { TrapezoidComputation } from './trapezoid-computation.ts'
import { predictSeconds } from './trapezoid-cost.ts'
import { type TrapezoidParameters, chooseParameters, readParameters } from './trapezoid-parameters.ts'

/** Beyond this many digits the trapezoid spends too many nodes; `panels` is the method then. */
const MOST_DIGITS = 300

function parametersFor(task: MellinTask, goal: Goal): TrapezoidParameters {
  return chooseParameters(decimalsAsked(goal, 'The trapezoid', MOST_DIGITS), task.series, task.power, task.logPower, task.complexity, task.distinct)
}

/** The Mellin transform by the trapezoid rule. */
export const trapezoid: MethodModule = {
  name: 'transform',

  forecast(definition, goal, arithmetic, speed): Forecast {
    try {
      const task = mellinTask([definition])
      const parameters = parametersFor(task, goal)
      return { possible: true, radius: radiusAimedAt(goal), seconds: predictSeconds(definition, parameters, arithmetic) / speed }
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

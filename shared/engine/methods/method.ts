import type { Definition } from '../sets/definition.ts'
import type { Computation, ComputationRequest, Method } from './computation.ts'
import type { Goal } from './goal.ts'

/** What a method says of a definition and a goal before anything is computed. */
export type Forecast =
  | { possible: true; radius: string; /** CPU seconds on this machine, by calibration. heuristic: affects choice only */ seconds: number }
  | { possible: false; reason: string }

/** One way of enclosing a constant. Each method is one file that exports one of these. */
export interface MethodModule {
  readonly name: Method
  /**
   * Cheap: used while a form is filled in. `speed` is the machine's calibration (1 = the reference machine), `without` names
   * estimates that may not be used.
   */
  forecast(definition: Definition, goal: Goal, arithmetic: ComputationRequest['arithmetic'], speed: number, without?: readonly string[]): Forecast
  /** Chooses what the request leaves open, checks everything, and cuts the work. Throws EngineRefusal. */
  prepare(request: ComputationRequest): Promise<Computation>
}

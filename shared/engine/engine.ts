import { EngineRefusal } from './errors.ts'
import type { ArithmeticName, Computation, ComputationRequest, Method, Outcome, ShardResult } from './methods/computation.ts'
import { derivatives } from './methods/derivatives.ts'
import { expansion } from './methods/expansion.ts'
import { finite } from './methods/finite.ts'
import type { Goal } from './methods/goal.ts'
import type { MethodModule } from './methods/method.ts'
import { panels } from './methods/panels.ts'
import { partialSum } from './methods/partial-sum.ts'
import { trapezoid } from './methods/trapezoid.ts'
import type { Definition } from './sets/definition.ts'

/** Every method there is; a new one is one file and one entry here. */
export const METHODS: Record<Method, MethodModule> = {
  transform: trapezoid,
  panels,
  expansion,
  'partial-sum': partialSum,
  finite,
  derivatives,
}

/** The quickest method that reaches the goal, by its own forecast; throws EngineRefusal with the methods' reasons where none does. */
export function quickestMethod(definition: Definition, goal: Goal, arithmetic: ArithmeticName, speed = 1): Method {
  const forecasts = Object.values(METHODS).map((method) => ({ method, forecast: method.forecast(definition, goal, arithmetic, speed) }))
  let best: { name: Method; seconds: number } | undefined
  for (const { method, forecast } of forecasts) {
    if (forecast.possible && (!best || forecast.seconds < best.seconds)) best = { name: method.name, seconds: forecast.seconds }
  }
  if (best) return best.name
  const reasons = forecasts.flatMap(({ forecast }) => (forecast.possible ? [] : [forecast.reason]))
  throw new EngineRefusal('no_method', 'method', [...new Set(reasons)].join(' '))
}

/** Chooses parameters, checks everything and cuts the work into shards; throws EngineRefusal. Definitions must be canonical. */
export async function prepare(request: ComputationRequest): Promise<Computation> {
  if (request.definitions.length === 0) throw new EngineRefusal('nothing_to_do', 'definitions', 'Name at least one constant.')
  return METHODS[request.method].prepare(request)
}

/** Runs every shard in turn in this thread. `onProgress` hears the share done, from 0 to 1. */
export async function computeAll(computation: Computation, onProgress?: (share: number) => void): Promise<Outcome[]> {
  const costs = Array.from({ length: computation.shardCount }, (_, index) => computation.shardCost(index))
  const whole = costs.reduce((total, cost) => total + cost, 0)
  const results: ShardResult[] = []
  let done = 0
  for (let index = 0; index < computation.shardCount; index++) {
    results.push(await computation.runShard(index))
    done += costs[index]
    onProgress?.(done / whole)
  }
  return computation.combine(results)
}

import { EngineRefusal } from './errors.ts'
import type { Computation, ComputationRequest, Method, Outcome, ShardResult } from './methods/computation.ts'
import type { MethodModule } from './methods/method.ts'
import { trapezoid } from './methods/trapezoid.ts'

/** Every method there is; a new one is one file and one entry here. */
export const METHODS: Partial<Record<Method, MethodModule>> = {
  transform: trapezoid,
}

export function methodNamed(name: Method): MethodModule {
  const method = METHODS[name]
  if (!method) throw new EngineRefusal('unknown-method', 'method', `There is no method named ${name}.`)
  return method
}

/** Chooses parameters, checks everything and cuts the work into shards; throws EngineRefusal. Definitions must be canonical. */
export async function prepare(request: ComputationRequest): Promise<Computation> {
  if (request.definitions.length === 0) throw new EngineRefusal('nothing-to-do', 'definitions', 'Name at least one constant.')
  return methodNamed(request.method).prepare(request)
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

import { computeAll, METHODS } from '../../shared/engine/engine.ts'
import type { ComputationRequest } from '../../shared/engine/methods/computation.ts'

/** What is computed to measure a machine: small, but long enough for the clock and the compiler. */
const SAMPLE: ComputationRequest = {
  definitions: [{ type: 'series', set: { kind: 'almost-primes', k: 3, exclude: [] }, weight: { power: '1', logPower: '1' } }],
  method: 'transform',
  arithmetic: 'ball',
  goal: { digits: 30 },
}

/**
 * Speed of the machine, measured in the calling thread by `cpuMs`: the CPU time that the engine foresees on the reference machine
 * by what was used here. The first round warms the compiler up. heuristic: affects forecasts only
 */
export async function measureSpeed(cpuMs: () => number): Promise<number> {
  const method = METHODS[SAMPLE.method]
  const forecast = method.forecast(SAMPLE.definitions[0], SAMPLE.goal, SAMPLE.arithmetic, 1)
  if (!forecast.possible) throw new Error(forecast.reason)
  let used = Infinity
  for (let round = 0; round < 3; round += 1) {
    const begun = cpuMs()
    await computeAll(await method.prepare(SAMPLE))
    used = Math.min(used, cpuMs() - begun)
  }
  return (forecast.seconds * 1000) / used
}

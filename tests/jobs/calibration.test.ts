import { beforeAll, describe, expect, it } from 'vitest'
import { createApp } from '../../server/app.ts'
import { selectOne } from '../../server/db.ts'
import { calibrateMachine } from '../../server/engine/calibration.ts'
import { EnginePool } from '../../server/engine/pool.ts'
import { computeRuns } from '../support/compute.ts'
import { makeMember, signedInAs, type Agent } from '../support/people.ts'
import { series } from '../support/register.ts'
import { startRun, untilState } from './run-helpers.ts'

let agent: Agent

beforeAll(async () => {
  agent = await signedInAs(await makeMember(), createApp())
  const pool = new EnginePool(1, 512)
  await calibrateMachine(pool)
  await pool.close()
  await computeRuns()
})

describe('the measuring of the machine', () => {
  it('is stored', async () => {
    const row = await selectOne<{ speed: string; cores: number }>('SELECT speed, cores FROM calibrations ORDER BY id DESC LIMIT 1')
    expect(Number(row!.speed)).toBeGreaterThan(0)
    expect(row!.cores).toBeGreaterThan(0)
  })

  // The factor of two that issue M2 asks of the forecast; CPU time is counted by thread, so that a busy machine changes nothing.
  it.each([
    [{ kind: 'primes' }, 30, 'transform', 'ball'],
    [{ kind: 'almost-primes', k: 4 }, 50, 'transform', 'ball'],
    [{ kind: 'primes' }, 100, 'panels', 'ball'],
    [{ kind: 'almost-primes', k: 2, exclude: [2] }, 60, 'panels', 'ball'],
    [{ kind: 'squarefree-almost-primes', k: 3 }, 20, 'transform', 'mpfr'],
  ] as const)('lets the CPU time of %j to %i digits by %s, %s, be foreseen within a factor of two', async (set, digits, method, arithmetic) => {
    const id = await startRun(agent, { definition: series(set), goal: { digits }, method, arithmetic })
    const run = await untilState(agent, id, 'done')
    expect(run.forecastSeconds! / run.cpuSeconds).toBeGreaterThan(0.5)
    expect(run.forecastSeconds! / run.cpuSeconds).toBeLessThan(2)
  }, 60_000)
})

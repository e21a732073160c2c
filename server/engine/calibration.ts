import { availableParallelism } from 'node:os'
import { change, selectOne } from '../db.ts'
import { env } from '../env.ts'
import type { EnginePool } from './pool.ts'
import { engineRelease } from './release.ts'

/** How many threads compute on this machine. */
export const computeThreads: number = env.COMPUTE_THREADS > 0 ? env.COMPUTE_THREADS : availableParallelism()

const KEPT_MS = 30_000
let kept: { speed: number; at: number } | undefined

/**
 * Speed of the machine that computes, as last measured by a worker; 1 is the reference machine, and 1 while none has measured.
 * heuristic: affects forecasts only
 */
export async function machineSpeed(): Promise<number> {
  if (kept && performance.now() - kept.at < KEPT_MS) return kept.speed
  const row = await selectOne<{ speed: string }>('SELECT speed FROM calibrations WHERE engine_digest = $digest ORDER BY id DESC LIMIT 1', { digest: engineRelease.digest })
  if (!row) return 1
  kept = { speed: Number(row.speed), at: performance.now() }
  return kept.speed
}

/** Measures this machine by a small computation of the engine and stores it; older measurements are dropped. */
export async function calibrateMachine(pool: EnginePool): Promise<number> {
  const { value: speed } = await pool.run({ kind: 'calibrate' })
  await change('INSERT INTO calibrations (engine_digest, speed, cores) VALUES ($digest, $speed, $cores)', {
    digest: engineRelease.digest,
    speed: speed.toPrecision(4),
    cores: computeThreads,
  })
  await change('DELETE FROM calibrations WHERE id <= (SELECT max(id) - 100 FROM calibrations)')
  return speed
}

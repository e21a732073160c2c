import { setTimeout as pause } from 'node:timers/promises'
import { inTransaction, select } from '../db.ts'
import type { EnginePool } from '../engine/pool.ts'
import { log } from '../log.ts'
import { periodically } from './periodic.ts'
import { sendJob, type JobSource } from './queue.ts'
import { runJob } from './run-job.ts'

/** How often an idle worker looks for a job. */
const IDLE_MS = 250
/** How often runs that have lost their job are looked for. */
const REVIVE_MS = 15_000

/**
 * Takes up runs until `shutdown`, as many at a time as there are threads, so that a run in few shards leaves no core idle. Ends
 * when every run that it held is settled or given back.
 */
export async function workOnRuns(source: JobSource, pool: EnginePool, shutdown: AbortSignal): Promise<void> {
  const reviving = periodically('reviving runs', REVIVE_MS, reviveRuns, shutdown)
  const held = new Set<Promise<void>>()
  while (!shutdown.aborted) {
    const job = held.size < pool.size ? await source.take('run') : null
    if (job === null) {
      await pause(IDLE_MS, undefined, { signal: shutdown }).catch(() => undefined)
      continue
    }
    const work = runJob(job, pool, shutdown)
      .then((end) => (end === 'give-back' ? source.giveBack('run', job.id) : undefined))
      // The database is away: the lease lapses, and the run is taken up again when it is back.
      .catch((error: unknown) => log.error({ err: error, runId: job.payload.runId }, 'a run was left to its lease'))
    held.add(work)
    void work.finally(() => held.delete(work))
  }
  await Promise.all([...held, reviving])
}

/**
 * Sends a new job for every run that ought to be computed and has none: the queue may have given a job up, or have been restored
 * from a backup without it. The row lock keeps two workers from reviving the same run.
 */
export async function reviveRuns(): Promise<void> {
  await inTransaction(async (transaction) => {
    const orphans = await select<{ id: string }>(
      `SELECT id FROM runs r
       WHERE (state = 'queued' OR (state = 'running' AND lease_until < now() - interval '10 seconds')) AND created_at < now() - interval '10 seconds'
         AND NOT EXISTS (SELECT 1 FROM pgboss.job j WHERE j.name = 'run' AND j.state < 'completed' AND j.data->>'runId' = r.id::text)
       ORDER BY created_at LIMIT 100 FOR UPDATE SKIP LOCKED`,
      {},
      transaction,
    )
    for (const { id } of orphans) await sendJob(transaction, 'run', { runId: id })
  })
}

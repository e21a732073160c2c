import { setTimeout as pause } from 'node:timers/promises'
import type { EnginePool } from '../engine/pool.ts'
import { log } from '../log.ts'
import type { JobSource } from './queue.ts'
import { runJob } from './run-job.ts'

/** How often an idle worker looks for a job. */
const IDLE_MS = 250

/**
 * Takes up runs until `shutdown`, as many at a time as there are threads, so that a run in few shards leaves no core idle. Ends
 * when every run that it held is settled or given back.
 */
export async function workOnRuns(source: JobSource, pool: EnginePool, shutdown: AbortSignal): Promise<void> {
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
  await Promise.all(held)
}

import { afterAll } from 'vitest'
import { EnginePool } from '../../server/engine/pool.ts'
import { openJobSource } from '../../server/jobs/queue.ts'
import { workOnRuns } from '../../server/jobs/run-worker.ts'

/** Takes up runs within the test's own process, until the file's tests are over. For what is about the answers and not about workers. */
export async function computeRuns(): Promise<void> {
  const pool = new EnginePool(2, 512)
  const source = await openJobSource()
  const shutdown = new AbortController()
  const working = workOnRuns(source, pool, shutdown.signal)
  afterAll(async () => {
    shutdown.abort()
    await working
    await source.stop()
    await pool.close()
  })
}

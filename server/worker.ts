import { remindAll } from './commands/assignment-reminder.ts'
// A run that is done may complete the review of a claim.
import './commands/claim-consequences.ts'
import { calibrateMachine, computeThreads } from './engine/calibration.ts'
import { EnginePool } from './engine/pool.ts'
import { sequelize } from './db.ts'
import { env } from './env.ts'
import { sendMails } from './jobs/mail.ts'
import { periodically } from './jobs/periodic.ts'
import { openJobSource } from './jobs/queue.ts'
import { workOnRuns } from './jobs/run-worker.ts'
import { tidy } from './jobs/tidy.ts'
import { log } from './log.ts'

const HOUR_MS = 3_600_000

/** Computes runs, sends mails and tidies up until `shutdown`. Any number of workers may run side by side. */
export async function startWorker(shutdown: AbortSignal, ready: (address: string) => void): Promise<void> {
  const pool = new EnginePool(computeThreads, env.RUN_MEMORY_MEGABYTES)
  const source = await openJobSource()
  log.info({ threads: computeThreads }, 'worker started')
  ready('')
  // Forecasts are by the reference machine until this is done; it does not keep the first run waiting.
  void calibrateMachine(pool).catch((error: unknown) => log.error({ err: error }, 'calibration failed'))
  await Promise.all([workOnRuns(source, pool, shutdown), sendMails(shutdown), periodically('tidying up', HOUR_MS, tidy, shutdown), periodically('reminding', HOUR_MS, remindAll, shutdown)])
  await source.stop()
  await pool.close()
  await sequelize.close()
}

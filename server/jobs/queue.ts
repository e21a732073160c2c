import PgBoss from 'pg-boss'
import type { Transaction } from 'sequelize'
import { env } from '../env.ts'
import { log } from '../log.ts'

/**
 * What is done outside the web process. Payloads carry ids only: the row that is loaded by them says what is to be done now.
 * A new kind of job is one more member here, a queue in a migration, and a handler in the worker.
 */
export type Job = { type: 'run'; payload: { runId: string } }
export type JobType = Job['type']

/** A job that a worker holds. */
export interface HeldJob<T extends JobType> {
  id: string
  payload: Extract<Job, { type: T }>['payload']
  /** How often it was taken up before; tells this hold from one that has lapsed. */
  retryCount: number
}

/** How often a job may be taken up again after its worker fell silent. What is hopeless, the handler itself gives up before. */
const RETRIES = 1_000

interface Sql {
  query(text: string, values?: unknown[]): Promise<{ rows: unknown[] }>
}

/** pg-boss on the connection of a transaction, so that a job is there if and only if the change that needs it is. */
function within(transaction: Transaction): { executeSql: (text: string, values: unknown[]) => Promise<{ rows: never[] }> } {
  const { connection } = transaction as unknown as { connection: Sql }
  return { executeSql: async (text, values) => ({ rows: (await connection.query(text, values)).rows as never[] }) }
}

/** Sends jobs; needs no connection of its own, since every job belongs to a transaction. */
const sender = new PgBoss({ connectionString: env.DATABASE_URL, supervise: false, schedule: false, migrate: false })
sender.on('error', (error) => log.error({ err: error }, 'job queue'))

/** Sends a job within a transaction and answers its id. */
export async function sendJob<T extends JobType>(transaction: Transaction, type: T, payload: Extract<Job, { type: T }>['payload']): Promise<string> {
  const id = await sender.send(type, payload, {
    db: within(transaction),
    expireInSeconds: env.RUN_LEASE_SECONDS,
    retryLimit: RETRIES,
    retryDelay: 0,
  })
  // pg-boss answers null and drops the job where the queue does not exist.
  if (id === null) throw new Error(`the queue ${type} does not exist`)
  return id
}

/** Marks a job as done, in the transaction of what it did. A job that was cancelled or taken over meanwhile is left alone. */
export async function completeJob(transaction: Transaction, type: JobType, id: string): Promise<void> {
  await sender.complete(type, id, {}, { db: within(transaction) })
}

/** Takes back the jobs of a run that no longer needs them. */
export async function cancelRunJobs(transaction: Transaction, runId: string): Promise<void> {
  const { connection } = transaction as unknown as { connection: Sql }
  await connection.query(`UPDATE pgboss.job SET state = 'cancelled', completed_on = now() WHERE name = 'run' AND data->>'runId' = $1 AND state < 'completed'`, [runId])
}

/** The worker's end of the queue: takes jobs, and watches that jobs of dead workers come back. */
export interface JobSource {
  take<T extends JobType>(type: T): Promise<HeldJob<T> | null>
  /** Gives a job back at once, for another worker to take. */
  giveBack(type: JobType, id: string): Promise<void>
  stop(): Promise<void>
}

export async function openJobSource(): Promise<JobSource> {
  const boss = new PgBoss({
    connectionString: env.DATABASE_URL,
    application_name: 'merestone-jobs',
    max: 2,
    schedule: false,
    migrate: false,
    // How soon a lapsed job is seen; one instance among all workers does it at a time.
    maintenanceIntervalSeconds: 1,
    archiveCompletedAfterSeconds: 3600,
    deleteAfterDays: 1,
  })
  boss.on('error', (error) => log.error({ err: error }, 'job queue'))
  await boss.start()
  return {
    async take(type) {
      const [job] = await boss.fetch<never>(type, { includeMetadata: true, batchSize: 1 })
      return job ? { id: job.id, payload: job.data, retryCount: job.retryCount } : null
    },
    giveBack: async (type, id) => {
      await boss.fail(type, id, { reason: 'the worker is shutting down' })
    },
    stop: () => boss.stop({ graceful: false, wait: true }),
  }
}

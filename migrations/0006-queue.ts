import PgBoss from 'pg-boss'
import type { Migration } from '../server/migrate.ts'

/**
 * The job queue's own schema and our queues, made here by the owner of the database, so that the application's role needs no right
 * to create tables. Expiry and retries are set job by job (server/jobs/queue.ts).
 */
export const up: Migration['up'] = async (query) => {
  // The plan brings its own transaction; a migration runs in one already.
  await query(PgBoss.getConstructionPlans().replace(/^\s*(BEGIN|COMMIT);/gm, ''))
  await query(`SELECT pgboss.create_queue('run', '{"policy":"standard"}')`)
}

export const down: Migration['down'] = async (query) => {
  await query('DROP SCHEMA pgboss CASCADE')
}

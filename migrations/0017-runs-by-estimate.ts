import type { Migration } from '../server/migrate.ts'

/** Finds what rests on an estimate, whatever its state, by the runs that used it. */
export const up: Migration['up'] = async (query) => {
  await query(`CREATE INDEX runs_estimates ON runs USING gin (estimates) WHERE state = 'done'`)
}

export const down: Migration['down'] = async (query) => {
  await query('DROP INDEX runs_estimates')
}

import { readdir } from 'node:fs/promises'
import { join } from 'node:path'
import { pathToFileURL } from 'node:url'
import pg from 'pg'
import { QueryInterface, Sequelize } from 'sequelize'
import { SequelizeStorage, Umzug, type RunnableMigration } from 'umzug'

/** What a file in migrations/ exports. `query` runs SQL; both directions run in one transaction each. */
export interface Migration {
  up: (query: (sql: string) => Promise<unknown>, context: QueryInterface) => Promise<void>
  down: (query: (sql: string) => Promise<unknown>, context: QueryInterface) => Promise<void>
}

/** Key of the advisory lock that keeps two migrators apart. */
const MIGRATION_LOCK = 4_207_002

const folder = join(import.meta.dirname, '..', 'migrations')

/** The files of migrations/ in order of name; the extension is no part of the name, so that sources and build are the same migrations. */
async function migrations(): Promise<RunnableMigration<QueryInterface>[]> {
  const files = (await readdir(folder)).filter((file) => /^\d{4}-.*\.(ts|js)$/.test(file)).sort()
  return files.map((file) => {
    const load = async () => (await import(/* @vite-ignore */ pathToFileURL(join(folder, file)).href)) as Migration
    const run = (direction: 'up' | 'down') => async ({ context }: { context: QueryInterface }) => {
      const migration = await load()
      await context.sequelize.transaction((transaction) => migration[direction]((sql) => context.sequelize.query(sql, { transaction }), context))
    }
    return { name: file.replace(/\.(ts|js)$/, ''), up: run('up'), down: run('down') }
  })
}

async function withUmzug<T>(ownerUrl: string, work: (umzug: Umzug<QueryInterface>, sequelize: Sequelize) => Promise<T>): Promise<T> {
  const sequelize = new Sequelize(ownerUrl, { dialect: 'postgres', dialectModule: pg, logging: false })
  const guard = new pg.Client({ connectionString: ownerUrl })
  try {
    await guard.connect()
    await guard.query('SELECT pg_advisory_lock($1)', [MIGRATION_LOCK])
    const umzug = new Umzug({
      migrations: await migrations(),
      context: sequelize.getQueryInterface(),
      storage: new SequelizeStorage({ sequelize, tableName: 'migrations' }),
      logger: undefined,
    })
    return await work(umzug, sequelize)
  } finally {
    await guard.end()
    await sequelize.close()
  }
}

/**
 * Brings the database up to date and gives the application's role its rights: everything on the tables, but on the audit trail
 * reading and adding only. Answers the names of what was applied.
 */
export async function migrate(ownerUrl: string, applicationRole?: string): Promise<string[]> {
  return withUmzug(ownerUrl, async (umzug, sequelize) => {
    const applied = await umzug.up()
    if (applicationRole !== undefined) await grant(sequelize, applicationRole)
    return applied.map((migration) => migration.name)
  })
}

/** Undoes migrations down to the named one, or all of them (`to: 0`). */
export async function rollBack(ownerUrl: string, to: string | 0): Promise<void> {
  await withUmzug(ownerUrl, (umzug) => umzug.down({ to }))
}

/** Schemas whose tables the application works on: ours and the job queue's. */
const SCHEMAS = ['public', 'pgboss']

async function grant(sequelize: Sequelize, role: string): Promise<void> {
  const name = `"${role.replaceAll('"', '""')}"`
  for (const schema of SCHEMAS) {
    await sequelize.query(`
      GRANT USAGE ON SCHEMA ${schema} TO ${name};
      GRANT SELECT, INSERT, UPDATE, DELETE ON ALL TABLES IN SCHEMA ${schema} TO ${name};
      GRANT USAGE, SELECT ON ALL SEQUENCES IN SCHEMA ${schema} TO ${name};
      GRANT EXECUTE ON ALL FUNCTIONS IN SCHEMA ${schema} TO ${name};
    `)
  }
  await sequelize.query(`
    REVOKE INSERT, UPDATE, DELETE ON migrations FROM ${name};
    REVOKE UPDATE, DELETE, TRUNCATE, REFERENCES, TRIGGER ON audit_entries FROM ${name};
  `)
}

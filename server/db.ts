import { setTimeout as pause } from 'node:timers/promises'
import pg from 'pg'
import { DatabaseError, QueryTypes, Sequelize, type Transaction } from 'sequelize'
import { env } from './env.ts'

/** The one connection pool of the process. Columns are snake_case; models state their own timestamps. */
export const sequelize = new Sequelize(env.DATABASE_URL, {
  dialect: 'postgres',
  dialectModule: pg,
  logging: false,
  pool: { max: 10, min: 0, idle: 10_000, acquire: 20_000 },
  define: { underscored: true, timestamps: false },
  // Short questions of many readers: compiling one, or giving it more processes, takes longer than answering it; and the tables that
  // lists are read from stay in memory, where an index is no dearer than a scan.
  // A process that hangs within a transaction must not keep the others from the rows and from the audit trail.
  dialectOptions: {
    application_name: 'merestone',
    connectionTimeoutMillis: 10_000,
    statement_timeout: 60_000,
    idle_in_transaction_session_timeout: 60_000,
    options: '-c jit=off -c max_parallel_workers_per_gather=0 -c random_page_cost=1.1',
  },
})

/** Failures after which PostgreSQL has undone everything and asks to be tried again: serialization, deadlock. */
const TRY_AGAIN = new Set(['40001', '40P01'])
const ATTEMPTS = 4

/** SQLSTATE of a failed query, if the error came from the database. */
export function sqlState(error: unknown): string | undefined {
  return (error as { parent?: { code?: string } } | null)?.parent?.code
}

/**
 * Runs `work` in one transaction: all of it is kept or nothing. Where the database gave way to another transaction (deadlock),
 * `work` runs again, so it must touch nothing but the database.
 */
export async function inTransaction<T>(work: (transaction: Transaction) => Promise<T>): Promise<T> {
  for (let attempt = 1; ; attempt += 1) {
    try {
      return await sequelize.transaction(work)
    } catch (error) {
      if (attempt === ATTEMPTS || !TRY_AGAIN.has(sqlState(error) ?? '')) throw error
      await pause(20 * attempt * (1 + Math.random()))
    }
  }
}

/** Values bound to `$name` in SQL. */
export type Bind = Record<string, unknown>

/** Rows of a query with bound values: `select<Row>('SELECT … WHERE id = $id', { id })`. bigint and numeric columns are strings. */
export async function select<Row extends object>(sql: string, bind: Bind = {}, transaction?: Transaction): Promise<Row[]> {
  return sequelize.query<Row>(sql, { type: QueryTypes.SELECT, bind, transaction: transaction ?? null })
}

/** First row or undefined. */
export async function selectOne<Row extends object>(sql: string, bind: Bind = {}, transaction?: Transaction): Promise<Row | undefined> {
  return (await select<Row>(sql, bind, transaction))[0]
}

interface KeptStatement {
  name: string
  text: string
  /** Names of the values in the order of their numbers in the text. */
  names: string[]
}

const keptStatements = new Map<string, KeptStatement>()

function keptStatement(sql: string): KeptStatement {
  const known = keptStatements.get(sql)
  if (known) return known
  const names: string[] = []
  const text = sql.replace(/\$([A-Za-z]\w*)/g, (_all, name: string) => `$${names.includes(name) ? names.indexOf(name) + 1 : names.push(name)}`)
  const statement = { name: `kept_${keptStatements.size}`, text, names }
  keptStatements.set(sql, statement)
  return statement
}

/**
 * As `select`, for what is asked by a key again and again: each connection keeps the statement and its plan, which of a join of many
 * tables takes longer to make than to follow. Not for lists with filters, where the best plan depends on the values; and `sql` must not
 * be put together anew for each question, since every text is kept.
 */
export async function selectByKey<Row extends object>(sql: string, bind: Bind, transaction?: Transaction): Promise<Row[]> {
  const { name, text, names } = keptStatement(sql)
  const held = (transaction as { connection?: pg.Client } | undefined)?.connection
  const connection = held ?? ((await sequelize.connectionManager.getConnection({ type: 'read' })) as pg.Client)
  try {
    const { rows } = await connection.query<Row>({ name, text, values: names.map((key) => bind[key]) })
    return rows
  } catch (error) {
    throw new DatabaseError(Object.assign(error as Error, { sql }))
  } finally {
    if (!held) sequelize.connectionManager.releaseConnection(connection)
  }
}

/** Runs a statement that changes rows and answers what its RETURNING clause gives. */
export async function change<Row extends object = Record<string, never>>(sql: string, bind: Bind = {}, transaction?: Transaction): Promise<Row[]> {
  const [rows] = await sequelize.query(sql, { bind, transaction: transaction ?? null })
  return Array.isArray(rows) ? (rows as Row[]) : []
}

import pg from 'pg'
import { QueryTypes } from 'sequelize'
import { inTransaction, select, sequelize } from '../db.ts'

/** A statement with its values, as it went to the database. */
export interface Statement {
  text: string
  values: unknown[]
}

interface Node {
  'Node Type': string
  'Relation Name'?: string
  'Total Cost': number
  Plans?: Node[]
}

/** Tables of so many rows are not to be read from end to end for one answer. */
const BIG = 10_000

/**
 * Listens at the driver to what this process asks the database, whichever way the question takes to it. Answers a function that
 * gives what was asked since the last call.
 */
export function listenToStatements(): { heard: () => Statement[]; stop: () => void } {
  let statements: Statement[] = []
  const prototype = pg.Client.prototype as unknown as { query: (...args: unknown[]) => unknown }
  const original = prototype.query
  prototype.query = function (this: unknown, ...args: unknown[]) {
    const [first, second] = args
    const config = typeof first === 'object' && first !== null ? (first as { text?: string; values?: unknown[] }) : undefined
    const text = config?.text ?? (typeof first === 'string' ? first : '')
    if (/^\s*(SELECT|WITH|\()/i.test(text)) statements.push({ text, values: config?.values ?? (Array.isArray(second) ? (second as unknown[]) : []) })
    return original.apply(this, args)
  }
  return {
    heard: () => {
      const all = statements
      statements = []
      return all
    },
    stop: () => (prototype.query = original),
  }
}

/** A limit is expected to end the scan below it within a tenth of the table. */
function endsEarly({ 'Node Type': type, 'Total Cost': cost, Plans: [below] = [] }: Node): boolean {
  return type === 'Limit' && below !== undefined && below['Node Type'] === 'Seq Scan' && cost < below['Total Cost'] / 10
}

/** Names of the tables that a plan reads from end to end. */
function fullScans(node: Node): string[] {
  if (endsEarly(node)) return []
  const own = node['Node Type'].endsWith('Seq Scan') && node['Relation Name'] !== undefined ? [node['Relation Name']] : []
  return [...own, ...(node.Plans ?? []).flatMap(fullScans)]
}

/** What is asked of plans: that no table with many rows is read in full. */
export interface PlanCheck {
  /** Different statements. */
  statements: number
  faults: string[]
}

/**
 * Looks at the plans of statements, each list by what has sent it. With `evenSmall` tables of a hundred rows count, and the planner
 * is told to scan in full only where no index serves: for a small database.
 */
export async function checkPlansOf(sent: readonly [what: string, statements: readonly Statement[]][], { evenSmall = false } = {}): Promise<PlanCheck> {
  const tables = await select<{ name: string }>(`SELECT relname AS name FROM pg_class WHERE relkind = 'r' AND relnamespace = 'public'::regnamespace AND reltuples >= ${evenSmall ? 100 : BIG}`)
  const big = new Set(tables.map(({ name }) => name))
  const seen = new Set<string>()
  const faults: string[] = []
  await inTransaction(async (transaction) => {
    if (evenSmall) await sequelize.query('SET LOCAL enable_seqscan = off', { transaction })
    for (const [what, statements] of sent) {
      for (const { text, values } of statements) {
        seen.add(text)
        const [row] = await sequelize.query<{ 'QUERY PLAN': { Plan: Node }[] }>(`EXPLAIN (FORMAT JSON) ${text}`, { bind: values, type: QueryTypes.SELECT, transaction })
        const scanned = fullScans(row!['QUERY PLAN'][0]!.Plan).filter((table) => big.has(table))
        for (const table of new Set(scanned)) faults.push(`${what} reads all of ${table}: ${text.replace(/\s+/g, ' ').slice(0, 300)}`)
      }
    }
  })
  return { statements: seen.size, faults }
}

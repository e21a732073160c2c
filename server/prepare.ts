import { DEMO_PASSWORD, demoAccounts } from '../seeders/demo-people.ts'
import { select, sequelize } from './db.ts'
import { bringUpToDate } from './prepare-database.ts'
import { seedIfEmpty } from './seed.ts'

/*
 * Run by `npm start` before the web process and the worker: applies the migrations, seeds the demo into an empty database (unless
 * DEMO=off), and tells over the IPC channel what there is to tell.
 */

/** What `npm start` shows. */
interface Prepared {
  applied: string[]
  seeded: boolean
  /** Demo accounts that can sign in with the demo's password. */
  accounts: { email: string; name: string; roles: string[]; group: string }[]
  password: string
  /** False: there is one role for everything, so that only the trigger guards the audit trail. */
  separateRoles: boolean
}

/** Failures that their message explains: no server there (or not that one), a wrong password, no such database, a right that is missing. */
const EXPLAINED = new Set(['ECONNREFUSED', 'ENOTFOUND', 'ETIMEDOUT', 'EHOSTUNREACH', '28P01', '28000', '3D000', '42501'])

async function prepare(): Promise<Prepared> {
  const { applied, separateRoles } = await bringUpToDate()
  const seeded = process.env.DEMO !== 'off' && (await seedIfEmpty())
  const emails = demoAccounts().map(({ email }) => email)
  const present = await select<{ email: string }>(`SELECT email FROM members WHERE state = 'active' AND email = ANY($emails)`, { emails })
  const accounts = demoAccounts().filter(({ email }) => present.some((row) => row.email === email))
  return { applied, seeded, accounts, password: DEMO_PASSWORD, separateRoles }
}

try {
  process.send?.(await prepare())
} catch (error) {
  const { code, message } = ((error as { parent?: unknown }).parent ?? error) as { code?: string; message: string }
  if (!EXPLAINED.has(code ?? '')) throw error
  process.stderr.write(`${message}\n`)
  process.exitCode = 1
} finally {
  await sequelize.close()
  process.disconnect?.()
}

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

const { applied, separateRoles } = await bringUpToDate()
const seeded = process.env.DEMO !== 'off' && (await seedIfEmpty())
const emails = demoAccounts().map(({ email }) => email)
const present = await select<{ email: string }>(`SELECT email FROM members WHERE state = 'active' AND email = ANY($emails)`, { emails })
const accounts = demoAccounts().filter(({ email }) => present.some((row) => row.email === email))
await sequelize.close()

const prepared: Prepared = { applied, seeded, accounts, password: DEMO_PASSWORD, separateRoles }
process.send?.(prepared)
process.disconnect?.()

import { connectToLocalDatabase } from './local-database.ts'

/** `audit-check`: recomputes the audit trail; exit code 0 where the chain is whole, 1 where it is broken, naming the first broken entry. */
const leave = await connectToLocalDatabase()
const { checkAudit, mayChangeAudit } = await import('../queries/audit.ts')
const { sequelize } = await import('../db.ts')

const { entries, head, broken } = await checkAudit()
if (broken) {
  console.log(`The audit trail is broken at entry ${broken.seq}: ${broken.reason}. The ${entries} entries before it are whole.`)
  process.exitCode = 1
} else {
  console.log(`The audit trail is whole: ${entries} entries.`)
  console.log(`Hash of the last entry: ${head}`)
}
if (await mayChangeAudit()) console.log('Note: the role in DATABASE_URL may change the table; only the trigger guards it.')
await sequelize.close()
await leave()
